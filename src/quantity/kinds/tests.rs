use super::*;

#[test]
fn reads_what_people_type() {
    // Each text and its value in °C; unit factors: NIST SP 811 (2008), B.8.
    for (text, celsius) in [
        ("-38 °C", -38.0),
        ("-38C", -38.0),
        ("−38,5 degC", -38.5),
        ("-36 F", -340.0 / 9.0),
        ("235 K", -38.15),
        ("-40 ℉", -40.0),
    ] {
        let read = text.parse::<Temperature>().map(Temperature::as_celsius);
        assert!(read.as_ref().is_ok_and(|t| (t - celsius).abs() < 1e-9), "{text}: {read:?}");
    }
}

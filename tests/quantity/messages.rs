//! Every way a text can be wrong, with the full message.

use coldsump::quantity::*;

fn refused<Q: Quantity + std::fmt::Debug>(cases: &[(&str, &str)]) {
    for (text, message) in cases {
        match text.parse::<Q>() {
            Ok(value) => panic!("`{text}` was read as {value}"),
            Err(error) => assert_eq!(error.to_string(), *message, "for `{text}`"),
        }
    }
}

#[test]
fn each_way_to_be_wrong_says_what_to_type() {
    refused::<Temperature>(&[
        // Empty
        ("", "nothing is given; write for example `-38 °C`"),
        (" \u{202F}\t", "nothing is given; write for example `-38 °C`"),
        // NoNumber
        ("cold", "`cold` is not a number with a unit; write for example `-38 °C`"),
        ("°C", "`°C` is not a number with a unit; write for example `-38 °C`"),
        ("--5 °C", "`--5 °C` is not a number with a unit; write for example `-38 °C`"),
        ("-20..-10 °C", "`-20..-10 °C` is not a number with a unit; write for example `-38 °C`"),
        ("20/30 °C", "`20/30 °C` is not a number with a unit; write for example `-38 °C`"),
        ("1.2.3 °C", "`1.2.3 °C` is not a number with a unit; write for example `-38 °C`"),
        // NotFinite
        ("nan °C", "`nan °C` is not a finite number; write for example `-38 °C`"),
        ("-inf K", "`-inf K` is not a finite number; write for example `-38 °C`"),
        ("- Infinity °C", "`- Infinity °C` is not a finite number; write for example `-38 °C`"),
        ("1e999 °C", "`1e999 °C` is not a finite number; write for example `-38 °C`"),
        // NoUnit
        ("-38", "`-38` has no unit; write for example `-38 °C`"),
        ("−38,5", "`−38,5` has no unit; write for example `-38.5 °C`"),
        // UnknownUnit
        (
            "-38 °",
            "`°` is not a unit of temperature; write for example `-38 °C` (units: °C, °F, K, °R)",
        ),
        (
            "-38 grad",
            "`grad` is not a unit of temperature; write for example `-38 °C` (units: °C, °F, K, °R)",
        ),
        // WrongKind
        (
            "5 bar",
            "`bar` is a unit of pressure, but a temperature is needed; write for example `-38 °C`",
        ),
        // OutOfRange
        ("-400 °C", "temperature must be between -90 and 400 °C, but is -400 °C"),
        ("-400 °F", "temperature must be between -90 and 400 °C, but is -400 °F"),
        ("10 K", "temperature must be between -90 and 400 °C, but is 10 K"),
    ]);
    refused::<Power>(&[
        // AmbiguousComma
        ("1,500 W", "`1,500 W` can be read in two ways; write `1500 W` or `1.500 W`"),
        ("0 500 W", "`0 500 W` is not a number with a unit; write for example `1500 W`"),
        ("1 50 W", "`1 50 W` is not a number with a unit; write for example `1500 W`"),
        ("1,50,000 W", "`1,50,000 W` is not a number with a unit; write for example `1500 W`"),
        ("1,500,00 W", "`1,500,00 W` is not a number with a unit; write for example `1500 W`"),
        (
            "1'000 000'000 W",
            "`1'000 000'000 W` is not a number with a unit; write for example `1500 W`",
        ),
        ("-5 W", "power must be between 0 and 10000000 W, but is -5 W"),
        ("-1e-9 W", "power must be between 0 and 10000000 W, but is -1e-9 W"),
        (
            "20 °C",
            "`°C` is a unit of temperature, but a power is needed; write for example `1500 W`",
        ),
    ]);
    refused::<TimeSpan>(&[
        // Unclear
        ("1:30 h", "`1:30 h` is unclear; write for example `4 h 30 min`"),
        ("4h30", "`4h30` is unclear; write for example `4 h 30 min`"),
        ("4 h 90 min", "`4 h 90 min` is unclear; write for example `4 h 30 min`"),
        ("4.5 h 30 min", "`4.5 h 30 min` is unclear; write for example `4 h 30 min`"),
        ("30 min 4 h", "`30 min 4 h` is unclear; write for example `4 h 30 min`"),
        ("4 h -30 min", "`4 h -30 min` is unclear; write for example `4 h 30 min`"),
        ("90 m", "`m` is a unit of length, but a time is needed; write for example `4 h`"),
    ]);
    refused::<Length>(&[
        ("1-2 m", "`1-2 m` is unclear; write for example `5 ft 6 in`"),
        ("5 ft 14 in", "`5 ft 14 in` is unclear; write for example `5 ft 6 in`"),
        ("2 m^2", "`m^2` is a unit of area, but a length is needed; write for example `1.5 m`"),
    ]);
    refused::<Bore>(&[
        ("2", "`2` has no unit; write for example `2 mm`"),
        ("5/3 in", "`5/3 in` is unclear; write for example `50.8 mm`"),
        ("2x4 in", "`2x4 in` is unclear; write for example `50.8 mm`"),
    ]);
    refused::<Density>(&[
        ("0.875", "`0.875` has no unit; write for example `0.875 kg/L`"),
        ("SG", "`SG` is not a number with a unit; write for example `875 kg/m³`"),
        ("SG 8.75", "density must be between 600 and 1500 kg/m³, but is SG 8.75"),
        ("-140 API", "density must be between 600 and 1500 kg/m³, but is -140 API"),
    ]);
    refused::<KinematicViscosity>(&[
        (
            "46 mPa·s",
            "`mPa·s` is a unit of dynamic viscosity, but a kinematic viscosity is needed; write for example `46 mm²/s`",
        ),
        (
            "150 SUS",
            "`SUS` is a unit of Saybolt time, but a kinematic viscosity is needed; write for example `46 mm²/s`",
        ),
    ]);
    let out_of_range = Temperature::celsius(f64::NAN).unwrap_err().to_string();
    assert_eq!(out_of_range, "temperature must be between -90 and 400 °C, but is NaN °C");
}

#[test]
fn a_pressure_from_the_wrong_side_says_what_to_type() {
    refused::<AbsolutePressure>(&[
        (
            "-0.2 barg",
            "`-0.2 barg` is a gauge pressure, but an absolute one is needed; write for example `60 kPa`, or the vacuum at sea level, `5 inHg vacuum`",
        ),
        (
            "-0.2 bar",
            "`-0.2 bar` is below zero, so it is no absolute pressure; write for example `60 kPa`, or the vacuum at sea level, `5 inHg vacuum`",
        ),
        (
            "5 in Hg",
            "`5 in Hg` does not say what it is measured from; write `5 in Hg vacuum` (at sea level) or `5 in Hg abs`",
        ),
        (
            "-5 inHg vacuum",
            "`-5 inHg vacuum` has a minus sign and says vacuum; write for example `5 inHg vacuum`",
        ),
        (
            "40 inHg vacuum",
            "`40 inHg vacuum` is more than the whole atmosphere at sea level, 29.9213 inHg",
        ),
        (
            "3 psid",
            "`3 psid` is a pressure difference, but an absolute pressure is needed; write for example `60 kPa`",
        ),
        (
            "60 mPa",
            "`mPa` is not a unit of absolute pressure; write for example `60 kPa` (units: kPa, Pa, hPa, MPa, bar, mbar, psi, inHg, mmHg, cmHg, atm, kgf/cm², mH2O, inH2O, ftH2O)",
        ),
        (
            "60 °C",
            "`°C` is a unit of temperature, but an absolute pressure is needed; write for example `60 kPa`",
        ),
        ("-5 kPa abs", "absolute pressure must be between 0 and 1000 kPa, but is -5 kPa abs"),
    ]);
    refused::<GaugePressure>(&[
        (
            "25 bara",
            "`25 bara` is an absolute pressure, but a gauge pressure (over the air outside) is needed; write for example `25 bar`",
        ),
        (
            "3 psid",
            "`3 psid` is a pressure difference, but a gauge pressure is needed; write for example `25 bar`",
        ),
    ]);
    refused::<PressureDifference>(&[(
        "3 psig",
        "`3 psig` names what it is measured from, but a pressure difference is needed; write for example `2.5 kPa`",
    )]);
}

#[test]
fn a_viscosity_that_cannot_be_read_says_what_to_type() {
    for (text, message) in [
        ("", "nothing is given; write for example `46 mm²/s`"),
        ("46", "`46` has no unit; write for example `46 mm²/s`"),
        (
            "46 foo",
            "`foo` is not a unit of viscosity; write for example `46 mm²/s` (units: mm²/s, cSt, mPa·s, cP, SUS)",
        ),
        (
            "46 bar",
            "`bar` is a unit of pressure, but a viscosity is needed; write for example `46 mm²/s`",
        ),
        (
            "4100 MPa·s",
            "`MPa·s` is not a unit of viscosity; write for example `4100 mm²/s` (units: mm²/s, cSt, mPa·s, cP, SUS)",
        ),
        ("20 SUS", "`20 SUS` is outside the Saybolt Universal scale, which starts at 32 SUS"),
        ("150 SUS at 100", "`100` has no unit; write for example `100 °C`"),
        (
            "46 cSt at 40 °C",
            "`46 cSt at 40 °C` names a temperature, which only a Saybolt time needs; write for example `1600 mm²/s`",
        ),
        ("1e9 mPa·s", "dynamic viscosity must be between 0.1 and 2e7 mPa·s, but is 1e9 mPa·s"),
        ("1e9 cSt", "kinematic viscosity must be between 0.21 and 20000000 mm²/s, but is 1e9 cSt"),
    ] {
        let found = text.parse::<ViscosityReading>().map_err(|e| e.to_string());
        assert_eq!(found, Err(message.to_owned()), "for `{text}`");
    }
}

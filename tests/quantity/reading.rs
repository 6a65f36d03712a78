//! What people type for each kind, and facts of the trade.

use coldsump::quantity::*;

/// Reads a text and compares it to so many of the kind's own unit.
fn reads<Q: Quantity>(cases: &[(&str, f64)]) {
    for (text, want) in cases {
        let found = text.parse::<Q>().unwrap_or_else(|e| panic!("{text}: {e}")).value();
        let close = (found - want).abs() <= 1e-9 * want.abs().max(1e-3);
        assert!(close, "{text}: {found}, but {want}; factors: NIST SP 811 (2008), B.8");
    }
}

#[test]
fn reads_numbers_as_people_type_them() {
    reads::<Temperature>(&[
        ("-38 °C", -38.0),
        ("-38C", -38.0),
        ("-38°C", -38.0),
        ("-38 c", -38.0),
        ("−38,5 degC", -38.5),
        ("- 38 °C", -38.0),
        ("–38\u{202F}°C", -38.0),
        ("\u{2011}38\u{A0}°C", -38.0),
        ("\u{FEFF} -38 ° C\t", -38.0),
        ("-38 ºC", -38.0),
        ("-38 ℃", -38.0),
        ("-38 deg C", -38.0),
        ("-38 Deg. C", -38.0),
        ("+ 5 °C", 5.0),
        (".5 °C", 0.5),
        ("5. °C", 5.0),
        ("-0,25 °C", -0.25),
        ("-36 F", -340.0 / 9.0),
        ("-40 ℉", -40.0),
        ("-130 °F", -90.0),
        ("752 °F", 400.0),
        ("235 K", -38.15),
        ("235 \u{212A}", -38.15),
        ("183.15 K", -90.0),
        ("2e1 °C", 20.0),
        ("2.5E-1 °C", 0.25),
    ]);
    reads::<Power>(&[
        ("1 500 W", 1500.0),
        ("1\u{202F}500 W", 1500.0),
        ("1'500 W", 1500.0),
        ("1’500 W", 1500.0),
        ("1 500,5 W", 1500.5),
        ("1,500.5 W", 1500.5),
        ("1.500,5 W", 1500.5),
        ("1,500,000 W", 1.5e6),
        ("1.500.000 W", 1.5e6),
        ("1 500 000 W", 1.5e6),
        ("1500,0 W", 1500.0),
        ("0,875 kW", 875.0),
        ("1500,000 W", 1500.0),
        ("1.500 kW", 1500.0),
        ("1.5e3 W", 1500.0),
        ("1.5E+03W", 1500.0),
        ("1.5 kw", 1500.0),
        ("1.5 KW", 1500.0),
        ("1 1/2 hp", 1.5 * 745.699_871_582_270_2),
        ("2 PS", 2.0 * 735.498_75),
        ("1000 Btu/hr", 293.071_070_172_222_2),
    ]);
}

#[test]
fn reads_lengths_with_inch_fractions_and_feet() {
    reads::<Bore>(&[
        ("2 in", 50.8),
        ("2\"", 50.8),
        ("2”", 50.8),
        ("2″", 50.8),
        ("2''", 50.8),
        ("2 IN", 50.8),
        ("2 in.", 50.8),
        ("50.8 MM", 50.8),
        ("1-1/4 in", 31.75),
        ("1 1/4 in", 31.75),
        ("1-1/4\"", 31.75),
        ("1 1/4”", 31.75),
        ("1–1/4 in", 31.75),
        ("1¼ in", 31.75),
        ("1 ¼ in", 31.75),
        ("3/4 in", 19.05),
        ("¾\"", 19.05),
        ("1 13/16 in", 46.0375),
        ("5 cm", 50.0),
    ]);
    reads::<Length>(&[
        ("5 ft 6 in", 1.6764),
        ("5'6\"", 1.6764),
        ("5′ 6″", 1.6764),
        ("5' 6-1/2\"", 1.6891),
        ("-1 ft 6 in", -0.4572),
        ("1 m 20 cm", 1.2),
        ("4 ft.", 1.2192),
        ("- 0.5 m", -0.5),
    ]);
    reads::<Elevation>(&[("8200 ft", 2499.36), ("2 100 m", 2100.0), ("2'100 m", 2100.0)]);
    reads::<Volume>(&[
        ("200 l", 200.0),
        ("200 Liters", 200.0),
        ("200 dm3", 200.0),
        ("10 gal", 37.854_117_84),
        ("10 US gal", 37.854_117_84),
        ("10 gal.", 37.854_117_84),
        ("2 1/2 gal", 9.463_529_46),
        ("10 imp gal", 45.4609),
    ]);
    reads::<Displacement>(&[
        ("75 cm³", 75.0),
        ("75 cm3/rev", 75.0),
        ("75 cm^3/rev", 75.0),
        ("75 cc", 75.0),
        ("4.5 in³/rev", 73.741_788),
        ("4.5 cu. in/rev.", 73.741_788),
        ("4.5 cu in", 73.741_788),
    ]);
}

#[test]
fn reads_times_with_hours_and_minutes() {
    reads::<TimeSpan>(&[
        ("4 h", 4.0),
        ("4h30min", 4.5),
        ("4 h 30 min", 4.5),
        ("4 hr 30 min", 4.5),
        ("4 H 30 MIN", 4.5),
        ("1 d 12 h", 36.0),
        ("1 h 30 min 36 s", 1.51),
        ("90 min", 1.5),
        ("90 Min.", 1.5),
        ("1½ h", 1.5),
        ("1 1/2 h", 1.5),
        ("4,5 h", 4.5),
    ]);
    reads::<Rotation>(&[
        ("2100 rpm", 2100.0),
        ("2100 RPM", 2100.0),
        ("2 100 1/min", 2100.0),
        ("2100 1/min", 2100.0),
        ("2100 min-1", 2100.0),
        ("2100 min^-1", 2100.0),
        ("2100 r.p.m.", 2100.0),
        ("35 Hz", 2100.0),
    ]);
    reads::<Velocity>(&[
        ("3 m/s", 3.0),
        ("36 km/h", 10.0),
        ("36 KM/H", 10.0),
        ("10 MPH", 4.4704),
        ("18 knots", 9.26),
        ("18 kt", 9.26),
        ("10 ft/s", 3.048),
    ]);
}

#[test]
fn reads_viscosities_as_data_sheets_print_them() {
    reads::<KinematicViscosity>(&[
        ("46 mm²/s", 46.0),
        ("46 mm2/s", 46.0),
        ("46 mm^2/s", 46.0),
        ("46 MM2/S", 46.0),
        ("46 cSt", 46.0),
        ("46 CST", 46.0),
        ("46,0 cst", 46.0),
        ("0.46 St", 46.0),
        ("6 400 mm²/s", 6400.0),
    ]);
    let dynamic = |text: &str| match text.parse() {
        Ok(ViscosityReading::Dynamic(value)) => value.as_mpa_s(),
        other => panic!("{text}: {other:?}"),
    };
    for text in ["4100 mPa·s", "4100 mPas", "4100 mPa.s", "4100 mPa*s", "4 100 mPa s", "4100 cP"] {
        assert_eq!(dynamic(text), 4100.0, "{text}");
    }
    assert_eq!(dynamic("4.1 Pa·s"), 4100.0);
    assert_eq!(dynamic("4100 mpas"), 4100.0);
    for (text, at) in [
        ("150 SUS", None),
        ("150 SSU", None),
        ("150 sus", None),
        ("150 SUS at 100 °F", Some(37.777_777_777_777_78)),
        ("150 SUS @ 100F", Some(37.777_777_777_777_78)),
        ("150 SUS@40C", Some(40.0)),
    ] {
        let Ok(ViscosityReading::Saybolt(found)) = text.parse() else { panic!("{text}") };
        assert_eq!(found.seconds, 150.0, "{text}");
        let same = match (found.at, at) {
            (Some(found), Some(at)) => (found.as_celsius() - at).abs() < 1e-9,
            (None, None) => true,
            _ => false,
        };
        assert!(same, "{text}: {found:?}");
    }
}

#[test]
fn tells_absolute_gauge_vacuum_and_difference_apart() {
    reads::<AbsolutePressure>(&[
        ("60 kPa", 60.0),
        ("60 Kpa", 60.0),
        ("60 KPA", 60.0),
        ("60 kPa abs", 60.0),
        ("60 kPa abs.", 60.0),
        ("60 kPa(a)", 60.0),
        ("60 kPa absolute", 60.0),
        ("0.6 bar(a)", 60.0),
        ("0,6 bara", 60.0),
        ("0.6 bar (abs)", 60.0),
        ("0.06 MPa a", 60.0),
        ("10 psia", 68.947_572_931_683_6),
        ("10 PSIA", 68.947_572_931_683_6),
        ("10 psi abs", 68.947_572_931_683_6),
        ("5 inHg vacuum", 84.393_055),
        ("5 inHg vac", 84.393_055),
        ("5 in Hg Vac.", 84.393_055),
        ("5 in. Hg (vac.)", 84.393_055),
        ("5\" Hg vacuum", 84.393_055),
        ("5 inches of mercury vacuum", 84.393_055),
        ("5 inHg of vacuum", 84.393_055),
        ("0.2 bar vacuum", 81.325),
        ("25 inHg abs", 84.659_725),
        ("600 mbar", 60.0),
    ]);
    reads::<GaugePressure>(&[
        ("25 bar", 2500.0),
        ("25 BAR", 2500.0),
        ("25 barg", 2500.0),
        ("25 bar(g)", 2500.0),
        ("25 bar gauge", 2500.0),
        ("2.5 MPa", 2500.0),
        ("2.5 Mpa", 2500.0),
        ("20 kPa g", 20.0),
        ("20 kPag", 20.0),
        ("-0.2 bar", -20.0),
        ("0.2 bar vacuum", -20.0),
        ("3 psig", 20.684_271_879_505_1),
        ("3 psi gage", 20.684_271_879_505_1),
    ]);
    reads::<PressureDifference>(&[
        ("2.5 kPa", 2.5),
        ("3 psi", 20.684_271_879_505_1),
        ("3 psid", 20.684_271_879_505_1),
        ("3 psi diff.", 20.684_271_879_505_1),
        ("5 inHg", 16.931_945),
    ]);
}

#[test]
fn reads_densities_and_specific_gravities() {
    reads::<Density>(&[
        ("875 kg/m3", 875.0),
        ("0.875 kg/l", 875.0),
        ("0,875 g/cm³", 875.0),
        // Water at 60 °F, 999.016 kg/m³: ASTM D1250 / API MPMS 11.1 (quoted).
        ("0.875 SG", 0.875 * 999.016),
        ("SG 0.875", 0.875 * 999.016),
        ("SG = 0,875", 0.875 * 999.016),
        ("sg: .875", 0.875 * 999.016),
        ("Sp. Gr. 0.875", 0.875 * 999.016),
        ("0.875 S.G.", 0.875 * 999.016),
        ("specific gravity 0.875", 0.875 * 999.016),
        // API gravity 30 is a specific gravity of 141.5/161.5: ASTM D1250 (memory).
        ("30 API", 141.5 / 161.5 * 999.016),
        ("30 °API", 141.5 / 161.5 * 999.016),
        ("API gravity 30", 141.5 / 161.5 * 999.016),
    ]);
}

#[test]
fn trade_facts_hold() {
    // Each: common practice, no source, unless said otherwise.
    let density = |text: &str| text.parse::<Density>().unwrap();
    let gravity = density("57 lb/ft³").in_unit("SG").unwrap();
    // 57/62.4: the trade's 62.4 lb/ft³ is three figures of water, so is the answer.
    assert!((gravity - 0.913).abs() <= 0.001, "{gravity}");
    for (text, kn_m3) in [("56 lb/ft³", 8.8), ("57 lb/ft³", 9.0)] {
        let found = density(text).in_unit("kN/m³").unwrap();
        assert!((found - kn_m3).abs() <= 0.05, "{text}: {found}");
    }
    let five: PressureDifference = "5 inHg".parse().unwrap();
    assert!((five.as_kpa() - 16.932).abs() < 5e-4, "NIST SP 811 (2008), B.8");
    let suction: Velocity = "4 ft/s".parse().unwrap();
    assert!((suction.as_m_per_s() - 1.2192).abs() < 1e-12);
    let sixty: AbsolutePressure = "60 kPa abs".parse().unwrap();
    let twelve: AbsolutePressure = "12.2 inHg vacuum".parse().unwrap();
    assert!((sixty.as_kpa() - twelve.as_kpa()).abs() < 0.05 * 3.386_389);
}

//! The site's cold against published figures and independent computation. Values of the check list are
//! computed with scipy 1.17, lmoments3 1.0.8 and, where said, R evd 2.3, on the same data.

use coldsump::climate::extremes::{Winters, frequency_factor, from_levels, risk};
use coldsump::climate::records::{Drop, Import, Layout, Options, RecordError, Unit};
use coldsump::climate::{BuiltIn, Site, Sites, WinterMinimum, months};
use proptest::prelude::*;

const VALDEZ_WINTERS: &str = include_str!("climate/valdez_wso_winter_minima.csv");
const VALDEZ_DAILY: &str = include_str!("climate/valdez_wso_tmin_daily_1941_1970.csv");
const NORTHWAY: &str = include_str!("climate/northway_ak_tmy3_hourly_slim.csv");
const DLY: &str = include_str!("climate/ghcnd_fixture_valdez_1947jf.dly");
const ROWS: &str = include_str!("climate/ghcnd_by_year_fixture_valdez_1947jf.csv");
const STATION: &str = include_str!("climate/ghcnd_access_fixture_valdez_1947jf.csv");
const ORDER: &str = include_str!("climate/ghcnd_cdo_metric_kotzebue_2020q1.csv");
const EPW: &str = include_str!("climate/northway_ak_tmy3_first48h.epw");

#[track_caller]
fn near(found: f64, want: f64, tolerance: f64, what: &str) {
    assert!((found - want).abs() <= tolerance, "{what}: {found}, not {want} within {tolerance}");
}

fn valdez() -> Winters {
    let minima = VALDEZ_WINTERS
        .lines()
        .skip(1)
        .map(|line| {
            let mut fields = line.split(',');
            WinterMinimum {
                ends: fields.next().unwrap().parse().unwrap(),
                celsius: fields.next().unwrap().parse().unwrap(),
            }
        })
        .collect();
    Winters::new(minima).unwrap()
}

fn imported(text: &str, options: Options) -> Result<Import, RecordError> {
    let mut import = Import::new(options);
    import.file("record", text.as_bytes(), |_| ())?;
    Ok(import)
}

fn plain() -> Options {
    Options { start_hour: 6, ..Options::default() }
}

#[test]
fn frequency_factors_and_risk() {
    // With γ = 0.5772; with more digits each is 1.2e-5 lower.
    let rows = [
        (2.0, -0.164_272),
        (5.0, 0.719_457),
        (10.0, 1.304_563),
        (20.0, 1.865_811),
        (50.0, 2.592_288),
        (100.0, 3.136_681),
    ];
    for (n, want) in rows {
        near(frequency_factor(n), want - 1.2e-5, 1e-6, "F");
    }
    near(risk(50.0, 20.0), 0.332_392, 1e-6, "risk");
    near(risk(10.0, 10.0), 0.651_322, 1e-6, "risk");
}

#[test]
fn published_return_levels() {
    // (mean, standard deviation, T5, T10, T20, T50) of handbook values in EPW headers; rounding of all
    // of them explains up to 0.23 K.
    let rows = [
        (-45.8, 3.4, [-48.2, -50.2, -52.1, -54.5]),
        (-22.3, 3.8, [-25.1, -27.3, -29.5, -32.3]),
        (-11.8, 2.8, [-13.8, -15.5, -17.1, -19.2]),
        (-9.7, 4.1, [-12.7, -15.1, -17.5, -20.5]),
        (-7.6, 2.6, [-9.5, -11.0, -12.5, -14.4]),
    ];
    for (mean, deviation, want) in rows {
        for (n, want) in [5.0, 10.0, 20.0, 50.0].into_iter().zip(want) {
            near(mean - frequency_factor(n) * deviation, want, 0.23, "published level");
        }
    }
}

#[test]
fn valdez_winters() {
    let winters = valdez();
    assert_eq!(winters.count(), 83);
    near(winters.mean(), -21.410_843, 1e-5, "mean");
    near(winters.deviation(), 4.590_685, 1e-5, "deviation");
    for (n, want) in [
        (2.0, -20.6567),
        (5.0, -24.7136),
        (10.0, -27.3997),
        (20.0, -29.9762),
        (50.0, -33.3112),
        (100.0, -35.8104),
    ] {
        near(winters.level(n).celsius, want, 1e-3, "moments");
    }
    near(winters.level(10.0).standard_error_k, 1.052, 0.002, "standard error");
    near(winters.level(50.0).standard_error_k, 1.697, 0.002, "standard error");
    let (l1, l2, _) = winters.l_moments();
    near(l1, 21.410_843, 1e-3, "λ1");
    near(l2, 2.612_224, 1e-3, "λ2");
    near(winters.gumbel_l_level(10.0), -27.7164, 2e-3, "Gumbel, L-moments");
    near(winters.gumbel_l_level(50.0), -33.9405, 2e-3, "Gumbel, L-moments");
    let (location, scale, k) = winters.gev();
    near(location, 19.659, 0.01, "GEV location");
    near(scale, 4.457, 0.01, "GEV scale");
    near(k, 0.2226, 0.01, "GEV k");
    near(winters.gev_level(50.0), -31.280, 0.01, "GEV level");
    near(winters.trend_k_per_decade(), 0.96, 0.01, "trend");
    // A level's chance is its own: once in n winters.
    for n in [5.0, 20.0, 50.0] {
        near(winters.chance(winters.level(n).celsius), 1.0 / n, 1e-9, "chance");
    }
    let (mean, deviation) =
        from_levels(&[5.0, 10.0, 20.0].map(|n| (n, winters.level(n).celsius))).unwrap();
    near(mean, winters.mean(), 1e-9, "mean from levels");
    near(deviation, winters.deviation(), 1e-9, "deviation from levels");
}

#[test]
fn guard_rails() {
    let some = |count: usize, coldest: f64| {
        (0..count)
            .map(|at| WinterMinimum {
                ends: 1950 + at as i32,
                celsius: if at == 3 { coldest } else { -20.0 - (at % 4) as f64 },
            })
            .collect::<Vec<_>>()
    };
    assert_eq!(Winters::new(some(9, -25.0)).unwrap_err().found, 9);
    let few = Winters::new(some(12, -23.0)).unwrap().cautions(20.0);
    assert!(few.iter().any(|c| c.contains("only 12")), "{few:?}");
    let far = Winters::new(some(20, -23.0)).unwrap().cautions(50.0);
    assert!(far.iter().any(|c| c.contains("extrapolation")), "{far:?}");
    let record = Winters::new(some(30, -39.0)).unwrap().cautions(20.0);
    assert!(record.iter().any(|c| c.contains("is colder than the level")), "{record:?}");
    assert!(valdez().cautions(20.0).iter().any(|c| c.contains("1.0 K a decade")));
}

#[test]
fn valdez_days() {
    let import = imported(VALDEZ_DAILY, plain()).unwrap();
    let gathered = import.gathered();
    assert_eq!(gathered.used(), 10_176);
    for (below, want) in [(-10.0, 1939), (-20.0, 203), (-30.0, 3), (0.0, 5471), (-15.0, 745)] {
        assert_eq!(gathered.below(below), want, "days under {below}");
    }
    near(gathered.percentile(0.004).unwrap(), -24.4, 0.05, "0.4 %");
    near(gathered.percentile(0.01).unwrap(), -22.2, 0.05, "1 %");
    let (minima, _) = gathered.winters();
    let winters = Winters::new(minima).unwrap();
    assert_eq!(winters.count(), 26);
    near(winters.mean(), -25.119_23, 2e-3, "mean");
    near(winters.deviation(), 3.316_39, 2e-3, "deviation");
    near(winters.level(10.0).celsius, -29.446, 2e-3, "T10");
    near(winters.level(50.0).celsius, -33.716, 2e-3, "T50");
}

/// The slim hourly file as the EPW it was taken from.
fn northway() -> String {
    let mut out =
        String::from("LOCATION,Northway AP,AK,USA,TMY3,702910,62.96700,-141.9330,-9.0,522.0\r\n");
    for _ in 0..7 {
        out.push_str("X\r\n");
    }
    for line in NORTHWAY.lines().skip(1) {
        let f: Vec<&str> = line.split(',').collect();
        let zeros = ["0"; 13].join(",");
        out.push_str(&format!(
            "{},{},{},{},0,flags,{},{zeros},{},{},{zeros}\r\n",
            f[0], f[1], f[2], f[3], f[4], f[5], f[6]
        ));
    }
    out
}

#[test]
fn northway_hours() {
    let import = imported(&northway(), plain()).unwrap();
    let gathered = import.gathered();
    assert_eq!(gathered.used(), 8760);
    for (below, want) in
        [(0.0, 4868), (-10.0, 3232), (-20.0, 1689), (-30.0, 487), (-40.0, 157), (-39.99, 161)]
    {
        assert_eq!(gathered.below(below), want, "hours under {below}");
    }
    for (share, want) in [(0.004, -44.0), (0.01, -42.7), (0.02, -38.8)] {
        near(gathered.percentile(share).unwrap(), want, 0.05, "percentile");
    }
    let (site, cautions) = import.site("northway", "test").unwrap();
    let want = [
        -24.182, -19.796, -11.338, -5.736, 8.281, 12.672, 15.820, 11.435, 2.829, -2.988, -19.386,
        -22.747,
    ];
    for (found, want) in site.monthly.unwrap().mean_c.iter().zip(want) {
        near(*found, want, 1e-3, "monthly mean");
    }
    // No join of months lies in these spells.
    for (spell, want) in site.spell.iter().zip([-44.542, -44.000, -41.629, -40.748]) {
        near(spell.celsius, want, 1e-3, "spell");
    }
    near(site.wind.unwrap().deep_cold_m_s, 0.12, 0.03, "wind of the coldest 1 %");
    assert!(site.minima.once_in.is_empty());
    assert!(cautions.iter().any(|c| c.contains("typical year")));
    assert_eq!(site.elevation_m, Some(522.0));
}

#[test]
fn months_by_erbs() {
    // (T_m, σ_yr, N, T_b, σ_m, HDD, days): scipy on the same equations; the paper itself from memory.
    let rows = [
        (-10.0, 12.0, 31.0, -20.0, 2.5368, 11.149, 2.5681),
        (-5.0, 10.0, 31.0, 18.3, 2.2590, 722.513, 30.9427),
    ];
    for (mean, yearly, days, base, deviation, degree_days, below) in rows {
        let found = months::monthly_deviation(mean, yearly);
        near(found, deviation, 1e-3, "σ_m");
        near(months::degree_days(base, mean, found, days), degree_days, 1e-2, "degree-days");
        near(days * months::share_below(base, mean, found, days), below, 1e-3, "days");
    }
    for (hour, want) in [(6.0, -0.4513), (12.0, 0.3396), (15.0, 0.5245), (24.0, -0.2190)] {
        near(months::hour_shape(hour), want, 1e-4, "shape of the day");
    }
    // Hours under a base against the hours counted in the file: good to the coldest 1 to 2 %.
    let (site, _) = imported(&northway(), plain()).unwrap().site("n", "t").unwrap();
    let m = site.monthly.unwrap();
    for (base, counted, off) in [(0.0, 4868.0, 0.1), (-20.0, 1689.0, 0.15), (-30.0, 487.0, 0.2)] {
        let found = months::hours_below(base, &m.mean_c, &m.daily_range_k);
        near(found / counted, 1.0, off, "hours from months");
    }
}

#[test]
fn the_three_ghcn_layouts_hold_the_same_days() {
    let mut last: Option<(u64, Vec<u64>)> = None;
    for (text, layout) in
        [(DLY, Layout::GhcnDly), (ROWS, Layout::GhcnRows), (STATION, Layout::GhcnStation)]
    {
        let import = imported(text, plain()).unwrap();
        assert_eq!(import.layouts()[0].1, layout);
        // 59 values, one of them flagged (the flag is invented for this fixture).
        assert_eq!(dropped(&import, Drop::Flagged), 1);
        let gathered = import.gathered();
        assert_eq!(gathered.used(), 58);
        let counts: Vec<u64> = (0..40).map(|t| gathered.below(-f64::from(t))).collect();
        let (site, _) = import.site("x", "t").unwrap();
        // Two months tell the coldest day, and no percentile of a year.
        assert!(site.minima.percent_99_6.is_none() && site.below.is_empty());
        near(site.minima.record.unwrap().celsius, -33.3, 1e-9, "coldest");
        if let Some(last) = &last {
            assert_eq!(*last, (58, counts.clone()), "{layout:?}");
        }
        last = Some((58, counts));
    }
}

#[test]
fn the_order_tool_and_units() {
    let celsius = Options { unit: Some(Unit::Celsius), ..plain() };
    let import = imported(ORDER, celsius).unwrap();
    assert_eq!(import.layouts()[0].1, Layout::GhcnOrder);
    let gathered = import.gathered();
    assert_eq!((gathered.used(), gathered.below(-30.0), gathered.below(-35.0)), (93, 20, 5));
    near(gathered.percentile(0.0).unwrap(), -38.9, 1e-9, "coldest, 2020-02-08");
    let fahrenheit = "date,tmin\n2020-01-01,-62\n2020-01-02,5\n";
    let options = Options { unit: Some(Unit::Fahrenheit), ..plain() };
    let import = imported(fahrenheit, options).unwrap();
    near(import.gathered().percentile(1.0).unwrap(), -15.0, 0.01, "5 °F");
    let import = imported("date;tmin_f\n2020-01-01;-40,0\n", plain()).unwrap();
    near(import.gathered().percentile(0.0).unwrap(), -40.0, 1e-9, "-40 °F");
}

#[test]
fn epw_tmy3_and_isd() {
    let import = imported(EPW, plain()).unwrap();
    assert_eq!(import.gathered().used(), 48);
    let tmy3 = "702910,\"NORTHWAY AP\",AK,-9.0,62.967,-141.933,522\nDate (MM/DD/YYYY),Time (HH:MM),Dry-bulb (C),Wspd (m/s)\n01/01/1991,01:00,-42.7,0.0\n01/01/1991,24:00,-40.1,1.5\n01/02/1991,01:00,-9900,0\n";
    let import = imported(tmy3, plain()).unwrap();
    assert_eq!(import.layouts()[0].1, Layout::Tmy3);
    assert_eq!(import.gathered().used(), 2);
    assert_eq!(dropped(&import, Drop::Missing), 1);
    let isd = "2018 01 01 06  -150  -180 10132   270    31     0 -9999 -9999\n2018 01 01 07 -9999  -180 10132   270    31     0 -9999 -9999\n";
    let error = imported(isd, plain()).unwrap_err().to_string();
    assert!(error.contains("--utc-offset -9"), "{error}");
    let options = Options { utc_offset: Some(-9.0), ..plain() };
    let import = imported(isd, options).unwrap();
    assert_eq!(import.gathered().used(), 1);
    let (site, _) = import.site("x", "t").unwrap();
    // 06:00 UTC on New Year's Day is 21:00 of the old year there.
    assert_eq!(site.period.as_deref(), Some("2017 to 2017"));
}

fn dropped(import: &Import, why: Drop) -> u64 {
    import.dropped().get(&why).map_or(0, |dropped| dropped.count)
}

#[test]
fn hours_in_a_plain_table() {
    // The shipped file as it stands: months of different years, joined.
    let import = imported(NORTHWAY, plain()).unwrap();
    assert_eq!(import.layouts()[0].1, Layout::Hours);
    let (site, _) = import.site("n", "t").unwrap();
    let (same, _) = imported(&northway(), plain()).unwrap().site("n", "t").unwrap();
    assert_eq!(
        (site.minima, site.monthly, site.below, site.spell, site.wind, site.cold_day),
        (same.minima, same.monthly, same.below, same.spell, same.wind, same.cold_day)
    );
}

#[test]
fn part_of_a_year_is_not_taken_for_a_year() {
    let (site, cautions) = imported(EPW, plain()).unwrap().site("x", "t").unwrap();
    near(site.minima.record.unwrap().celsius, -46.1, 1.5, "coldest of 48 hours");
    assert!(site.minima.percent_99.is_none() && site.minima.percent_99_6.is_none());
    assert!(site.below.is_empty() && site.monthly.is_none() && site.wind.is_none());
    assert!(cautions.iter().any(|caution| caution.starts_with("under a year of values")));
    let day = "date,tmin_c\n2020-01-02,-5\n";
    let (site, _) = imported(day, plain()).unwrap().site("x", "t").unwrap();
    assert!(site.below.is_empty());
    // All of a year but its summer is no year either.
    let winter: String = VALDEZ_DAILY
        .lines()
        .filter(|line| !["-06-", "-07-", "-08-"].iter().any(|month| line.contains(month)))
        .map(|line| format!("{line}\n"))
        .collect();
    let (site, _) = imported(&winter, plain()).unwrap().site("x", "t").unwrap();
    assert!(site.minima.percent_99_6.is_none());
    assert!(site.winter.len() > 20);
}

#[test]
fn one_station_at_a_time() {
    let two = format!("{ROWS}USW00026616,19470205,TMIN,-300,,,0,2400\n");
    assert_eq!(
        imported(&two, plain()).unwrap_err().to_string(),
        "record:119: station `USW00026616` after station `USW00026442`; say which one, for example --station USW00026442"
    );
    let only = |id: &str| Options { station: Some(id.to_owned()), ..plain() };
    let import = imported(&two, only("USW00026442")).unwrap();
    assert_eq!((import.gathered().used(), dropped(&import, Drop::OtherStation)), (58, 1));
    let import = imported(&two, only("USW00026616")).unwrap();
    assert_eq!(import.gathered().used(), 1);
    // Nor a second one in a second file.
    let mut import = imported(ROWS, plain()).unwrap();
    let other = DLY.replace("USW00026442", "USW00026616");
    let error = import.file("second", other.as_bytes(), |_| ()).unwrap_err().to_string();
    assert!(error.starts_with("second:1: station `USW00026616` after"), "{error}");
    // The same station again adds nothing, and is no contradiction.
    let mut import = imported(ROWS, plain()).unwrap();
    import.file("second", DLY.as_bytes(), |_| ()).unwrap();
    assert_eq!((import.gathered().used(), dropped(&import, Drop::Duplicate)), (58, 58));
}

#[test]
fn a_unit_is_told_or_asked_for() {
    let told = |unit| Options { unit: Some(unit), ..plain() };
    let asked = "the unit of `TMIN` is not in the file; say --units c or --units f";
    assert_eq!(imported(ORDER, plain()).unwrap_err().to_string(), format!("record:1: {asked}"));
    assert_eq!(
        imported("date,tmin\n2001-01-01,-20\n", plain()).unwrap_err().to_string(),
        "record:1: the unit of `tmin` is not in the file; say --units c or --units f"
    );
    assert_eq!(
        imported("date,tmin_c\n2001-01-01,-20\n", told(Unit::Fahrenheit)).unwrap_err().to_string(),
        "record:1: `tmin_c` names another unit than --units; leave --units out"
    );
    assert_eq!(
        imported(ROWS, told(Unit::Fahrenheit)).unwrap_err().to_string(),
        "record:1: is read as GHCN-Daily, one value a row, tenths of °C, which is in °C; leave --units out"
    );
    // With attributes: integers are tenths of °C, or whole °F where that is told.
    let table = |values: &[&str]| {
        let mut text = String::from("\"STATION\",\"DATE\",\"TMIN\",\"TMIN_ATTRIBUTES\"\n");
        for (at, value) in values.iter().enumerate() {
            text += &format!("\"X\",\"2001-01-{:02}\",\"{value}\",\",,W\"\n", at + 1);
        }
        text
    };
    let coldest = |text: &str, options: Options| {
        imported(text, options).map(|import| import.gathered().percentile(0.0).unwrap())
    };
    near(coldest(&table(&["-333", "-20"]), plain()).unwrap(), -33.3, 1e-9, "tenths");
    near(coldest(&table(&["-41", "-20"]), told(Unit::Fahrenheit)).unwrap(), -40.56, 0.01, "°F");
    near(coldest(&table(&["-33.3", "-20.0"]), told(Unit::Celsius)).unwrap(), -33.3, 1e-9, "°C");
    let doubt = coldest(&table(&["-41", "-20"]), plain()).unwrap_err().to_string();
    assert_eq!(doubt, format!("record: {asked}"));
    let mixed = coldest(&table(&["-333", "-20.5"]), plain()).unwrap_err().to_string();
    assert_eq!(
        mixed,
        "record:3: `-20.5` has a decimal point, other than the values before it: tenths and whole degrees are mixed"
    );
    // Tenths taken for degrees: most are no temperature of the air.
    let tenths = "date,tmin_c\n2001-01-01,-200\n2001-01-02,-210\n2001-01-03,-333\n2001-01-04,-20\n";
    assert_eq!(
        imported(tenths, plain()).unwrap().site("x", "t").unwrap_err(),
        "3 readings lie outside -90 to 60 °C, 1 inside: the unit is not what the file or --units says (tenths of a degree?)"
    );
}

#[test]
fn damaged_records() {
    let cut = DLY.get(..100).unwrap();
    let import = imported(cut, plain()).unwrap();
    assert!(dropped(&import, Drop::CutLine) > 20);
    assert!(import.gathered().used() > 5);
    // A byte-order mark and CRLF.
    let marked = format!("\u{feff}{}", ROWS.replace('\n', "\r\n"));
    assert_eq!(imported(&marked, plain()).unwrap().gathered().used(), 58);
    // Days that are none, twice the same, not sorted, not possible.
    let odd: String =
        ["20230229,TMIN,-100", "20240229,TMIN,-100", "20240229,TMIN,-100", "20240101,TMIN,-2000"]
            .iter()
            .map(|row| format!("USW00026442,{row},,,0,\n"))
            .collect();
    let import = imported(&odd, plain()).unwrap();
    assert_eq!(import.gathered().used(), 1);
    for why in [Drop::NoDate, Drop::Duplicate, Drop::Impossible] {
        assert_eq!(dropped(&import, why), 1, "{why:?}");
    }
    assert_eq!(import.dropped()[&Drop::Duplicate].line, 3);
    // A maximum under the minimum: the minimum is kept, it may be the coldest there is.
    let maximum =
        "\"STATION\",\"DATE\",\"TMAX\",\"TMIN\"\n\"X\",\"1897-12-30\",\"-27.8\",\"-16.7\"\n";
    let import = imported(maximum, Options { unit: Some(Unit::Celsius), ..plain() }).unwrap();
    assert_eq!((import.gathered().used(), dropped(&import, Drop::MaximumUnderMinimum)), (1, 1));
    // Lines that end early are counted, and never half used.
    let short = |text: &str, line: usize, keep: usize| {
        let whole = text.lines().nth(line - 1).unwrap();
        text.replacen(whole, &whole[..keep], 1)
    };
    for (text, line, keep) in [(EPW, 12, 60), (STATION, 3, 60), (NORTHWAY, 3, 12), (ROWS, 4, 25)] {
        let whole = imported(text, plain()).unwrap().gathered().used();
        let import = imported(&short(text, line, keep), plain()).unwrap();
        assert_eq!(dropped(&import, Drop::CutLine), 1, "line {line} of {}", &text[..20]);
        assert_eq!(import.gathered().used(), whole - 1);
        assert_eq!(import.dropped()[&Drop::CutLine].line, line as u64);
    }
    let layouts = "record: is in no layout known here; it takes GHCN-Daily (.dly, by-year rows, per-station CSV, order-tool CSV), EPW, TMY3 CSV, ISD-Lite, a CSV with the columns date and tmin_c, or one of hours with year, month, day, hour and drybulb_c";
    for (text, want) in [
        (
            "date,tmin_c\n2020-01-02,-5\n2020-01-01,-6\n",
            "record:3: the day 2020-01-01 comes after a later one; sort the file by date",
        ),
        (
            "date,tmin_c\n2020-01-02,-5\n2020-01-02,-6\n",
            "record:3: the day 2020-01-02 stands twice in a row",
        ),
        (
            "date,tmin_c\n2020-13-02,-5\n",
            "record:2: `2020-13-02` is no date; write for example 1998-01-31",
        ),
        (
            "date,tmin_c\n1900-02-29,-5\n",
            "record:2: `1900-02-29` is no date; write for example 1998-01-31",
        ),
        (
            "date,tmin_c\n2020-01-02,cold\n",
            "record:2: `cold` is no temperature; write a plain number",
        ),
        (
            "date,tmin_c\n2020-01-02,nan\n",
            "record:2: `nan` is no temperature; write a plain number",
        ),
        (
            "USW00026442,19470205,TMIN,-300,,,0,2400\nUSW00026442,19470205,TMIN,-333,,,0,2400\n",
            "record:2: 1947-02-05 has two values, -30 °C and -33.3 °C; take one of them out",
        ),
        ("hello\nworld\n", layouts),
        ("", layouts),
    ] {
        assert_eq!(imported(text, plain()).unwrap_err().to_string(), want);
    }
    // Nonsense under a right header is given up early.
    let nonsense = format!("{ROWS}{}", "USW00026442,no\n".repeat(5000));
    let error = imported(&nonsense, plain()).unwrap_err().to_string();
    assert_eq!(
        error,
        "record:1119: 1001 lines are cut or malformed and 58 values good: this is no such record"
    );
    let long = "x".repeat(70_000);
    let error = imported(&long, plain()).unwrap_err().to_string();
    assert!(error.starts_with("record:1: is longer than 64 KiB"), "{error}");
    // Daily and hourly records do not mix.
    let mut import = imported(ROWS, plain()).unwrap();
    let error = import.file("second", EPW.as_bytes(), |_| ()).unwrap_err().to_string();
    assert!(error.contains("cannot be mixed"), "{error}");
}

#[test]
fn design_cycles() {
    let mean = |name: &str| {
        let site = BuiltIn.site(name).unwrap().unwrap();
        site.cold_day.unwrap().hours_c.iter().sum::<f64>() / 24.0
    };
    // AR 70-38, tables 3-9 and 3-10.
    near(mean("C1"), -26.9583, 1e-4, "mean of C1");
    near(mean("C2"), -42.125, 1e-4, "mean of C2");
    for (name, low) in [("C0", -19.0), ("C1", -32.0), ("C2", -46.0), ("C3", -51.0), ("C4", -57.0)] {
        let site = BuiltIn.site(name).unwrap().unwrap();
        assert_eq!(site.usual_minimum().unwrap().1.celsius, low, "AR 70-38, table 3-1");
    }
}

#[test]
fn the_shipped_sites_are_what_their_records_give() {
    let options = plain();
    let (fresh, _) =
        imported(VALDEZ_DAILY, options.clone()).unwrap().site("valdez-coast", "").unwrap();
    let shipped = BuiltIn.site("valdez-coast").unwrap().unwrap();
    assert_eq!(
        (fresh.minima, fresh.winter, fresh.below),
        (shipped.minima, shipped.winter, shipped.below)
    );
    let (fresh, _) = imported(&northway(), options).unwrap().site("northway-interior", "").unwrap();
    let shipped = BuiltIn.site("northway-interior").unwrap().unwrap();
    assert_eq!(
        (fresh.minima, fresh.cold_day, fresh.below),
        (shipped.minima, shipped.cold_day, shipped.below)
    );
}

#[test]
fn a_site_file_is_read_back_as_it_was_written() {
    for site in BuiltIn::all() {
        let text = site.write().unwrap();
        assert_eq!(Site::read(&site.name, &text).unwrap(), *site);
    }
}

#[test]
fn wrong_site_files() {
    let good = BuiltIn.site("skarn-ridge").unwrap().unwrap().write().unwrap();
    for (from, to, want) in [
        ("kind = \"invented\"", "kind = \"guessed\"", "x.toml:4:8: unknown variant `guessed`"),
        (
            "celsius = -38.0",
            "celsius = -30.0",
            "x.toml: minima.percent_99_6: -30 °C is warmer than the 99 % value, -34 °C; are the two swapped?",
        ),
        (
            "celsius = -44.2",
            "celsius = -442.0",
            "x.toml: temperature: -442 °C is not between -90 and 60 °C",
        ),
        ("format = 1", "format = 2", "x.toml: format: this program reads format 1, not 2"),
        ("latitude = 64.2", "lattitude = 64.2", "unknown field `lattitude`"),
    ] {
        assert!(good.contains(from), "{from}");
        let error = Site::read("x.toml", &good.replacen(from, to, 1)).unwrap_err().to_string();
        assert!(error.contains(want), "{error}");
    }
}

fn winters(minima: &[f64]) -> Winters {
    let rows = minima
        .iter()
        .enumerate()
        .map(|(at, celsius)| WinterMinimum { ends: 1950 + at as i32, celsius: *celsius })
        .collect();
    Winters::new(rows).unwrap()
}

proptest! {
    #[test]
    fn a_colder_record_never_gives_a_warmer_level(
        minima in prop::collection::vec(-50.0..-5.0_f64, 10..60),
        shift in 0.0..10.0_f64,
        n in 2.0..100.0_f64,
    ) {
        let colder: Vec<f64> = minima.iter().map(|t| t - shift).collect();
        prop_assert!(winters(&colder).level(n).celsius <= winters(&minima).level(n).celsius + 1e-9);
    }

    #[test]
    fn a_winter_colder_than_all_never_warms_the_level(
        minima in prop::collection::vec(-50.0..-5.0_f64, 10..60),
        by in 0.1..10.0_f64,
        n in 2.0..100.0_f64,
    ) {
        let mut more = minima.clone();
        more.push(minima.iter().copied().fold(f64::INFINITY, f64::min) - by);
        prop_assert!(winters(&more).level(n).celsius <= winters(&minima).level(n).celsius + 1e-9);
    }

    #[test]
    fn percentiles_and_levels_are_in_order(
        minima in prop::collection::vec(-50.0..-5.0_f64, 10..60),
        days in prop::collection::vec(-500..100_i32, 30..200),
    ) {
        let winters = winters(&minima);
        let levels: Vec<f64> = [2.0, 5.0, 10.0, 20.0, 50.0].map(|n| winters.level(n).celsius).to_vec();
        prop_assert!(levels.windows(2).all(|pair| pair[1] <= pair[0]));
        let rows: String = days
            .iter()
            .enumerate()
            .map(|(at, t)| format!("USW00026442,20{:02}{:02}{:02},TMIN,{t},,,0,\n", at / 300, at % 300 / 25 + 1, at % 25 + 1))
            .collect();
        let import = imported(&rows, plain()).unwrap();
        let found: Vec<f64> = [0.0, 0.004, 0.01, 0.02, 0.5, 1.0]
            .map(|share| import.gathered().percentile(share).unwrap())
            .to_vec();
        prop_assert!(found.windows(2).all(|pair| pair[0] <= pair[1]), "{:?}", found);
    }
}

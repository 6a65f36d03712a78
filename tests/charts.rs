//! scratch
use coldsump::report::chart;
use coldsump::{
    advice,
    case::{CaseFile, Units},
};

#[test]
fn show() {
    let Ok(dir) = std::env::var("CHART_OUT") else { return };
    for name in [
        "skarn-loader",
        "hollow-skid",
        "north-bench-classes",
        "parked-warm-loader",
        "tarn-backhoe-us",
        "bio-forwarder",
    ] {
        let text = std::fs::read_to_string(format!("examples/{name}.toml")).unwrap();
        let case = CaseFile::read(name, &text).check().unwrap();
        let units = case.units;
        let found: Vec<_> = case.oils.iter().map(|oil| advice::assess(&case, oil)).collect();
        let oils: Vec<_> = case.oils.iter().zip(&found).collect();
        let mut charts = vec![
            ("all", chart::viscosity(&case, &oils, units)),
            ("one", chart::viscosity(&case, &oils[..1], units)),
        ];
        let (oil, one) = oils[0];
        if let Ok(c) = chart::inlet(&case, oil, one, units) {
            charts.push(("inlet", c));
        }
        if let Ok(c) = chart::speed(&case, oil, one, units) {
            charts.push(("speed", c));
        }
        let night = advice::night(&case, oil, one);
        if let Some(c) = chart::overnight(&case, one, &night, units) {
            charts.push(("night", c));
        }
        for (what, c) in charts {
            std::fs::write(format!("{dir}/{name}-{what}.svg"), chart::svg(&c)).unwrap();
            std::fs::write(
                format!("{dir}/{name}-{what}.txt"),
                format!(
                    "{}\n\n{}\n\n{}",
                    chart::terminal(&c, 80, 20, false),
                    chart::terminal(&c, 80, 20, true),
                    chart::terminal(&c, 40, 12, false)
                ),
            )
            .unwrap();
        }
    }
    let _ = Units::Us;
}

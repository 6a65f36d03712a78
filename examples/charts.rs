//! Charts of a case: `cargo run --example charts -- examples/skarn-loader.toml [DIRECTORY]` prints the
//! viscosity of its oils, and writes every chart as SVG to a directory where one is named.

use coldsump::{advice, case::CaseFile, report::chart};

fn main() -> Result<(), Box<dyn std::error::Error>> {
    let mut args = std::env::args().skip(1);
    let path = args.next().unwrap_or_else(|| "examples/skarn-loader.toml".to_owned());
    let case = CaseFile::read(&path, &std::fs::read_to_string(&path)?).check()?;
    let found: Vec<_> = case.oils.iter().map(|oil| advice::assess(&case, oil)).collect();
    let oils: Vec<_> = case.oils.iter().zip(&found).collect();
    let units = case.units;

    let all = chart::viscosity(&case, &oils, units);
    print!("{}", chart::terminal(&all, 80, 20, false));

    let Some(directory) = args.next() else { return Ok(()) };
    let mut charts = vec![("oils".to_owned(), all)];
    for (at, (oil, found)) in oils.iter().enumerate() {
        let night = advice::night(&case, oil, found);
        let drawn = [
            ("viscosity", Some(chart::viscosity(&case, &[(*oil, *found)], units))),
            ("inlet", chart::inlet(&case, oil, found, units).ok()),
            ("speed", chart::speed(&case, oil, found, units).ok()),
            ("night", chart::overnight(&case, found, &night, units)),
        ];
        for (what, chart) in drawn {
            charts.extend(chart.map(|chart| (format!("{}-{what}", at + 1), chart)));
        }
    }
    for (name, chart) in charts {
        std::fs::write(format!("{directory}/{name}.svg"), chart::svg(&chart))?;
    }
    Ok(())
}

//! Climates as documents.

use super::document::{Block, Document, Line};
use super::units::{Shown, fixed};
use crate::case::Units;
use crate::climate::extremes::{Winters, frequency_factor, from_levels};
use crate::climate::{Kind, Reading, Site};

/// The climates there are, one a line.
#[must_use]
pub fn climates(sites: &[Site]) -> Document {
    let shown = Shown(Units::Metric);
    let rows = sites
        .iter()
        .map(|site| {
            let minimum = site.usual_minimum().map_or_else(
                || Line::from("-"),
                |(wish, found)| {
                    Line::from(format!("{} ({wish})", shown.temperature(found.celsius)))
                },
            );
            vec![
                Line::from(site.name.clone()),
                Line::from(site.title.clone()),
                Line::from(site.kind.id()),
                minimum,
            ]
        })
        .collect();
    Document {
        blocks: vec![
            Block::Title(Line::from("Climates")),
            Block::Table {
                head: ["name", "what it is", "kind", "minimum where a case names it"]
                    .map(str::to_owned)
                    .to_vec(),
                rows,
            },
            Block::Text(Line::from(
                "A case names one as `climate = \"C2\"`; figures in the case win over it.",
            )),
        ],
    }
}

/// One climate, with temperatures in °C marked in its chart, each with a word.
#[must_use]
pub fn climate(site: &Site, marks: &[(String, f64)], units: Units) -> Document {
    let shown = Shown(units);
    let mut pairs = vec![
        ("name".to_owned(), Line::from(site.name.clone())),
        (
            "kind".to_owned(),
            match site.kind {
                Kind::Invented => Line::new().strong("invented, for demonstration: no such place"),
                Kind::DesignClass => Line::from("a published category of cold, not a place"),
                Kind::Observed => Line::from("computed from records"),
            },
        ),
    ];
    let mut put = |name: &str, line: Option<Line>| {
        if let Some(line) = line {
            pairs.push((name.to_owned(), line));
        }
    };
    put("period", site.period.clone().map(Line::from));
    put("elevation", site.elevation_m.map(|m| Line::from(shown.elevation(m))));
    put(
        "place",
        site.place.map(|at| {
            Line::from(format!("{}° N, {}° E", fixed(at.latitude, 3), fixed(at.longitude, 3)))
        }),
    );
    put("source", Some(Line::from(site.source.clone())));
    put("licence", Some(Line::from(site.licence.clone())));
    put("note", site.note.clone().map(Line::from));
    let mut blocks = vec![Block::Title(Line::from(site.title.clone())), Block::Pairs(pairs)];

    blocks.push(Block::Heading(Line::from("How cold")));
    let minima = &site.minima;
    let reading = |reading: &Reading| {
        Line::from(shown.temperature(reading.celsius)).faint(format!("  {}", reading.how))
    };
    let mut rows: Vec<(String, Line)> = [
        ("class", &minima.class),
        ("record", &minima.record),
        ("99.6 %", &minima.percent_99_6),
        ("99 %", &minima.percent_99),
    ]
    .into_iter()
    .filter_map(|(name, one)| Some((name.to_owned(), reading(one.as_ref()?))))
    .collect();
    rows.extend(minima.once_in.iter().map(|level| {
        (
            format!("once in {} winters", fixed(level.winters, 0)),
            Line::from(format!(
                "{} ± {}",
                shown.temperature(level.celsius),
                shown.difference(level.standard_error_k)
            ))
            .faint(format!("  {}", level.how)),
        )
    }));
    if let Some(wind) = &site.wind {
        rows.push((
            "wind".to_owned(),
            Line::from(format!(
                "{} with deep cold, {} round the 99 % value",
                shown.wind(wind.deep_cold_m_s),
                shown.wind(wind.at_99_m_s)
            ))
            .faint(format!("  {}", wind.how)),
        ));
    }
    blocks.push(Block::Pairs(rows));
    if let Some(lines) = winters(site, marks, shown) {
        blocks.push(Block::Heading(Line::from("Winter minima against chance")));
        blocks.push(Block::Drawing(lines));
        blocks.push(Block::Text(Line::from(
            "o a winter on record, . the Gumbel line by moments; across: once in so many winters.",
        )));
    }
    if let Some(day) = &site.cold_day {
        blocks.push(Block::Heading(Line::from("A cold day, local standard time")));
        let cell = |hour: usize| {
            day.hours_c
                .get(hour - 1)
                .map_or_else(String::new, |t| format!("{hour:02}:00 {}", shown.temperature(*t)))
        };
        let rows = (1..=6)
            .map(|row| (0..4).map(|column| Line::from(cell(row + 6 * column))).collect())
            .collect();
        blocks.push(Block::Table { head: vec![String::new(); 4], rows });
        blocks.push(Block::Text(Line::from(day.how.clone())));
    }
    if let Some(months) = &site.monthly {
        blocks.push(Block::Heading(Line::from("Months")));
        let names =
            ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];
        let rows = names
            .iter()
            .zip(months.mean_c.iter().zip(&months.daily_range_k))
            .map(|(name, (mean, range))| {
                vec![
                    Line::from(*name),
                    Line::from(shown.temperature(*mean)),
                    Line::from(shown.difference(*range)),
                ]
            })
            .collect();
        blocks.push(Block::Table {
            head: ["month", "mean", "daily range"].map(str::to_owned).to_vec(),
            rows,
        });
    }
    if !site.below.is_empty() {
        blocks.push(Block::Heading(Line::from("How often colder")));
        let hour = site.start_hour.map_or_else(String::new, |hour| format!(" at {hour:02}:00"));
        let count = |value: Option<f64>| value.map_or("-".to_owned(), |value| fixed(value, 0));
        let rows = site
            .below
            .iter()
            .map(|below| {
                vec![
                    Line::from(shown.temperature(below.celsius)),
                    Line::from(count(below.hours)),
                    Line::from(count(below.mornings)),
                ]
            })
            .collect();
        blocks.push(Block::Table {
            head: vec![
                "colder than".to_owned(),
                "hours a year".to_owned(),
                format!("mornings a year{hour}"),
            ],
            rows,
        });
    }
    Document { blocks }
}

/// Columns and rows of the chart.
const COLUMNS: usize = 58;
const ROWS: usize = 16;
/// Return periods marked below the chart, winters.
const TICKS: [f64; 6] = [1.5, 2.0, 5.0, 10.0, 20.0, 50.0];

/// Winter minima over the frequency factor of their chance, the line, and marks across.
fn winters(site: &Site, marks: &[(String, f64)], shown: Shown) -> Option<Vec<String>> {
    let fitted = Winters::new(site.winter.clone()).ok();
    let (mean, deviation) = match &fitted {
        Some(winters) => (winters.mean(), winters.deviation()),
        None => {
            let levels: Vec<(f64, f64)> =
                site.minima.once_in.iter().map(|l| (l.winters, l.celsius)).collect();
            from_levels(&levels)?
        }
    };
    let line = |factor: f64| mean - factor * deviation;
    let (left, right) = (frequency_factor(1.1), frequency_factor(60.0));
    // Plotting position of the coldest: (rank - 0.44)/(N + 0.12), Gringorten 1963.
    let mut minima: Vec<f64> = site.winter.iter().map(|winter| winter.celsius).collect();
    minima.sort_by(f64::total_cmp);
    let n = minima.len() as f64;
    let points: Vec<(f64, f64)> = minima
        .iter()
        .enumerate()
        .map(|(rank, t)| (frequency_factor((n + 0.12) / (rank as f64 + 0.56)), *t))
        .collect();
    let temperatures = points
        .iter()
        .map(|(_, t)| *t)
        .chain([line(left), line(right)])
        .chain(marks.iter().map(|(_, t)| *t));
    let (coldest, warmest) = temperatures
        .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), t| (low.min(t), high.max(t)));
    let (bottom, top) = ((coldest / 5.0).floor() * 5.0, (warmest / 5.0).ceil() * 5.0);
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "inside the chart")]
    let place =
        |share: f64, cells: usize| (share.clamp(0.0, 1.0) * (cells - 1) as f64).round() as usize;
    let row = |t: f64| place((top - t) / (top - bottom), ROWS);
    let column = |factor: f64| place((factor - left) / (right - left), COLUMNS);
    let mut grid = vec![vec![' '; COLUMNS]; ROWS];
    let mut put = |column: usize, row: usize, c: char| {
        if let Some(cell) = grid.get_mut(row).and_then(|cells| cells.get_mut(column)) {
            *cell = c;
        }
    };
    for (_, t) in marks {
        (0..COLUMNS).for_each(|column| put(column, row(*t), '-'));
    }
    for at in 0..COLUMNS {
        let factor = left + (right - left) * at as f64 / (COLUMNS - 1) as f64;
        put(at, row(line(factor)), '.');
    }
    for (factor, t) in points {
        put(column(factor), row(t), 'o');
    }
    let mut lines: Vec<String> = grid
        .into_iter()
        .enumerate()
        .map(|(at, cells)| {
            let t = top - (top - bottom) * at as f64 / (ROWS - 1) as f64;
            let label =
                if at % 3 == 0 || at == ROWS - 1 { shown.temperature(t) } else { String::new() };
            let cells: String = cells.into_iter().collect();
            let named: Vec<&str> = marks
                .iter()
                .filter(|(_, t)| row(*t) == at)
                .map(|(name, _)| name.as_str())
                .collect();
            format!("{label:>10} |{cells} {}", named.join(", "))
        })
        .collect();
    lines.push(format!("{:>10} +{}", "", "-".repeat(COLUMNS)));
    let mut ticks = vec![' '; COLUMNS + 4];
    for tick in TICKS {
        for (offset, c) in fixed(tick, usize::from(tick < 2.0)).chars().enumerate() {
            if let Some(cell) = ticks.get_mut(column(frequency_factor(tick)) + offset) {
                *cell = c;
            }
        }
    }
    lines.push(format!("{:>10}  {}", "", ticks.into_iter().collect::<String>()));
    Some(lines)
}

//! Climates as documents.

use super::document::{Block, Document, Line};
use super::units::{Shown, fixed};
use crate::case::Units;
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

/// One climate.
#[must_use]
pub fn climate(site: &Site, units: Units) -> Document {
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

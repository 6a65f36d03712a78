//! One oil over temperature, as a document and as CSV.

use super::document::{Block, Document, Line};
use super::units::{Shown, fixed};
use super::wire::six;
use crate::case::Units;
use crate::oil::{Class, Oil, reported, saybolt};
use std::fmt::Write;

/// One oil over temperatures in °C, as a document.
#[must_use]
pub fn oil_points(oil: &Oil, temperatures: &[f64], units: Units) -> Document {
    let shown = Shown(units);
    let mut about = Line::from(format!("base {}", oil.base()));
    if let Some(index) = oil.viscosity_index() {
        about = about
            .words(", viscosity index ")
            .figure(fixed(reported(index), 0), "/viscosity_index_reported");
    }
    about = match oil.pour_point() {
        Some(pour) => about
            .words(", pour point ")
            .figure(shown.temperature(pour.as_celsius()), "/pour_point_c"),
        None => about.words(", pour point not given"),
    };
    let rows = temperatures
        .iter()
        .enumerate()
        .map(|(row, t)| {
            let at = oil.estimate(*t);
            let figure =
                |text: String, key: &str| Line::new().figure(text, format!("/points/{row}/{key}"));
            let viscosity = |nu: Option<f64>, key: &str| {
                nu.map_or_else(
                    || Line::from("-"),
                    |nu| figure(shown.viscosity(nu).replace(" mm²/s", ""), key),
                )
            };
            let rho = oil.bulk().density(*t);
            let sus =
                at.expected.filter(|nu| *nu >= 1.8).map(|nu| saybolt::seconds(nu, t * 1.8 + 32.0));
            vec![
                figure(shown.temperature(*t), "temperature_c"),
                viscosity(at.low, "low_mm2_s"),
                viscosity(at.expected, "expected_mm2_s"),
                viscosity(at.high, "high_mm2_s"),
                viscosity(sus, "saybolt_s"),
                figure(fixed(rho, 0), "density_kg_m3"),
                Line::from(at.reach.words()),
            ]
        })
        .collect();
    // What a class promises is not a measured oil, and says so.
    if let Some(class) = oil.class().filter(|_| oil.class_only()).and_then(Class::named) {
        about = about.words(format!(
            ". Known by its class alone: {} [{}]. {}",
            class.source(),
            class.read().tag(),
            class.note()
        ));
    }
    Document {
        blocks: vec![
            Block::Title(Line::from(oil.name())),
            Block::Text(about),
            Block::Table {
                head: ["at", "thin edge", "expected", "thick edge", "SUS", "kg/m³", "reach"]
                    .map(str::to_owned)
                    .to_vec(),
                rows,
            },
            Block::Text(Line::from(
                "Viscosities in mm²/s, ASTM D341 with the likely range round it (edges: this \
                 project's judgement); SUS by ASTM D2161 from the expected viscosity. No number \
                 near or below the pour point: the oil may gel.",
            )),
        ],
    }
}

/// One oil over temperatures in °C as CSV, with the head line if asked for. Keys and units as in
/// the JSON; an empty cell is no figure.
#[must_use]
pub fn oil_points_csv(oil: &Oil, temperatures: &[f64], head: bool) -> String {
    let mut out = String::new();
    if head {
        out.push_str("name,temperature_c,low_mm2_s,expected_mm2_s,high_mm2_s,dynamic_mpa_s,reach,density_kg_m3,specific_heat_j_kg_k,conductivity_w_m_k,saybolt_s\n");
    }
    let cell = |value: Option<f64>| value.map_or(String::new(), |value| six(value).to_string());
    let name = if oil.name().contains([',', '"', '\n', '\r']) {
        format!("\"{}\"", oil.name().replace('"', "\"\""))
    } else {
        oil.name().to_owned()
    };
    for t in temperatures {
        let at = oil.estimate(*t);
        let rho = oil.bulk().density(*t);
        let sus =
            at.expected.filter(|nu| *nu >= 1.8).map(|nu| saybolt::seconds(nu, t * 1.8 + 32.0));
        // Writing to a String cannot fail.
        let _ = writeln!(
            out,
            "{name},{},{},{},{},{},{},{},{},{},{}",
            six(*t),
            cell(at.low),
            cell(at.expected),
            cell(at.high),
            cell(at.expected.map(|nu| nu * rho / 1000.0)),
            at.reach.id(),
            six(rho),
            six(oil.bulk().specific_heat(*t)),
            six(oil.bulk().conductivity(*t)),
            cell(sus),
        );
    }
    out
}

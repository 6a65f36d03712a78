//! Reports: documents with words and units, their text, and the JSON contract.
//!
//! Invariants: nothing below this room knows colour or terminal; the JSON structure lives only in
//! `wire`; every figure in a document carries the JSON pointer of its value.

mod advice;
mod assessment;
mod card;
pub mod chart;
mod climate;
mod compare;
mod document;
mod fleet;
mod html;
mod keys;
mod markdown;
mod oil;
mod schema;
mod text;
mod units;
mod wire;

pub use advice::advice;
pub use assessment::assessment;
pub use card::{Card, card};
pub use climate::{climate, climates};
pub use compare::compare;
pub use document::{Block, Document, Line, Span, Tone, printable};
pub use fleet::{FLEET_HEADER, SweepRow, fleet, fleet_fault, fleet_row, sweep};
pub use html::{card_lines, html, page};
pub use keys::key_list;
pub use markdown::markdown;
pub use oil::{oil_points, oil_points_csv};
pub use schema::{ADVICE_SCHEMA, case_schema};
pub use text::{Look, ascii, text};
pub use units::Shown;
pub use wire::{advice_json, assessment_json, oil_points_json, six};

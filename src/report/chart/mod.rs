//! Charts: one model, drawn as SVG, in braille or in ASCII.
//!
//! Limits are lines with words on them; no area is good or bad by its look. All prints in black and
//! white: dashes, numbers and words tell lines apart.
//!
//! Invariants: a curve ends where its model does (no viscosity below the pour point + 5 K unless it
//! was measured there); a renderer knows no physics, the model knows no renderer; a label never lies
//! over an axis or another label: what finds no place is said in the key under the chart.

mod axis;
mod clip;
mod inlet;
mod layout;
mod model;
mod overnight;
mod place;
mod svg;
mod terminal;
mod viscosity;

pub use axis::{Axis, Scale, Tick};
pub use inlet::{inlet, speed};
pub use model::{Chart, Level, Series, Shape};
pub use overnight::overnight;
pub use svg::{esc, svg};
pub use terminal::terminal;
pub use viscosity::viscosity;

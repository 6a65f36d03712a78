//! Cold-start figures for hydraulic machines: how thick the oil is on the coldest morning, from
//! which temperature the pump may be turned, loaded lightly and loaded fully, and what it takes to
//! warm the tank there.
//!
//! ```
//! use coldsump::{advice, case::CaseFile};
//!
//! let file = CaseFile::read("loader.toml", r#"
//!     format = 1
//!     site.minimum_temperature = "-25 °C"
//!     pump.kind = "axial-piston"
//!     pump.displacement = "75 cm³"
//!     suction = { bore = "2 in", length = "1.5 m", fittings = { "elbow-90-long" = 2 } }
//!     reservoir.oil_volume = "200 L"
//!     duty.time_to_warm = "4 h"
//!     oil = [{ class = "HV 32", pour_point = "-39 °C",
//!              viscosity = { "40 °C" = "32 cSt", "100 °C" = "6.3 cSt" } }]
//! "#);
//! let case = file.check()?; // all faults at once, each with file, line and column
//! let found = advice::assess(&case, &case.oils[0]);
//! let floor = found.start_floor.at_c.expect("this pump can be started");
//! println!("do not turn the pump below {floor:.0} °C");
//! assert!(found.heating.needed_w.is_some_and(|watts| watts > 100.0));
//! # Ok::<(), coldsump::case::Faults>(())
//! ```
//!
//! In reading order: [`case`] (a machine at a site, read and checked), [`advice`] (limits, floors,
//! heating, verdict), and what they stand on: [`climate`], [`oil`], [`pump`], [`heat`], [`air`],
//! [`quantity`],
//! [`source`]. `report` (feature `cli`, on by default) makes documents and JSON of the answers.
//!
//! The library opens no file, prints nothing and has no clock: the same case gives the same answer.

#![cfg_attr(
    not(test),
    warn(
        clippy::unwrap_used,
        clippy::expect_used,
        clippy::panic,
        clippy::print_stdout,
        clippy::print_stderr
    )
)]

pub mod advice;
pub mod air;
pub mod case;
pub mod climate;
#[cfg(feature = "cli")]
pub mod fleet;
pub mod heat;
#[cfg(feature = "cli")]
pub mod interview;
pub mod oil;
pub mod pump;
pub mod quantity;
#[cfg(feature = "cli")]
pub mod report;
mod solve;
pub mod source;
mod words;

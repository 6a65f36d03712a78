//! The bore of a suction hose from its outside diameter.

/// (outside, inside) in mm of one- and two-wire and textile suction hose as sold, smallest first;
/// common practice, no source: wall 6 to 8 mm.
const SIZES: [(f64, f64); 11] = [
    (18.0, 12.7),
    (22.0, 15.9),
    (26.0, 19.0),
    (32.0, 25.4),
    (40.0, 31.8),
    (47.0, 38.1),
    (61.0, 50.8),
    (74.0, 63.5),
    (87.0, 76.2),
    (100.0, 88.9),
    (114.0, 101.6),
];

/// The bore in mm of the hose whose outside diameter in mm comes nearest, not over the one measured by
/// more than 3 mm; `None` where no hose comes near.
///
/// # Example
/// ```
/// assert_eq!(coldsump::interview::bore_of(62.0), Some(50.8));
/// assert_eq!(coldsump::interview::bore_of(300.0), None);
/// ```
#[must_use]
pub fn bore_of(outside_mm: f64) -> Option<f64> {
    SIZES
        .iter()
        .min_by(|a, b| (a.0 - outside_mm).abs().total_cmp(&(b.0 - outside_mm).abs()))
        .filter(|(outside, _)| (outside - outside_mm).abs() <= 6.5)
        .map(|(_, inside)| *inside)
}

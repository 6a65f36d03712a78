//! Unit texts compared the way people type them.
//!
//! Invariant: a slip of case is forgiven only where it cannot name another unit: `kw` is kW, but
//! `mPa` is never MPa.

use super::units::{Dimension, Unit};

/// White space of any width, and the marks without width that come along when text is pasted.
pub(super) fn is_blank(c: char) -> bool {
    c.is_whitespace() || matches!(c, '\u{200B}' | '\u{200E}' | '\u{200F}' | '\u{2060}' | '\u{FEFF}')
}

/// The text without [blanks](is_blank) at its ends.
pub(super) fn trim(text: &str) -> &str {
    text.trim_matches(is_blank)
}

/// One sequence of characters for all ways to type a unit: no spaces, plain digits for raised ones,
/// one sign for a product. `mm²/s` equals `mm2/s` and `mm^2/s`, `W/(m·K)` equals `W/(m*K)`.
fn folded(text: &str) -> impl Iterator<Item = char> + '_ {
    text.chars().flat_map(|c| {
        let (first, second) = match c {
            '^' => (None, None),
            c if is_blank(c) => (None, None),
            '²' => (Some('2'), None),
            '³' => (Some('3'), None),
            '¹' => (Some('1'), None),
            '⁻' | '−' | '‐' | '‑' => (Some('-'), None),
            '·' | '⋅' | '∙' | '•' | '*' | '×' => (Some('.'), None),
            '∕' | '⁄' => (Some('/'), None),
            'º' | '˚' => (Some('°'), None),
            '“' | '”' | '″' => (Some('"'), None),
            '‘' | '’' | '′' => (Some('\''), None),
            '℃' => (Some('°'), Some('C')),
            '℉' => (Some('°'), Some('F')),
            // The sign for kelvin, as against the letter.
            '\u{212A}' => (Some('K'), None),
            c => (Some(c), None),
        };
        first.into_iter().chain(second)
    })
}

/// The unit a text names: as it stands, else but for a slip of case. A full stop behind an
/// abbreviation (`gal.`) does not count.
pub(super) fn find(dimension: &Dimension, text: &str) -> Option<&'static Unit> {
    exactly(dimension, text).or_else(|| but_for_case(dimension, text))
}

/// The unit a text names as it stands.
pub(super) fn exactly(dimension: &Dimension, text: &str) -> Option<&'static Unit> {
    let text = without_stop(text);
    let same = |spelling: &&str| folded(spelling).eq(folded(text));
    dimension.units.iter().find(|unit| unit.spellings.iter().any(same))
}

/// The one unit a text names but for a slip of case; `None` where there are two.
fn but_for_case(dimension: &Dimension, text: &str) -> Option<&'static Unit> {
    let wanted = caseless(without_stop(text));
    let same = |spelling: &&str| caseless(spelling) == wanted;
    let mut found = dimension.units.iter().filter(|unit| unit.spellings.iter().any(same));
    found.next().filter(|_| found.next().is_none())
}

fn without_stop(text: &str) -> &str {
    let text = trim(text);
    text.strip_suffix('.').unwrap_or(text)
}

/// Small letters, except an `m` or `M` that says milli or mega.
fn caseless(text: &str) -> String {
    let text: String = folded(text).collect();
    let mut in_word = false;
    text.char_indices()
        .map(|(at, c)| {
            let kept = matches!(c, 'm' | 'M')
                && !in_word
                && takes_prefix(text.get(at + 1..).unwrap_or(""));
            in_word = c.is_alphabetic();
            if kept { c } else { c.to_ascii_lowercase() }
        })
        .collect()
}

/// `true` where the rest of the word is a unit of which both milli and mega are in use. Nobody means
/// a megametre: `50 MM` is a slip.
fn takes_prefix(rest: &str) -> bool {
    let end = rest.find(|c: char| !c.is_alphabetic()).unwrap_or(rest.len());
    let word = rest.get(..end).unwrap_or(rest).to_ascii_lowercase();
    ["pa", "pas", "bar", "a", "v", "w", "l"].contains(&word.as_str())
}

#[cfg(test)]
mod tests {
    use super::super::units::{DYNAMIC_VISCOSITY, PRESSURE, dimensions};
    use super::{caseless, exactly, find};

    #[test]
    fn every_spelling_names_one_unit_even_without_regard_to_case() {
        for dimension in dimensions() {
            for (at, unit) in dimension.units.iter().enumerate() {
                for spelling in unit.spellings {
                    for other in dimension.units.iter().skip(at + 1) {
                        let clash =
                            other.spellings.iter().find(|s| caseless(s) == caseless(spelling));
                        assert_eq!(clash, None, "{spelling} in {}", dimension.name);
                    }
                    assert!(
                        exactly(dimension, spelling).is_some_and(|found| std::ptr::eq(found, unit)),
                        "{spelling} in {}",
                        dimension.name
                    );
                }
            }
        }
    }

    #[test]
    fn milli_and_mega_are_never_mixed_up() {
        for text in ["mPa", "mpa", "MBAR", "Mbar"] {
            assert!(find(&PRESSURE, text).is_none(), "{text}");
        }
        for text in ["MPa·s", "MPas", "MPA·S"] {
            assert!(find(&DYNAMIC_VISCOSITY, text).is_none(), "{text}");
        }
        assert!(find(&PRESSURE, "Mpa").is_some_and(|unit| unit.factor == 1e3));
        assert!(find(&PRESSURE, "MPA").is_some_and(|unit| unit.factor == 1e3));
        assert!(find(&PRESSURE, "mBar").is_some_and(|unit| unit.factor == 0.1));
        assert!(find(&DYNAMIC_VISCOSITY, "mpas").is_some_and(|unit| unit.factor == 1.0));
    }
}

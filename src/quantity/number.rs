//! Numbers in text: read as people type them, shown without needless digits.

/// A number split off the front of a text, with the rest of it.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(crate) struct Leading<'a> {
    pub(crate) value: f64,
    pub(crate) rest: &'a str,
}

/// Why no number could be split off.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum NoNumber {
    /// The text does not start with a number.
    Missing,
    /// `nan`, `inf` or a number beyond what can be held.
    NotFinite,
    /// A comma before exactly three digits: decimal comma or thousands?
    AmbiguousComma,
}

/// Splits a number off the front: decimal point or comma, ASCII or Unicode minus, optional exponent.
pub(crate) fn leading(text: &str) -> Result<Leading<'_>, NoNumber> {
    let text = text.trim();
    let lower = text.to_ascii_lowercase();
    let unsigned = lower.trim_start_matches(['+', '-', '−', '–']);
    if unsigned.starts_with("nan") || unsigned.starts_with("inf") {
        return Err(NoNumber::NotFinite);
    }
    let mut plain = String::new();
    let mut end = 0;
    let mut digits = 0_usize;
    let mut comma_at: Option<usize> = None;
    let mut separators = 0;
    for (at, c) in text.char_indices() {
        match c {
            '+' if at == 0 => {}
            '-' | '−' | '–' if at == 0 => plain.push('-'),
            '0'..='9' => {
                digits += 1;
                plain.push(c);
            }
            '.' | ',' if separators == 0 => {
                separators += 1;
                if c == ',' {
                    comma_at = Some(digits);
                }
                plain.push('.');
            }
            _ => break,
        }
        end = at + c.len_utf8();
    }
    if digits == 0 {
        return Err(NoNumber::Missing);
    }
    if comma_at.is_some_and(|before| digits - before == 3 && (1..=3).contains(&before))
        && !plain.trim_start_matches('-').starts_with('0')
    {
        return Err(NoNumber::AmbiguousComma);
    }
    let (mut value_text, mut rest) = (plain, text.get(end..).unwrap_or_default());
    if let Some((exponent, after)) = exponent(rest) {
        value_text.push('e');
        value_text.push_str(&exponent);
        rest = after;
    }
    match value_text.parse::<f64>() {
        Ok(value) if value.is_finite() => Ok(Leading { value, rest }),
        Ok(_) => Err(NoNumber::NotFinite),
        Err(_) => Err(NoNumber::Missing),
    }
}

/// `e-3` at the front, if a digit really follows.
fn exponent(text: &str) -> Option<(String, &str)> {
    let rest = text.strip_prefix(['e', 'E'])?;
    let (sign, rest) = match rest.strip_prefix(['-', '−']) {
        Some(rest) => ("-", rest),
        None => ("", rest.strip_prefix('+').unwrap_or(rest)),
    };
    let digits = rest.chars().take_while(char::is_ascii_digit).count();
    let (number, after) = rest.split_at_checked(digits)?;
    (digits > 0).then(|| (format!("{sign}{number}"), after))
}

/// A number with at most six significant figures and no trailing zeros.
pub(crate) fn shown(value: f64) -> String {
    if value == 0.0 || !value.is_finite() {
        return if value == 0.0 { "0".to_owned() } else { value.to_string() };
    }
    // Digits before the point; the cast is safe, |log10| of a finite f64 is below 400.
    #[allow(clippy::cast_possible_truncation, reason = "|log10| of a finite f64 is below 400")]
    let magnitude = value.abs().log10().floor() as i32;
    let decimals = usize::try_from(5 - magnitude).unwrap_or(0).min(12);
    let text = format!("{value:.decimals$}");
    if text.contains('.') {
        let text = text.trim_end_matches('0').trim_end_matches('.');
        return if text == "-0" { "0".to_owned() } else { text.to_owned() };
    }
    text
}

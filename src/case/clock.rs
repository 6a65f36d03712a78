//! A time of day.

/// A time of day to the minute.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct Clock {
    minutes: u16,
}

impl Clock {
    /// Minutes after midnight, 0 to 1439.
    #[must_use]
    pub const fn minutes(self) -> u16 {
        self.minutes
    }

    /// Hours from this time to the next `other`; 24 h where they are equal.
    #[must_use]
    pub fn hours_until(self, other: Self) -> f64 {
        let day = 24 * 60;
        let span = (other.minutes + day - self.minutes) % day;
        f64::from(if span == 0 { day } else { span }) / 60.0
    }

    /// Hours after midnight.
    #[must_use]
    pub fn hours(self) -> f64 {
        f64::from(self.minutes) / 60.0
    }

    /// The time `seconds` earlier, down to the full 5 minutes, and how many days before.
    #[must_use]
    pub fn before(self, seconds: f64) -> (Self, u32) {
        let start = f64::from(self.minutes) - seconds / 60.0;
        let rounded = (start / 5.0).floor() * 5.0;
        let days = (-rounded / 1440.0).ceil().max(0.0);
        let minutes = rounded + days * 1440.0;
        // Both are whole, not negative and small: at most 1439 minutes and some hundred days.
        #[allow(
            clippy::cast_possible_truncation,
            clippy::cast_sign_loss,
            reason = "whole and small"
        )]
        (Self { minutes: minutes as u16 % 1440 }, days as u32)
    }
}

impl std::str::FromStr for Clock {
    type Err = String;

    fn from_str(text: &str) -> Result<Self, String> {
        let wrong = || format!("`{text}` is not a time of day; write for example `06:00`");
        let (hours, minutes) = text.trim().split_once(':').ok_or_else(wrong)?;
        let two = |part: &str| {
            (!part.is_empty() && part.len() <= 2 && part.bytes().all(|b| b.is_ascii_digit()))
                .then(|| part.parse::<u16>().ok())
                .flatten()
        };
        match (two(hours), two(minutes)) {
            (Some(h), Some(m)) if h < 24 && m < 60 && minutes.len() == 2 => {
                Ok(Self { minutes: h * 60 + m })
            }
            _ => Err(wrong()),
        }
    }
}

impl std::fmt::Display for Clock {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{:02}:{:02}", self.minutes / 60, self.minutes % 60)
    }
}

#[cfg(test)]
mod tests {
    use super::Clock;

    fn at(text: &str) -> Clock {
        text.parse().unwrap_or(Clock { minutes: 0 })
    }

    #[test]
    fn counts_over_midnight_and_rounds_down_to_five_minutes() {
        assert!((at("18:00").hours_until(at("06:00")) - 12.0).abs() < 1e-12);
        assert!((at("06:00").hours_until(at("06:00")) - 24.0).abs() < 1e-12);
        assert_eq!(at("06:00").before(4.0 * 3600.0), (at("02:00"), 0));
        assert_eq!(at("06:00").before(3.97 * 3600.0), (at("02:00"), 0));
        assert_eq!(at("06:00").before(7.0 * 3600.0), (at("23:00"), 1));
        assert_eq!(at("00:00").before(60.0), (at("23:55"), 1));
        assert_eq!(at("06:00").before(60.0 * 3600.0), (at("18:00"), 3));
    }

    #[test]
    fn refuses_what_is_no_time() {
        for text in ["24:00", "6", "06:60", "6:5", "", "aa:bb", "06:00 pm"] {
            assert!(text.parse::<Clock>().is_err(), "{text}");
        }
    }
}

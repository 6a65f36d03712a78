//! Which cold of a site a case wants, and what it gets.

use super::site::{Kind, Site};

/// Which temperature is wanted.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Wish {
    /// Coldest on record.
    Record,
    /// The value that 99.6 % or 99 % of the hours of a year are over.
    Percent(f64),
    /// Coldest once in so many winters.
    OnceIn(f64),
    /// The low of a design class.
    Class,
}

/// How a temperature was come by.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum How {
    /// Coldest on record.
    Record,
    /// A percentile of the hours.
    Percentile,
    /// A return level.
    ReturnLevel,
    /// A design class.
    Class,
}

/// What a site gave.
#[derive(Debug, Clone, PartialEq)]
pub struct Found {
    /// °C.
    pub celsius: f64,
    /// How it was come by.
    pub how: How,
    /// Standard error, K, of a return level.
    pub standard_error_k: Option<f64>,
    /// In words, with what the file says of it.
    pub words: String,
}

impl Wish {
    /// Reads `record`, `99.6 %`, `99 %`, `once in 20 winters`, `class`; `None` for other texts, which
    /// are figures then.
    ///
    /// # Errors
    /// A percentage or a number of winters that makes no sense.
    ///
    /// # Example
    /// ```
    /// use coldsump::climate::Wish;
    /// assert_eq!(Wish::read("once in 20 winters"), Ok(Some(Wish::OnceIn(20.0))));
    /// assert_eq!(Wish::read("99.6 %"), Ok(Some(Wish::Percent(99.6))));
    /// assert_eq!(Wish::read("-38 °C"), Ok(None));
    /// assert!(Wish::read("95 %").is_err());
    /// ```
    pub fn read(text: &str) -> Result<Option<Self>, String> {
        let text = text.trim().to_lowercase();
        if text == "record" {
            return Ok(Some(Self::Record));
        }
        if text == "class" {
            return Ok(Some(Self::Class));
        }
        if let Some(number) = text.strip_suffix('%') {
            return match number.trim().replace(',', ".").parse::<f64>() {
                Ok(value) if value == 99.6 || value == 99.0 => Ok(Some(Self::Percent(value))),
                _ => {
                    Err(format!("`{text}` is not kept in climate files; write `99.6 %` or `99 %`"))
                }
            };
        }
        if let Some(rest) = text.strip_prefix("once in") {
            let number = rest
                .trim()
                .trim_end_matches(|c: char| c.is_alphabetic() || c == ' ')
                .replace(',', ".");
            return match number.parse::<f64>() {
                Ok(winters) if winters > 1.0 && winters <= 1000.0 => {
                    Ok(Some(Self::OnceIn(winters)))
                }
                _ => Err(format!(
                    "`{text}` names no number of winters over 1; write for example `once in 20 winters`"
                )),
            };
        }
        Ok(None)
    }
}

impl std::fmt::Display for Wish {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        match self {
            Self::Record => f.write_str("record"),
            Self::Percent(percent) => write!(f, "{percent} %"),
            Self::OnceIn(winters) => write!(f, "once in {winters} winters"),
            Self::Class => f.write_str("class"),
        }
    }
}

impl Site {
    /// The temperature wanted.
    ///
    /// # Errors
    /// The file does not hold it; the text says what it holds.
    pub fn temperature(&self, wish: Wish) -> Result<Found, String> {
        let minima = &self.minima;
        let reading = match wish {
            Wish::Record => minima.record.as_ref().map(|r| (r, How::Record)),
            Wish::Percent(percent) if percent > 99.3 => {
                minima.percent_99_6.as_ref().map(|r| (r, How::Percentile))
            }
            Wish::Percent(_) => minima.percent_99.as_ref().map(|r| (r, How::Percentile)),
            Wish::Class => minima.class.as_ref().map(|r| (r, How::Class)),
            Wish::OnceIn(winters) => {
                let level = minima.once_in.iter().find(|l| (l.winters - winters).abs() < 1e-9);
                return level
                    .map(|level| Found {
                        celsius: level.celsius,
                        how: How::ReturnLevel,
                        standard_error_k: Some(level.standard_error_k),
                        words: format!("{wish} at {}: {}", self.title, level.how),
                    })
                    .ok_or_else(|| self.holds(wish));
            }
        };
        reading
            .map(|(reading, how)| Found {
                celsius: reading.celsius,
                how,
                standard_error_k: None,
                words: format!("{wish} at {}: {}", self.title, reading.how),
            })
            .ok_or_else(|| self.holds(wish))
    }

    /// What a case gets for its minimum where it names the site alone: the low of a class, else the
    /// coldest once in 20 winters, else the record, else the 99.6 % value.
    #[must_use]
    pub fn usual_minimum(&self) -> Option<(Wish, Found)> {
        let wishes: &[Wish] = match self.kind {
            Kind::DesignClass => &[Wish::Class],
            Kind::Observed | Kind::Invented => {
                &[Wish::OnceIn(20.0), Wish::Record, Wish::Percent(99.6)]
            }
        };
        wishes.iter().find_map(|wish| Some((*wish, self.temperature(*wish).ok()?)))
    }

    fn holds(&self, wish: Wish) -> String {
        let minima = &self.minima;
        let mut has: Vec<String> = Vec::new();
        for (there, wish) in [
            (minima.class.is_some(), Wish::Class),
            (minima.record.is_some(), Wish::Record),
            (minima.percent_99_6.is_some(), Wish::Percent(99.6)),
            (minima.percent_99.is_some(), Wish::Percent(99.0)),
        ] {
            if there {
                has.push(format!("`{wish}`"));
            }
        }
        has.extend(minima.once_in.iter().map(|l| format!("`{}`", Wish::OnceIn(l.winters))));
        let has = if has.is_empty() { "no minima at all".to_owned() } else { has.join(", ") };
        format!("climate `{}` does not hold `{wish}`; it holds {has}", self.name)
    }
}

//! ISO viscosity grades: the middle at 40 °C and ±10 %.
//!
//! Source: ISO 3448:1992.

/// One ISO viscosity grade.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Grade {
    /// The number in the name, `46` of ISO VG 46.
    pub number: u32,
    /// Middle at 40 °C, mm²/s.
    pub middle: f64,
}

impl Grade {
    /// Least viscosity at 40 °C, mm²/s.
    #[must_use]
    pub fn least(self) -> f64 {
        0.9 * self.middle
    }

    /// Greatest viscosity at 40 °C, mm²/s.
    #[must_use]
    pub fn greatest(self) -> f64 {
        1.1 * self.middle
    }
}

/// The twenty grades, thinnest first. ISO 3448:1992 (2200 and 3200 from memory).
pub static GRADES: [Grade; 20] = {
    const fn g(number: u32, middle: f64) -> Grade {
        Grade { number, middle }
    }
    [
        g(2, 2.2),
        g(3, 3.2),
        g(5, 4.6),
        g(7, 6.8),
        g(10, 10.0),
        g(15, 15.0),
        g(22, 22.0),
        g(32, 32.0),
        g(46, 46.0),
        g(68, 68.0),
        g(100, 100.0),
        g(150, 150.0),
        g(220, 220.0),
        g(320, 320.0),
        g(460, 460.0),
        g(680, 680.0),
        g(1000, 1000.0),
        g(1500, 1500.0),
        g(2200, 2200.0),
        g(3200, 3200.0),
    ]
};

/// The grade a viscosity at 40 °C in mm²/s falls in, if any.
#[must_use]
pub fn grade_of(kv40: f64) -> Option<Grade> {
    GRADES.iter().copied().find(|grade| kv40 >= grade.least() && kv40 <= grade.greatest())
}

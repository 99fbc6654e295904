//! The date of a case: stated in the file and never taken from the clock, so that a report can be reproduced.

use core::fmt;

/// A day of the Gregorian calendar.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Date {
    year: u16,
    month: u8,
    day: u8,
}

/// Why a text is not a date a case can carry.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
#[non_exhaustive]
pub enum DateError {
    /// Not written as year, month and day with hyphens.
    Form,
    /// A month that is not 1 to 12.
    Month(u8),
    /// A day that this month of this year does not have; it has as many as stated.
    Day {
        /// The day as written.
        day: u8,
        /// The last day of that month.
        last: u8,
    },
    /// A year that cannot be that of a review.
    Year(u16),
}

impl Date {
    /// A day, if the calendar has it and the year is 1900 to 2199.
    ///
    /// # Errors
    ///
    /// [`DateError::Month`], [`DateError::Day`] or [`DateError::Year`], the first that applies.
    ///
    /// ```
    /// use tautring_report::case::Date;
    ///
    /// assert_eq!(Date::new(2028, 2, 29).unwrap().to_string(), "2028-02-29");
    /// assert!(Date::new(2027, 2, 29).is_err());
    /// ```
    pub fn new(year: u16, month: u8, day: u8) -> Result<Self, DateError> {
        let leap =
            year.is_multiple_of(4) && (!year.is_multiple_of(100) || year.is_multiple_of(400));
        let last = match month {
            2 if leap => 29,
            2 => 28,
            4 | 6 | 9 | 11 => 30,
            1..=12 => 31,
            _ => return Err(DateError::Month(month)),
        };
        if day == 0 || day > last {
            return Err(DateError::Day { day, last });
        }
        // Outside these two centuries it is a slip of the pen.
        if !(1900..2200).contains(&year) {
            return Err(DateError::Year(year));
        }
        Ok(Self { year, month, day })
    }

    /// Reads `2026-03-14`.
    pub(super) fn parse(text: &str) -> Result<Self, DateError> {
        let parts: Vec<&str> = text.split('-').collect();
        let [year, month, day] = parts[..] else {
            return Err(DateError::Form);
        };
        let right = |part: &str, length| {
            part.len() == length && part.bytes().all(|byte| byte.is_ascii_digit())
        };
        if !(right(year, 4) && right(month, 2) && right(day, 2)) {
            return Err(DateError::Form);
        }
        match (year.parse(), month.parse(), day.parse()) {
            (Ok(year), Ok(month), Ok(day)) => Self::new(year, month, day),
            _ => Err(DateError::Form),
        }
    }
}

impl fmt::Display for Date {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            formatter,
            "{:04}-{:02}-{:02}",
            self.year, self.month, self.day
        )
    }
}

impl fmt::Display for DateError {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Form => write!(formatter, "not a date in the form year-month-day"),
            Self::Month(month) => write!(formatter, "there is no month {month}"),
            Self::Day { day, last } => write!(
                formatter,
                "there is no day {day}: that month ends on {last}"
            ),
            Self::Year(year) => write!(
                formatter,
                "the year {year} is not one of a review (1900 to 2199)"
            ),
        }
    }
}

impl core::error::Error for DateError {}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn keeps_to_the_calendar() {
        assert_eq!(
            Date::parse("2000-02-29").map(|date| date.to_string()),
            Ok("2000-02-29".into())
        );
        assert_eq!(
            Date::parse("2100-02-29"),
            Err(DateError::Day { day: 29, last: 28 })
        );
        assert_eq!(Date::parse("2026-13-01"), Err(DateError::Month(13)));
        assert_eq!(Date::parse("0026-03-01"), Err(DateError::Year(26)));
        for text in [
            "14.03.2026",
            "2026-3-14",
            "2026-03-14T10:00",
            "",
            "--",
            "+026-01-01",
        ] {
            assert_eq!(Date::parse(text), Err(DateError::Form), "{text}");
        }
    }
}

//! Numbers as they are printed: the uncertainty to two significant digits, the value to the same digit.
//!
//! # Source
//! `gum-2008`, 7.2.6.

/// A value and its uncertainty, rounded together.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Rounded {
    /// The value.
    pub value: String,
    /// The uncertainty.
    pub uncertainty: String,
}

impl Rounded {
    /// Value and uncertainty in one: `115.6 ± 1.3`.
    pub fn interval(&self) -> String {
        format!("{} ± {}", self.value, self.uncertainty)
    }
}

/// Rounds an uncertainty to two significant digits and its value to the same digit.
///
/// What is no number prints as `not known`. An uncertainty of zero gives no digit to round to: the value then keeps one decimal.
///
/// ```
/// use tautring_report::document::rounding::rounded;
/// assert_eq!(rounded(-1234.56, 23.4).interval(), "−1235 ± 23");
/// assert_eq!(rounded(53.4712, 0.0996).interval(), "53.47 ± 0.10");
/// ```
pub fn rounded(value: f64, uncertainty: f64) -> Rounded {
    let places = places(uncertainty);
    Rounded {
        value: to_places(value, places),
        uncertainty: if uncertainty.is_finite() {
            to_places(uncertainty, places)
        } else {
            UNKNOWN.to_owned()
        },
    }
}

/// An uncertainty alone, to two significant digits.
pub fn uncertainty(uncertainty: f64) -> String {
    rounded(0.0, uncertainty).uncertainty
}

/// A number to a fixed count of decimals, with a proper minus sign.
///
/// ```
/// use tautring_report::document::rounding::fixed;
/// assert_eq!(fixed(-74.0391, 1), "−74.0");
/// assert_eq!(fixed(-0.004, 2), "0.00");
/// ```
pub fn fixed(value: f64, decimals: usize) -> String {
    to_places(value, i32::try_from(decimals).unwrap_or(i32::MAX))
}

/// A published number as it was printed, with a proper minus sign.
pub fn as_published(value: f64) -> String {
    with_minus_sign(&value.to_string())
}

const UNKNOWN: &str = "not known";

/// Decimals that keep two significant digits of an uncertainty; negative for tens and hundreds.
fn places(uncertainty: f64) -> i32 {
    if !uncertainty.is_finite() || uncertainty == 0.0 {
        return 1;
    }
    // Rounding first lets 0.0996 carry into 0.10 before its digits are counted.
    let scientific = format!("{:.1e}", uncertainty.abs());
    let exponent = scientific
        .split_once('e')
        .and_then(|(_, exponent)| exponent.parse::<i32>().ok())
        .unwrap_or(0);
    (1 - exponent).min(12)
}

fn to_places(value: f64, places: i32) -> String {
    if !value.is_finite() {
        return UNKNOWN.to_owned();
    }
    let text = if let Ok(decimals) = usize::try_from(places) {
        format!("{value:.decimals$}")
    } else {
        let unit = 10_f64.powi(-places);
        format!("{:.0}", (value / unit).round() * unit)
    };
    with_minus_sign(&text)
}

/// U+2212 for the hyphen, and no sign on a zero.
fn with_minus_sign(text: &str) -> String {
    match text.strip_prefix('-') {
        Some(digits) if digits.chars().all(|c| matches!(c, '0' | '.')) => digits.to_owned(),
        Some(digits) => format!("−{digits}"),
        None => text.to_owned(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn two_significant_digits_whatever_the_size() {
        for (value, u, printed) in [
            (115.6432, 1.2651, "115.6 ± 1.3"),
            (115.6432, 0.99, "115.64 ± 0.99"),
            (115.6432, 0.996, "115.6 ± 1.0"),
            (115.6432, 12.651, "116 ± 13"),
            (2756.4, 126.51, "2760 ± 130"),
            (2756.4, 99.6, "2760 ± 100"),
            (0.000_123_4, 0.000_012_3, "0.000123 ± 0.000012"),
            (-0.01, 1.0, "0.0 ± 1.0"),
        ] {
            assert_eq!(rounded(value, u).interval(), printed);
        }
    }

    #[test]
    fn what_is_no_number_says_so() {
        assert_eq!(rounded(f64::NAN, 1.0).value, "not known");
        assert_eq!(rounded(12.34, f64::INFINITY).interval(), "12.3 ± not known");
        assert_eq!(rounded(12.34, 0.0).interval(), "12.3 ± 0.0");
    }
}

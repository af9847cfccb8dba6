//! How many digits a number gets. All printed figures pass through here.
//!
//! A bracketed value is printed as `middle ± reach`. The number of decimals follows from the bracket's half-width
//! (never finer than what was asked), and the reach is rounded up so that the *printed* interval holds the whole
//! bracket, the rounding of the middle included. Bounds are rounded outwards. Nothing is ever printed as -0.

use crate::rating::{Accuracy, Bracket};

/// Decimals of Ψ and L unless a finer accuracy was asked (ISO 10211 reports 0.001 W/(m·K)).
const USUAL_DECIMALS: usize = 3;
/// Decimals beyond which double precision has nothing to say about a sum of heat flows.
const MOST_DECIMALS: usize = 9;
/// A number of this many units in the last place or more is printed in powers of ten: `f64` counts no further exactly.
const LARGEST_COUNT: f64 = 1e15;

/// The number with so many decimals, without a minus sign before nought.
pub(super) fn fixed(value: f64, decimals: usize) -> String {
    if !value.is_finite() {
        return "none".to_owned();
    }
    if value.abs() * power_of_ten(decimals) >= LARGEST_COUNT {
        return format!("{value:.decimals$e}");
    }
    let text = format!("{value:.decimals$}");
    match text.strip_prefix('-') {
        Some(digits) if digits.chars().all(|c| c == '0' || c == '.') => digits.to_owned(),
        _ => text,
    }
}

/// The number with at most so many decimals, closing noughts left out.
pub(super) fn trimmed(value: f64, decimals: usize) -> String {
    trimmed_text(fixed(value, decimals))
}

fn trimmed_text(text: String) -> String {
    if text.contains('.') && !text.contains('e') {
        text.trim_end_matches('0').trim_end_matches('.').to_owned()
    } else {
        text
    }
}

/// The number with at most so many significant digits, closing noughts left out: for conductivities.
pub(super) fn significant(value: f64, digits: usize) -> String {
    if value == 0.0 || !value.is_finite() {
        return fixed(value, 0);
    }
    let leading = value.abs().log10().floor();
    trimmed(value, (digits as f64 - 1.0 - leading).clamp(0.0, 12.0) as usize)
}

/// A whole number, its digits in groups of three from five digits on.
pub(super) fn count(number: usize) -> String {
    let digits = number.to_string();
    if digits.len() < 5 {
        return digits;
    }
    let mut text = String::new();
    for (index, digit) in digits.char_indices() {
        if index > 0 && (digits.len() - index).is_multiple_of(3) {
            text.push(' ');
        }
        text.push(digit);
    }
    text
}

/// The largest number of so many decimals that is not above `value`.
pub(super) fn rounded_down(value: f64, decimals: usize) -> String {
    rounded(value, decimals, |printed| printed > value, -1.0)
}

/// The smallest number of so many decimals that is not below `value`.
pub(super) fn rounded_up(value: f64, decimals: usize) -> String {
    rounded(value, decimals, |printed| printed < value, 1.0)
}

fn rounded(value: f64, decimals: usize, wrong_side: impl Fn(f64) -> bool, step: f64) -> String {
    let scale = power_of_ten(decimals);
    let units = (value * scale).round();
    if !value.is_finite() || units.abs() >= LARGEST_COUNT {
        return fixed(value, decimals);
    }
    // A quotient of two whole numbers below 2⁵³ is correctly rounded, so it is the number that the digits denote.
    let units = if wrong_side(units / scale) { units + step } else { units };
    fixed(units / scale, decimals)
}

/// A half-width with two significant digits, rounded up, closing noughts left out.
pub(super) fn rounded_up_to_two_digits(half_width: f64) -> String {
    if half_width <= 0.0 || !half_width.is_finite() {
        return fixed(half_width, 0);
    }
    let decimals = (1.0 - half_width.log10().floor()).clamp(0.0, MOST_DECIMALS as f64) as usize;
    trimmed_text(rounded_up(half_width, decimals))
}

/// A temperature or temperature factor that is converged, not bracketed, rounded towards the cold side.
///
/// Noise below a thousandth of the last place does not cost a whole place.
pub(super) fn rounded_cold(value: f64, decimals: usize) -> String {
    rounded_down(value + 1e-3 / power_of_ten(decimals), decimals)
}

/// A bracket's value and how far it reaches, as printed.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Printed {
    /// The middle.
    pub(super) value: String,
    /// The printed interval `value ± reach` holds the whole bracket.
    pub(super) reach: String,
}

impl Printed {
    /// `0.712 ± 0.001`.
    pub(super) fn joined(&self) -> String {
        format!("{} ± {}", self.value, self.reach)
    }
}

/// The half-width asked of a bracket whose value is `value`.
pub(super) fn asked_half_width(accuracy: Accuracy, value: f64) -> f64 {
    match accuracy {
        Accuracy::Absolute(half_width) => half_width,
        Accuracy::Relative(fraction) => fraction * value.abs(),
    }
}

/// The decimals that a value deserves whose half-width is `half_width`, where `asked` was asked.
///
/// Up to 0.0005: the fewest decimals whose last place is not larger than the bracket. Wider: three decimals as long as
/// the half-width then has at most two digits, fewer beyond.
pub(super) fn decimals(half_width: f64, asked: f64) -> usize {
    let half_width = half_width.max(asked);
    if !half_width.is_finite() {
        return 0;
    }
    // A hair of tolerance: a half-width of 0.0005 deserves three decimals, not four, whatever its last bit says.
    let fine = (-(2.0 * half_width).log10() - 1e-9).ceil().min(MOST_DECIMALS as f64);
    if fine >= USUAL_DECIMALS as f64 {
        return fine as usize;
    }
    let two_digits = 1.0 - half_width.log10().floor();
    two_digits.clamp(0.0, USUAL_DECIMALS as f64) as usize
}

/// The bracket as `value ± reach` with so many decimals.
pub(super) fn covering(bracket: Bracket, decimals: usize) -> Printed {
    let scale = power_of_ten(decimals);
    let middle = bracket.value();
    let units = (middle * scale).round();
    if !(bracket.low.is_finite() && bracket.high.is_finite()) || (units.abs() + 2.0) >= LARGEST_COUNT {
        return Printed { value: fixed(middle, decimals), reach: fixed(bracket.half_width(), decimals) };
    }
    let covers = |reach: f64| (units - reach) / scale <= bracket.low && bracket.high <= (units + reach) / scale;
    let mut reach = ((bracket.half_width() * scale).floor() - 1.0).max(0.0);
    while !covers(reach) && reach < LARGEST_COUNT {
        reach += 1.0;
    }
    // A value without any width still carries the rounding of its digits.
    Printed { value: fixed(units / scale, decimals), reach: fixed(reach / scale, decimals) }
}

/// The bounds, rounded outwards to so many decimals.
pub(super) fn bounds(bracket: Bracket, decimals: usize) -> (String, String) {
    (rounded_down(bracket.low, decimals), rounded_up(bracket.high, decimals))
}

/// The value with two decimals, as it is quoted; both where the bracket allows either, a range where it allows more.
pub(super) fn quoted(bracket: Bracket) -> String {
    let (low, high) = (fixed(bracket.low, 2), fixed(bracket.high, 2));
    if low == high {
        low
    } else if ((bracket.high * 100.0).round() - (bracket.low * 100.0).round()).abs() <= 1.0 {
        format!("{low} or {high}")
    } else {
        format!("{low} to {high}")
    }
}

fn power_of_ten(decimals: usize) -> f64 {
    10f64.powi(i32::try_from(decimals).unwrap_or(i32::MAX))
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    fn around(middle: f64, half_width: f64) -> Bracket {
        Bracket { low: middle - half_width, high: middle + half_width }
    }

    fn printed(bracket: Bracket, asked: f64) -> String {
        covering(bracket, decimals(bracket.half_width(), asked)).joined()
    }

    #[test]
    fn three_decimals_by_default() {
        assert_eq!(printed(around(0.7124, 0.0004), 0.0005), "0.712 ± 0.001");
        assert_eq!(printed(around(0.7120, 0.0), 0.0005), "0.712 ± 0.000");
        assert_eq!(printed(around(0.71245, 1e-12), 0.0005), "0.712 ± 0.001");
        assert_eq!(printed(around(-0.0648, 0.0003), 0.0005), "-0.065 ± 0.001");
    }

    #[test]
    fn more_decimals_where_a_finer_accuracy_was_asked_and_met() {
        assert_eq!(printed(around(0.712_431, 0.000_04), 0.000_05), "0.7124 ± 0.0001");
        assert_eq!(printed(around(0.712_431_2, 0.000_004), 0.000_005), "0.71243 ± 0.00001");
        // Asked but not met: the bracket decides.
        assert_eq!(printed(around(0.712_431, 0.0004), 0.000_05), "0.7124 ± 0.0005");
    }

    #[test]
    fn fewer_decimals_where_the_bracket_is_wide() {
        assert_eq!(printed(around(0.7124, 0.021), 0.0005), "0.712 ± 0.022");
        assert_eq!(printed(around(0.7124, 0.21), 0.0005), "0.71 ± 0.22");
        assert_eq!(printed(around(12.34, 3.21), 0.0005), "12.3 ± 3.3");
        assert_eq!(printed(around(500.0, 123.4), 0.0005), "500 ± 124");
    }

    #[test]
    fn nought_has_no_sign() {
        assert_eq!(fixed(-0.0001, 3), "0.000");
        assert_eq!(fixed(-0.0, 0), "0");
        assert_eq!(fixed(-0.0006, 3), "-0.001");
        assert_eq!(printed(around(-0.0001, 0.0002), 0.0005), "0.000 ± 0.001");
        assert_eq!(rounded_up(-0.000_01, 3), "0.000");
        assert_eq!(rounded_cold(-0.000_000_1, 1), "0.0");
    }

    #[test]
    fn bounds_are_rounded_outwards_but_exact_ones_are_kept() {
        assert_eq!(bounds(Bracket { low: 1.36204, high: 1.36241 }, 4), ("1.3620".into(), "1.3625".into()));
        assert_eq!(bounds(Bracket { low: 1.362, high: 1.3624 }, 4), ("1.3620".into(), "1.3624".into()));
        assert_eq!(bounds(Bracket { low: -0.06501, high: -0.06499 }, 3), ("-0.066".into(), "-0.064".into()));
    }

    #[test]
    fn quoted_value_says_when_two_decimals_are_not_settled() {
        assert_eq!(quoted(around(0.7124, 0.0005)), "0.71");
        assert_eq!(quoted(around(0.7149, 0.0005)), "0.71 or 0.72");
        assert_eq!(quoted(around(0.7149, 0.03)), "0.68 to 0.74");
        assert_eq!(quoted(around(-0.001, 0.0005)), "0.00");
    }

    #[test]
    fn temperature_factors_are_rounded_towards_cold() {
        assert_eq!(rounded_cold(0.749_96, 3), "0.749");
        assert_eq!(rounded_cold(0.77, 3), "0.770");
        assert_eq!(rounded_cold(0.77 - 1e-12, 3), "0.770");
        assert_eq!(rounded_cold(-3.31, 1), "-3.4");
    }

    #[test]
    fn short_forms() {
        assert_eq!(trimmed(368.0, 2), "368");
        assert_eq!(trimmed(-1200.0, 2), "-1200");
        assert_eq!(trimmed(12.7, 2), "12.7");
        assert_eq!(significant(0.035, 4), "0.035");
        assert_eq!(significant(230.0, 4), "230");
        assert_eq!(significant(1.234_567, 4), "1.235");
        assert_eq!(significant(0.0, 4), "0");
        assert_eq!(rounded_up_to_two_digits(0.000_200_01), "0.00021");
        assert_eq!(rounded_up_to_two_digits(0.0002), "0.0002");
        assert_eq!(rounded_up_to_two_digits(1e-15), "0.000000001");
        assert_eq!(rounded_up_to_two_digits(0.0), "0");
        assert_eq!(count(5097), "5097");
        assert_eq!(count(50_970), "50 970");
        assert_eq!(count(2_000_000), "2 000 000");
    }

    #[test]
    fn extreme_numbers_are_printed_not_looped_over() {
        assert_eq!(printed(around(1e300, 1e290), 0.0005), "1e300 ± 1e290");
        assert_eq!(fixed(f64::NAN, 3), "none");
        assert_eq!(printed(Bracket { low: f64::NEG_INFINITY, high: f64::INFINITY }, 0.0005), "none ± none");
        assert_eq!(decimals(0.0, 0.0), MOST_DECIMALS);
    }

    proptest! {
        /// What is printed, read back, holds the whole bracket.
        #[test]
        fn printed_interval_holds_the_bracket(
            middle in -50.0..50.0f64, exponent in -9.0..1.5f64, asked_exponent in -7.0..-1.0f64,
        ) {
            let bracket = around(middle, 10f64.powf(exponent));
            let asked = 10f64.powf(asked_exponent);
            let decimals = decimals(bracket.half_width(), asked);
            let text = covering(bracket, decimals);
            let units = |text: &str| (text.parse::<f64>().unwrap() * power_of_ten(decimals)).round();
            let (value, reach) = (units(&text.value), units(&text.reach));
            prop_assert!((value - reach) / power_of_ten(decimals) <= bracket.low);
            prop_assert!((value + reach) / power_of_ten(decimals) >= bracket.high);
            let unit = 1.0 / power_of_ten(decimals);
            prop_assert!(reach * unit <= bracket.half_width() + 1.51 * unit, "and is hardly wider");
            let (low, high) = bounds(bracket, decimals);
            prop_assert!(low.parse::<f64>().unwrap() <= bracket.low && bracket.high <= high.parse::<f64>().unwrap());
        }
    }
}

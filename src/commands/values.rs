//! Reading the values of options.

use crate::rating::Accuracy;

/// Half-widths in W/(m·K) that can be asked for. Below, rounding errors of the sums grow visible; above, the result
/// says nothing.
const ABSOLUTE_RANGE: [f64; 2] = [1e-6, 0.1];
/// Half-widths in percent of L that can be asked for, for the same reasons.
const PERCENT_RANGE: [f64; 2] = [0.001, 10.0];
/// Node limits that can be asked for; the largest takes some 60 GB of memory.
const NODE_RANGE: [usize; 2] = [4, 100_000_000];

/// Reads `0.0005` (W/(m·K)) or `0.1%` (of L).
pub(super) fn accuracy(text: &str) -> Result<Accuracy, String> {
    let (number, range, unit) = match text.trim().strip_suffix('%') {
        Some(number) => (number.trim(), PERCENT_RANGE, " %"),
        None => (text.trim(), ABSOLUTE_RANGE, " W/(m·K)"),
    };
    let expected = "write a half-width in W/(m·K), such as 0.0005, or in percent of L, such as 0.1%";
    let value: f64 = number.parse().map_err(|_| expected.to_owned())?;
    if !(range[0]..=range[1]).contains(&value) {
        return Err(format!("{value}{unit} lies outside {} to {}{unit}; {expected}", range[0], range[1]));
    }
    Ok(if unit == " %" { Accuracy::Relative(value / 100.0) } else { Accuracy::Absolute(value) })
}

/// Reads a number of nodes, `2000000` or `2_000_000`.
pub(super) fn node_limit(text: &str) -> Result<usize, String> {
    let expected = format!("write a whole number from {} to {}", NODE_RANGE[0], NODE_RANGE[1]);
    match text.replace('_', "").parse() {
        Ok(nodes) if (NODE_RANGE[0]..=NODE_RANGE[1]).contains(&nodes) => Ok(nodes),
        _ => Err(expected),
    }
}

/// Reads a number of threads.
pub(super) fn threads(text: &str) -> Result<usize, String> {
    match text.parse() {
        Ok(threads) if (1..=1024).contains(&threads) => Ok(threads),
        _ => Err("write a whole number from 1 to 1024".to_owned()),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn accuracy_is_absolute_or_relative() {
        assert_eq!(accuracy("0.0005"), Ok(Accuracy::Absolute(0.0005)));
        assert_eq!(accuracy(" 2e-5"), Ok(Accuracy::Absolute(0.00002)));
        assert_eq!(accuracy("0.5%"), Ok(Accuracy::Relative(0.005)));
        assert_eq!(accuracy("0.5 %"), Ok(Accuracy::Relative(0.005)));
    }

    #[test]
    fn senseless_accuracies_are_refused_with_the_range() {
        for text in ["0", "-0.001", "1e-9", "5", "nan", "inf", "0%", "50%"] {
            let refusal = accuracy(text).unwrap_err();
            assert!(refusal.contains("lies outside") && refusal.contains("such as 0.0005"), "{text}: {refusal}");
        }
        for text in ["", "fine", "%", "0,001"] {
            assert!(accuracy(text).unwrap_err().starts_with("write a half-width"), "{text}");
        }
    }

    #[test]
    fn counts() {
        assert_eq!(node_limit("2_000_000"), Ok(2_000_000));
        for text in ["3", "1e6", "-4", "100000001", "99999999999999999999"] {
            assert_eq!(node_limit(text), Err("write a whole number from 4 to 100000000".to_owned()), "{text}");
        }
        assert_eq!(threads("2"), Ok(2));
        assert!(threads("0").is_err() && threads("1025").is_err());
    }
}

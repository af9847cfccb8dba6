//! The parts of an expression: numbers, names and signs, each with the bytes it takes.

use std::ops::Range;

use super::expression::{ExpressionFault, Fault};

/// Whether a character may stand in a name.
pub(super) fn is_name_character(c: char) -> bool {
    c.is_alphanumeric() || c == '_'
}

/// A part of an expression.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Token {
    Number(f64),
    Name,
    Sign(char),
    End,
}

/// The token at or after byte `at`, and the bytes it takes.
pub(super) fn token_at(text: &str, at: usize) -> Result<(Token, Range<usize>), Fault> {
    let rest = text[at..].trim_start();
    let start = text.len() - rest.len();
    let Some(first) = rest.chars().next() else {
        return Ok((Token::End, start..start));
    };
    if first.is_ascii_digit() || first == '.' {
        return number_at(text, start);
    }
    if is_name_character(first) {
        let length = rest.find(|c: char| !is_name_character(c)).unwrap_or(rest.len());
        return Ok((Token::Name, start..start + length));
    }
    let range = start..start + first.len_utf8();
    if "+-*/(),".contains(first) {
        return Ok((Token::Sign(first), range));
    }
    Err(Fault { range, kind: ExpressionFault::StrangeCharacter { found: first } })
}

fn number_at(text: &str, start: usize) -> Result<(Token, Range<usize>), Fault> {
    let bytes = text.as_bytes();
    let digits_from = |from: usize| from + bytes[from..].iter().take_while(|byte| byte.is_ascii_digit()).count();
    let mut end = digits_from(start);
    if bytes.get(end) == Some(&b'.') {
        end = digits_from(end + 1);
    }
    if matches!(bytes.get(end), Some(b'e' | b'E')) {
        let sign = usize::from(matches!(bytes.get(end + 1), Some(b'+' | b'-')));
        let exponent_end = digits_from((end + 1 + sign).min(bytes.len()));
        if exponent_end > end + 1 + sign {
            end = exponent_end;
        }
    }
    let written = &text[start..end];
    match written.parse::<f64>() {
        Ok(value) if value.is_finite() => Ok((Token::Number(value), start..end)),
        Ok(_) => Err(Fault { range: start..end, kind: ExpressionFault::NotFinite }),
        Err(_) => {
            // a lone point: YAML's .nan and .inf, or a slip
            let rest = &text[end..];
            let end = end + rest.find(|c: char| !is_name_character(c)).unwrap_or(rest.len());
            let written = text[start..end].to_owned();
            Err(Fault { range: start..end, kind: ExpressionFault::NotANumber { written } })
        }
    }
}

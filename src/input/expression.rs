//! Numbers written as arithmetic: `wool + 228`, `-(a + b) / 2`, `max(a, 20)`.
//!
//! ```text
//! sum     = product { ("+" | "-") product }
//! product = factor { ("*" | "/") factor }
//! factor  = { "-" | "+" } ( number | name | name "(" sum { "," sum } ")" | "(" sum ")" )
//! ```
//!
//! Names hold letters, digits and underscores and start with no digit, so `-` is always minus. The value is computed
//! while reading: there is no tree that a hostile expression could make deep.

use std::ops::Range;

use super::token::{Token, is_name_character, token_at};

/// How deep parentheses and functions may nest.
const DEPTH_LIMIT: usize = 32;

/// The functions, by name and number of arguments (`None`: two or more).
const FUNCTIONS: [(&str, Option<usize>); 4] = [("min", None), ("max", None), ("sqrt", Some(1)), ("abs", Some(1))];

/// What an expression may call.
pub(super) fn function_names() -> impl Iterator<Item = &'static str> {
    FUNCTIONS.iter().map(|(name, _)| *name)
}

/// What is known of a name that occurs in an expression.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Lookup {
    /// Its value.
    Value(f64),
    /// It is defined, but its own definition is at fault, which has been reported there.
    Faulty,
    /// It is not defined.
    Unknown,
}

/// Why an expression has no value.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum ExpressionFault {
    UnknownName {
        name: String,
    },
    UnknownFunction {
        name: String,
    },
    WrongArguments {
        function: &'static str,
        expected: Option<usize>,
        found: usize,
    },
    DivisionByZero,
    RootOfNegative,
    NotFinite,
    TooLong,
    TooDeep,
    /// Something else stands where a number, a name or a parenthesis is expected.
    NoValue {
        found: String,
    },
    /// A value directly follows a value.
    NoOperator {
        found: String,
    },
    /// A name follows a number, as a unit would.
    Unit {
        name: String,
    },
    /// A comma outside a function; between digits, the number with a point instead.
    Comma {
        with_point: Option<String>,
    },
    /// `.nan` or `.inf`.
    NotANumber {
        written: String,
    },
    StrangeCharacter {
        found: char,
    },
    Unclosed,
    Unopened,
    /// A name of the expression is at fault and has been reported.
    Reported,
}

/// A fault and the bytes of the expression that it concerns.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Fault {
    pub(super) range: Range<usize>,
    pub(super) kind: ExpressionFault,
}

/// The value of an expression, finite. Names are asked of `look_up`.
pub(super) fn evaluate(text: &str, look_up: &mut dyn FnMut(&str) -> Lookup) -> Result<f64, Fault> {
    let mut evaluation = Evaluation { text, depth: 0, look_up, last: (Token::End, 0..0) };
    let value = evaluation.sum()?;
    match evaluation.peek()? {
        (Token::End, _) => Ok(value),
        placed => Err(evaluation.out_of_place(placed)),
    }
}

/// The names that an expression asks for, functions left out.
pub(super) fn names(text: &str) -> Vec<&str> {
    let mut names = Vec::new();
    let mut at = 0;
    while let Ok((token, range)) = token_at(text, at) {
        match token {
            Token::End => break,
            Token::Name if !text[range.end..].trim_start().starts_with('(') => names.push(&text[range.clone()]),
            _ => {}
        }
        at = range.end;
    }
    names
}

/// Whether `name` can stand for a parameter in an expression.
pub(super) fn is_name(name: &str) -> bool {
    let starts_well = name.starts_with(|c: char| c.is_alphabetic() || c == '_');
    starts_well && name.chars().all(is_name_character)
}

/// A token and the bytes it takes.
type Placed = (Token, Range<usize>);

struct Evaluation<'a> {
    text: &'a str,
    depth: usize,
    look_up: &'a mut dyn FnMut(&str) -> Lookup,
    /// The token taken last.
    last: Placed,
}

impl Evaluation<'_> {
    fn peek(&self) -> Result<Placed, Fault> {
        token_at(self.text, self.last.1.end)
    }

    fn take(&mut self, placed: Placed) {
        self.last = placed;
    }

    /// Takes the next token if it is one of these signs.
    fn sign_of(&mut self, signs: &str) -> Result<Option<char>, Fault> {
        match self.peek()? {
            (Token::Sign(sign), range) if signs.contains(sign) => {
                self.take((Token::Sign(sign), range));
                Ok(Some(sign))
            }
            _ => Ok(None),
        }
    }

    fn sum(&mut self) -> Result<f64, Fault> {
        let start = self.peek()?.1.start;
        let mut value = self.product()?;
        while let Some(sign) = self.sign_of("+-")? {
            let term = self.product()?;
            value = self.finite(start, if sign == '+' { value + term } else { value - term })?;
        }
        Ok(value)
    }

    fn product(&mut self) -> Result<f64, Fault> {
        let start = self.peek()?.1.start;
        let mut value = self.factor()?;
        while let Some(sign) = self.sign_of("*/")? {
            let factor_start = self.peek()?.1.start;
            let factor = self.factor()?;
            if sign == '/' && factor == 0.0 {
                return Err(Fault { range: factor_start..self.last.1.end, kind: ExpressionFault::DivisionByZero });
            }
            value = self.finite(start, if sign == '*' { value * factor } else { value / factor })?;
        }
        Ok(value)
    }

    fn factor(&mut self) -> Result<f64, Fault> {
        let mut negative = false;
        while let Some(sign) = self.sign_of("+-")? {
            negative ^= sign == '-';
        }
        let value = self.value()?;
        Ok(if negative { -value } else { value })
    }

    fn value(&mut self) -> Result<f64, Fault> {
        let (token, range) = self.peek()?;
        let words = &self.text[range.clone()];
        match token {
            Token::Number(value) => {
                self.take((token, range));
                Ok(value)
            }
            Token::Name => {
                self.take((token, range.clone()));
                if matches!(self.peek()?.0, Token::Sign('(')) {
                    return self.call(words, range);
                }
                match (self.look_up)(words) {
                    Lookup::Value(value) => Ok(value),
                    Lookup::Faulty => Err(Fault { range, kind: ExpressionFault::Reported }),
                    Lookup::Unknown => {
                        Err(Fault { range, kind: ExpressionFault::UnknownName { name: words.to_owned() } })
                    }
                }
            }
            Token::Sign('(') => {
                let values = self.in_parentheses(1)?;
                Ok(values[0])
            }
            Token::Sign(_) | Token::End => {
                Err(Fault { range, kind: ExpressionFault::NoValue { found: words.to_owned() } })
            }
        }
    }

    fn call(&mut self, name: &str, range: Range<usize>) -> Result<f64, Fault> {
        let Some((function, expected)) = FUNCTIONS.into_iter().find(|(function, _)| *function == name) else {
            return Err(Fault { range, kind: ExpressionFault::UnknownFunction { name: name.to_owned() } });
        };
        let arguments = self.in_parentheses(usize::MAX)?;
        let whole = range.start..self.last.1.end;
        let found = arguments.len();
        if expected.map_or(found < 2, |expected| found != expected) {
            return Err(Fault { range: whole, kind: ExpressionFault::WrongArguments { function, expected, found } });
        }
        match function {
            "min" => Ok(arguments.into_iter().fold(f64::INFINITY, f64::min)),
            "max" => Ok(arguments.into_iter().fold(f64::NEG_INFINITY, f64::max)),
            "abs" => Ok(arguments[0].abs()),
            _ if arguments[0] < 0.0 => Err(Fault { range: whole, kind: ExpressionFault::RootOfNegative }),
            _ => Ok(arguments[0].sqrt()),
        }
    }

    /// The values between the parenthesis that comes next and its partner: at least one, and no more than `most`.
    fn in_parentheses(&mut self, most: usize) -> Result<Vec<f64>, Fault> {
        let open = self.peek()?;
        let open_range = open.1.clone();
        self.take(open);
        if self.depth == DEPTH_LIMIT {
            return Err(Fault { range: open_range, kind: ExpressionFault::TooDeep });
        }
        self.depth += 1;
        let mut values = vec![self.sum()?];
        loop {
            let placed = self.peek()?;
            match placed.0 {
                Token::Sign(',') if values.len() < most => {
                    self.take(placed);
                    values.push(self.sum()?);
                }
                Token::Sign(')') => {
                    self.take(placed);
                    self.depth -= 1;
                    return Ok(values);
                }
                Token::End => return Err(Fault { range: open_range, kind: ExpressionFault::Unclosed }),
                _ => return Err(self.out_of_place(placed)),
            }
        }
    }

    /// The fault of a token that cannot follow the complete value before it.
    fn out_of_place(&self, (token, range): Placed) -> Fault {
        let follows_number = matches!(self.last.0, Token::Number(_));
        let found = self.text[range.clone()].to_owned();
        let kind = match token {
            Token::Sign(',') => {
                let before = &self.text[self.last.1.clone()];
                let digits = self.text[range.end..].trim_start().chars().take_while(char::is_ascii_digit);
                let with_point = follows_number.then(|| format!("{before}.{}", digits.collect::<String>()));
                ExpressionFault::Comma { with_point }
            }
            Token::Sign(')') => ExpressionFault::Unopened,
            Token::Name if follows_number => ExpressionFault::Unit { name: found },
            _ => ExpressionFault::NoOperator { found },
        };
        Fault { range, kind }
    }

    fn finite(&self, start: usize, value: f64) -> Result<f64, Fault> {
        if value.is_finite() {
            Ok(value)
        } else {
            Err(Fault { range: start..self.last.1.end, kind: ExpressionFault::NotFinite })
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn value(text: &str) -> Result<f64, Fault> {
        evaluate(text, &mut |name| match name {
            "wool" => Lookup::Value(140.0),
            "Dämmung_2" => Lookup::Value(60.0),
            "broken" => Lookup::Faulty,
            _ => Lookup::Unknown,
        })
    }

    fn fault(text: &str) -> (ExpressionFault, &str) {
        let fault = value(text).unwrap_err();
        (fault.kind, &text[fault.range])
    }

    #[test]
    fn arithmetic_follows_the_usual_rules() {
        for (text, expected) in [
            ("12", 12.0),
            ("12.5", 12.5),
            (".5", 0.5),
            ("5.", 5.0),
            ("+5", 5.0),
            ("1.5e-3", 0.0015),
            ("2E2", 200.0),
            ("wool + 228", 368.0),
            ("wool-10", 130.0),
            ("10 - 4 - 3", 3.0),
            ("2 + 3 * 4", 14.0),
            ("(2 + 3) * 4", 20.0),
            ("100 / 10 / 5", 2.0),
            ("-(wool + 10) / 2", -75.0),
            ("3 - -2", 5.0),
            ("-cavity_free(1)", f64::NAN),
            ("max(wool, 20, 2 * 100)", 200.0),
            ("min(wool, 20)", 20.0),
            ("sqrt(abs(-16))", 4.0),
            ("Dämmung_2 * 2", 120.0),
        ] {
            if expected.is_nan() {
                assert!(value(text).is_err(), "{text}");
            } else {
                assert_eq!(value(text), Ok(expected), "{text}");
            }
        }
    }

    #[test]
    fn faults_point_at_their_place() {
        use ExpressionFault::*;
        let owned = str::to_owned;
        assert_eq!(fault("wol + 228"), (UnknownName { name: owned("wol") }, "wol"));
        assert_eq!(fault("228 + broken"), (Reported, "broken"));
        assert_eq!(fault("2 * sine(3)"), (UnknownFunction { name: owned("sine") }, "sine"));
        assert_eq!(fault("1 / (wool - 140)"), (DivisionByZero, "(wool - 140)"));
        assert_eq!(fault("1e200 * 1e200 + 1"), (NotFinite, "1e200 * 1e200"));
        assert_eq!(fault("1e999"), (NotFinite, "1e999"));
        assert_eq!(fault("sqrt(0 - 1)"), (RootOfNegative, "sqrt(0 - 1)"));
        assert_eq!(fault("max(1)"), (WrongArguments { function: "max", expected: None, found: 1 }, "max(1)"));
        assert_eq!(fault("abs(1, 2)"), (WrongArguments { function: "abs", expected: Some(1), found: 2 }, "abs(1, 2)"));
        assert_eq!(fault("wool +"), (NoValue { found: owned("") }, ""));
        assert_eq!(fault("2 ** 3"), (NoValue { found: owned("*") }, "*"));
        assert_eq!(fault("max()"), (NoValue { found: owned(")") }, ")"));
        assert_eq!(fault("140 mm"), (Unit { name: owned("mm") }, "mm"));
        assert_eq!(fault("140mm"), (Unit { name: owned("mm") }, "mm"));
        assert_eq!(fault("mineral wool"), (UnknownName { name: owned("mineral") }, "mineral"));
        assert_eq!(fault("wool wool"), (NoOperator { found: owned("wool") }, "wool"));
        assert_eq!(fault("2(3)"), (NoOperator { found: owned("(") }, "("));
        assert_eq!(fault("12,5"), (Comma { with_point: Some(owned("12.5")) }, ","));
        assert_eq!(fault("(wool, 3)"), (Comma { with_point: None }, ","));
        assert_eq!(fault(".nan"), (NotANumber { written: owned(".nan") }, ".nan"));
        assert_eq!(fault("-.inf"), (NotANumber { written: owned(".inf") }, ".inf"));
        assert_eq!(fault("50 %"), (StrangeCharacter { found: '%' }, "%"));
        assert_eq!(fault("3 − 2"), (StrangeCharacter { found: '−' }, "−"));
        assert_eq!(fault("(1 + (2)"), (Unclosed, "("));
        assert_eq!(fault("1 + 2)"), (Unopened, ")"));
        assert_eq!(fault(""), (NoValue { found: owned("") }, ""));
    }

    #[test]
    fn nesting_is_limited_and_long_chains_are_not() {
        let nested = |depth: usize| format!("{}1{}", "(".repeat(depth), ")".repeat(depth));
        assert_eq!(value(&nested(DEPTH_LIMIT)), Ok(1.0));
        assert_eq!(value(&nested(DEPTH_LIMIT + 1)).unwrap_err().kind, ExpressionFault::TooDeep);
        assert_eq!(value(&"(".repeat(1_000_000)).unwrap_err().kind, ExpressionFault::TooDeep);
        assert_eq!(value(&format!("0{}", "+1".repeat(100_000))), Ok(100_000.0));
        assert_eq!(value(&format!("{}1", "-".repeat(100_001))), Ok(-1.0));
    }

    #[test]
    fn names_are_listed_without_functions() {
        assert_eq!(names("max (a, b2) + _c * 2 - a"), ["a", "b2", "_c", "a"]);
        assert!(is_name("wool_2") && is_name("Dämmung"));
        assert!(!is_name("2_wool") && !is_name("wool-2") && !is_name("") && !is_name("a b"));
    }
}

//! Numbers of a file: expressions, with their unit and what they may be.

use super::document::Span;
use super::expression::{ExpressionFault, Fault, evaluate, function_names};
use super::names::{FirstNames, MOST_COUNTED};
use super::problem::{KeyProblem, Limit, NumberProblem};
use super::reader::Reader;
use super::tree::{Content, Node};

/// No coordinate lies further out, in metres. A building that large was written in the wrong unit.
const LENGTH_LIMIT_M: f64 = 10_000.0;

/// The longest expression, in bytes.
const LONGEST_EXPRESSION: usize = 2000;

/// Lengths up to this, in metres, are nothing but the rounding of sums that should be zero.
pub(super) const NOTHING_M: f64 = 1e-9;

/// What a number is and what it may be.
pub(super) struct Measure {
    /// Which number: "the conductivity of `wool`".
    pub(super) what: String,
    /// Its unit, for messages.
    pub(super) unit: &'static str,
    pub(super) limits: &'static [Limit],
    /// What to do if it breaks a limit.
    pub(super) advice: Option<&'static str>,
}

impl Reader<'_> {
    /// Any finite number.
    pub(super) fn number(&mut self, node: &Node, what: &str) -> Option<f64> {
        let text = self.expression_text(node, what)?;
        match evaluate(text, &mut |name| self.parameters.look_up(name)) {
            Ok(value) => Some(value),
            Err(fault) => {
                self.report_fault(node, text, fault);
                None
            }
        }
    }

    /// The text of a node that is to be a number; anything that cannot be one is reported.
    pub(super) fn expression_text<'n>(&mut self, node: &'n Node, what: &str) -> Option<&'n str> {
        match &node.content {
            Content::Scalar { text, quoted: false } if !node.is_nothing() => {
                if text.len() > LONGEST_EXPRESSION {
                    self.report_fault(node, text, Fault { range: 0..text.len(), kind: ExpressionFault::TooLong });
                    return None;
                }
                Some(text)
            }
            Content::Scalar { quoted: true, .. } => {
                self.report(node.span, NumberProblem::QuotedNumber { what: what.to_owned() });
                None
            }
            _ => {
                self.wrong_type(node, what.to_owned(), "a number", String::new());
                None
            }
        }
    }

    /// Reports why an expression has no value, at its place within the expression.
    pub(super) fn report_fault(&mut self, node: &Node, text: &str, fault: Fault) {
        if fault.kind == ExpressionFault::Reported {
            return;
        }
        // the expression stands in the file as it is, unless it runs over several lines
        let written = &self.text[node.span.start..node.span.end];
        let span = match written.strip_suffix(text) {
            Some(before) => {
                let start = node.span.start + before.len();
                Span { start: start + fault.range.start, end: start + fault.range.end }
            }
            None => node.span,
        };
        let parameters = std::mem::take(&mut self.parameters);
        let (nearest, known) = match &fault.kind {
            ExpressionFault::UnknownName { name } => {
                let nearest = self.suggest(name, parameters.names()).map(str::to_owned);
                let known = if nearest.is_none() {
                    FirstNames::of(parameters.names().take(MOST_COUNTED))
                } else {
                    FirstNames::default()
                };
                (nearest, known)
            }
            ExpressionFault::UnknownFunction { name } => {
                (self.suggest(name, function_names()).map(str::to_owned), FirstNames::default())
            }
            _ => (None, FirstNames::default()),
        };
        self.parameters = parameters;
        self.report(span, NumberProblem::Expression { fault: fault.kind, nearest, parameters: known });
    }

    /// A number with a unit that keeps its limits.
    pub(super) fn measure(&mut self, node: &Node, measure: &Measure) -> Option<f64> {
        let value = self.number(node, &measure.what)?;
        let broken = measure.limits.iter().find(|limit| !limit.holds(value));
        if let Some(limit) = broken {
            let problem = NumberProblem::OutOfRange {
                what: measure.what.clone(),
                value,
                unit: measure.unit,
                limit: *limit,
                advice: measure.advice,
            };
            self.report(node.span, problem);
            return None;
        }
        Some(value)
    }

    /// A length or coordinate in the file's unit.
    pub(super) fn length(&mut self, node: &Node, what: &str) -> Option<f64> {
        let value = self.number(node, what)?;
        let most = LENGTH_LIMIT_M / self.unit.in_metres();
        let limit = if value < 0.0 { Limit::AtLeast(-most) } else { Limit::AtMost(most) };
        if !limit.holds(value) {
            let advice = Some("check `unit`: it holds for every length in the file");
            let problem =
                NumberProblem::OutOfRange { what: what.to_owned(), value, unit: self.unit.symbol(), limit, advice };
            self.report(node.span, problem);
            return None;
        }
        Some(value)
    }

    /// A length more than zero, in the file's unit.
    pub(super) fn positive_length(&mut self, node: &Node, what: &str) -> Option<f64> {
        let value = self.length(node, what)?;
        if self.unit.metres(value) <= NOTHING_M {
            let limit = Limit::MoreThan(0.0);
            let problem = NumberProblem::OutOfRange {
                what: what.to_owned(),
                value,
                unit: self.unit.symbol(),
                limit,
                advice: None,
            };
            self.report(node.span, problem);
            return None;
        }
        Some(value)
    }

    /// Two lengths or coordinates in a list, in the file's unit.
    pub(super) fn two_lengths(&mut self, node: &Node, what: &str, pair: &Pair) -> Option<[f64; 2]> {
        let items = self.list(node, what, pair.list, pair.example)?;
        if let [first, second] = items {
            let (first, second) = (self.length(first, what), self.length(second, what));
            return Some([first?, second?]);
        }
        let split = |item: &Node| item.text().is_some_and(|text| text.matches('(').count() > text.matches(')').count());
        match items.iter().find(|item| split(item)) {
            Some(item) => self.report(item.span, NumberProblem::FunctionInBrackets),
            None => {
                let (expected, example) = (pair.expected, pair.example);
                let what = what.to_owned();
                self.report(node.span, KeyProblem::WrongCount { what, expected, found: items.len(), example });
            }
        }
        None
    }

    /// A point in metres.
    pub(super) fn point(&mut self, node: &Node, what: &str) -> Option<[f64; 2]> {
        let point = self.two_lengths(node, what, &POINT)?;
        Some(point.map(|coordinate| self.unit.metres(coordinate)))
    }
}

/// What a list of two numbers is.
pub(super) struct Pair {
    pub(super) expected: &'static str,
    pub(super) list: &'static str,
    pub(super) example: &'static str,
}

pub(super) const RANGE: Pair =
    Pair { expected: "two numbers, from and to", list: "a list of two numbers, from and to", example: "`[0, 200]`" };
pub(super) const POINT: Pair =
    Pair { expected: "two numbers, x and y", list: "a list of two numbers, x and y", example: "`[0, 200]`" };

/// A number as one would write it: no digits that say nothing, no endless row of zeros.
pub(super) fn plain(value: f64) -> String {
    // sums such as 0.1 + 0.2 leave dust behind the tenth digit
    let rounded: f64 = format!("{value:.10e}").parse().unwrap_or(value);
    let size = rounded.abs();
    if size == 0.0 {
        "0".to_owned()
    } else if (1e-6..1e12).contains(&size) {
        format!("{rounded}")
    } else {
        format!("{rounded:e}")
    }
}

//! Errors of YAML's syntax, explained for someone who writes a junction file and no YAML otherwise.
//!
//! The parser says where it gave up and, in its own terms, why. From that and the text around, the likely slip is
//! found: a tab, a bracket left open, a missing space after a colon. Where the parser's words are unknown, for instance
//! those of a later version, the explanation is a general one; nothing else depends on them.

use super::document::Span;
use super::problem::SyntaxProblem;

/// The first character that has no business in the file: a control character, or a space that only looks like one
/// in the indentation, where it would become part of a key.
pub(super) fn strange_character(text: &str) -> Option<(Span, SyntaxProblem)> {
    let mut indentation = true;
    for (start, found) in text.char_indices() {
        let strange = match found {
            '\t' | '\n' | '\r' => false,
            '\u{feff}' => start > 0,
            '\u{fffe}' | '\u{ffff}' => true,
            _ => found.is_control(),
        };
        let span = Span { start, end: start + found.len_utf8() };
        if strange {
            return Some((span, SyntaxProblem::StrangeCharacter { code: u32::from(found) }));
        }
        if indentation && found.is_whitespace() && !found.is_ascii() {
            return Some((span, SyntaxProblem::OddSpace));
        }
        indentation = found == '\n' || (indentation && found == ' ');
    }
    None
}

/// What went wrong where the parser gave up at byte `at` for the reason `info`.
pub(super) fn explain(text: &str, at: usize, info: &str) -> (Span, SyntaxProblem) {
    let at = super::location::char_start(text, at);
    let says = |words: &str| info.contains(words);
    if says("recursion limit") {
        return (one_character(text, at), SyntaxProblem::TooDeep);
    }
    if let Some(found) = tab(text, at) {
        return found;
    }
    let marks = Marks::before(text, at);
    if says("quoted scalar") || marks.quote.is_some() {
        return explain_quotes(text, at, info, &marks);
    }
    if says("misplaced bracket") {
        return (one_character(text, at), SyntaxProblem::UnopenedBracket);
    }
    if says("unknown anchor") {
        let place = word(text, at);
        let name = text[place.start..place.end].trim_start_matches('*').to_owned();
        return (place, SyntaxProblem::UnknownAlias { name });
    }
    if says("unexpected character") || says("anchor or alias") || says("mapping keys are not allowed") {
        let found = text[at..].chars().next().unwrap_or(' ');
        return (one_character(text, at), SyntaxProblem::ReservedCharacter { found });
    }
    if let Some((open, closed)) = marks.mismatch {
        return wrong_bracket(text, open, closed);
    }
    if let Some(open) = marks.brackets.last() {
        return explain_brackets(text, at, info, *open);
    }
    explain_lines(text, at, info)
}

fn explain_quotes(text: &str, at: usize, info: &str, marks: &Marks) -> (Span, SyntaxProblem) {
    if info.contains("trailing content") {
        return (one_character(text, at), SyntaxProblem::TextAfterQuote);
    }
    if ["escape", "hexadecimal"].iter().any(|word| info.contains(word)) {
        return (one_character(text, at), SyntaxProblem::Backslash);
    }
    let open = marks.quote.unwrap_or(at);
    (one_character(text, open), SyntaxProblem::UnclosedQuote)
}

fn explain_brackets(text: &str, at: usize, info: &str, open: usize) -> (Span, SyntaxProblem) {
    let expected = closing(text[open..].chars().next());
    let found = text[at..].chars().next();
    let unclosed = (one_character(text, open), SyntaxProblem::UnclosedBracket { expected });
    match found {
        None => unclosed,
        Some(']' | '}') if found != Some(expected) => wrong_bracket(text, open, at),
        _ if text[open..at].contains('\n') => unclosed,
        _ if info.contains("\"-\" is only valid") || info.contains("cannot start with '-'") => {
            (one_character(text, at), SyntaxProblem::DashInBrackets)
        }
        _ => (one_character(text, at), SyntaxProblem::MissingComma),
    }
}

fn wrong_bracket(text: &str, open: usize, closed: usize) -> (Span, SyntaxProblem) {
    let expected = closing(text[open..].chars().next());
    (one_character(text, closed), SyntaxProblem::WrongBracket { expected, opened: one_character(text, open) })
}

fn explain_lines(text: &str, at: usize, info: &str) -> (Span, SyntaxProblem) {
    let line = line_at(text, at);
    if info.contains("':'") || info.contains("simple key expect") {
        // noticed late: the line at fault is the last one with something on it
        let culprit = if at < text.len() && at > line.start { line } else { last_line_before(text, at) };
        return explain_line_without_key(text, culprit);
    }
    let before = &text[line.start..at];
    if info.contains("mapping values are not allowed") {
        let previous = last_line_before(text, line.start);
        let written = &text[previous.start..previous.end];
        if before.contains(": ") {
            return (one_character(text, at), SyntaxProblem::ColonInText);
        }
        if !written.trim_start().starts_with('#') && !written.contains(": ") && !written.trim_end().ends_with(':') {
            return explain_line_without_key(text, previous);
        }
        return indentation(text, line, previous);
    }
    if before.trim_matches([' ', '-']).is_empty() {
        return indentation(text, line, last_line_before(text, line.start));
    }
    let end = text[..line.end].trim_end().len().max(at);
    (Span { start: at, end }, SyntaxProblem::OutOfPlace)
}

fn explain_line_without_key(text: &str, line: Span) -> (Span, SyntaxProblem) {
    let written = text[line.start..line.end].trim();
    let start = line.start + text[line.start..line.end].find(written).unwrap_or(0);
    let whole = Span { start, end: start + written.len() };
    let after_dash = written.strip_prefix('-').unwrap_or("");
    if after_dash.starts_with(|c: char| !c.is_whitespace() && c != '-') {
        return (Span { start, end: start + 1 }, SyntaxProblem::NoSpaceAfterDash);
    }
    let key = written.split(':').next().unwrap_or("");
    if key.len() < written.len() {
        let colon = start + key.len();
        return (Span { start: colon, end: colon + 1 }, SyntaxProblem::NoSpaceAfterColon);
    }
    (whole, SyntaxProblem::NoColon)
}

fn indentation(text: &str, line: Span, previous: Span) -> (Span, SyntaxProblem) {
    let spaces = |line: Span| text[line.start..line.end].chars().take_while(|c| *c == ' ').count();
    let start = line.start + spaces(line);
    let end = text[..line.end].trim_end().len().max(start);
    let problem = SyntaxProblem::Indentation { spaces: spaces(line), spaces_above: spaces(previous) };
    (Span { start, end }, problem)
}

/// A tab in the indentation of the line at `at` or the one after it, or just before `at`.
fn tab(text: &str, at: usize) -> Option<(Span, SyntaxProblem)> {
    let line = line_at(text, at);
    let next = if line.end < text.len() { line_at(text, line.end + 1) } else { line };
    for line in [line, next] {
        let written = &text[line.start..line.end];
        let indentation = &written[..written.len() - written.trim_start_matches([' ', '\t']).len()];
        if let Some(offset) = indentation.find('\t') {
            let start = line.start + offset;
            return Some((Span { start, end: start + 1 }, SyntaxProblem::TabIndentation));
        }
    }
    let before = &text[line.start..at];
    before.ends_with('\t').then(|| (Span { start: at - 1, end: at }, SyntaxProblem::Tab))
}

/// Brackets and quotes left open before a place, found by a plain reading: good enough to explain an error.
struct Marks {
    brackets: Vec<usize>,
    /// The first bracket that was closed by one of the other kind, and where.
    mismatch: Option<(usize, usize)>,
    quote: Option<usize>,
}

impl Marks {
    fn before(text: &str, at: usize) -> Self {
        let mut marks = Self { brackets: Vec::new(), mismatch: None, quote: None };
        let mut previous = '\n';
        let mut significant = '\n';
        let mut in_comment = false;
        let mut characters = text[..at].char_indices().peekable();
        while let Some((place, c)) = characters.next() {
            // brackets and quotes open at the start of a value only; inside a word they are text
            let starts_value = matches!(significant, '\n' | ':' | '-' | ',' | '[' | '{');
            if let Some(open) = marks.quote {
                let quote = text[open..].chars().next().unwrap_or('"');
                match c {
                    '\\' if quote == '"' => drop(characters.next()),
                    '\'' if c == quote && matches!(characters.peek(), Some((_, '\''))) => drop(characters.next()),
                    _ if c == quote => marks.quote = None,
                    _ => {}
                }
            } else if in_comment {
                in_comment = c != '\n';
            } else {
                match c {
                    '#' if previous.is_whitespace() => in_comment = true,
                    '"' | '\'' if starts_value => marks.quote = Some(place),
                    '[' | '{' if starts_value || !marks.brackets.is_empty() => marks.brackets.push(place),
                    ']' | '}' => {
                        let open = marks.brackets.pop();
                        let other = open.filter(|open| closing(text[*open..].chars().next()) != c);
                        marks.mismatch = marks.mismatch.or(other.map(|open| (open, place)));
                    }
                    _ => {}
                }
            }
            if !c.is_whitespace() || c == '\n' {
                significant = c;
            }
            previous = c;
        }
        marks
    }
}

fn closing(open: Option<char>) -> char {
    if open == Some('{') { '}' } else { ']' }
}

fn one_character(text: &str, at: usize) -> Span {
    Span { start: at, end: at + text[at..].chars().next().map_or(0, char::len_utf8) }
}

fn word(text: &str, at: usize) -> Span {
    let length = text[at..].find(|c: char| c.is_whitespace() || ",]}".contains(c)).unwrap_or(text.len() - at);
    Span { start: at, end: at + length }
}

fn line_at(text: &str, at: usize) -> Span {
    let start = text[..at].rfind('\n').map_or(0, |newline| newline + 1);
    let end = text[at..].find('\n').map_or(text.len(), |newline| at + newline);
    Span { start, end }
}

/// The last line before the one at `at` that holds something besides a comment; that one itself if there is none.
fn last_line_before(text: &str, at: usize) -> Span {
    let mut line = line_at(text, at);
    while line.start > 0 {
        line = line_at(text, line.start - 1);
        let written = text[line.start..line.end].trim();
        if !written.is_empty() && !written.starts_with('#') {
            return line;
        }
    }
    line_at(text, at)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::input::problem::Problem;
    use crate::input::tree::build;

    /// What is wrong with a text, and the place it is shown at.
    fn wrong(text: &str) -> (SyntaxProblem, &str) {
        let mut problems = build(text).problems;
        assert_eq!(problems.len(), 1, "{text:?}: {problems:?}");
        match problems.remove(0) {
            (span, Problem::Syntax(problem)) => (problem, &text[span.start..span.end]),
            other => panic!("{text:?}: {other:?}"),
        }
    }

    #[test]
    fn tabs_and_special_spaces_are_named() {
        assert_eq!(wrong("a:\n\tb: 1\n"), (SyntaxProblem::TabIndentation, "\t"));
        assert_eq!(wrong("a:\n  b: 1\n\tc: 2\n"), (SyntaxProblem::TabIndentation, "\t"));
        assert_eq!(wrong("a:\t1\n"), (SyntaxProblem::Tab, "\t"));
        assert_eq!(wrong("a:\n  b: 1\n\u{a0} c: 2\n"), (SyntaxProblem::OddSpace, "\u{a0}"));
        assert_eq!(wrong("a: 1\0\n"), (SyntaxProblem::StrangeCharacter { code: 0 }, "\0"));
    }

    #[test]
    fn indentation_is_told_from_other_slips() {
        let indentation = |spaces, spaces_above| SyntaxProblem::Indentation { spaces, spaces_above };
        assert_eq!(wrong("a:\n  b: 1\n   c: 2\n"), (indentation(3, 2), "c: 2"));
        assert_eq!(wrong("a:\n   b: 1\n  c: 2\n"), (indentation(2, 3), "c: 2"));
        assert_eq!(wrong("a:\n  - b: 1\n - c: 2\n"), (indentation(1, 2), "- c: 2"));
        assert_eq!(wrong("a:\n  - b: 1\n  c: 2\n"), (indentation(2, 2), "c: 2"));
        assert_eq!(wrong("a: x: y\nb: 1\n"), (SyntaxProblem::ColonInText, ":"));
        assert_eq!(wrong("a: 1\nwall\nb: 3\n"), (SyntaxProblem::NoColon, "wall"));
        assert_eq!(wrong("a: 1\nwall\n"), (SyntaxProblem::NoColon, "wall"));
        assert_eq!(wrong("a: 1\nb:2\n# note\nc: 3\n"), (SyntaxProblem::NoSpaceAfterColon, ":"));
        assert_eq!(wrong("a:1\nb: 2\n"), (SyntaxProblem::NoSpaceAfterColon, ":"));
        assert_eq!(wrong("a:\n-b\nc: 1\n").0, SyntaxProblem::NoSpaceAfterDash);
        assert_eq!(wrong("a: {b: 1} c\n"), (SyntaxProblem::OutOfPlace, "c"));
    }

    #[test]
    fn brackets_and_quotes_are_shown_where_they_open() {
        let unclosed = |expected| SyntaxProblem::UnclosedBracket { expected };
        assert_eq!(wrong("a: [1, 2\nb: 3\n"), (unclosed(']'), "["));
        assert_eq!(wrong("a: {x: 1, y: 2\nb: 3\n"), (unclosed('}'), "{"));
        assert_eq!(wrong("a: # [ not this\n  [1, \"]\", it's\n"), (unclosed(']'), "["));
        assert_eq!(wrong("a: [1, 2]]\nb: 3\n"), (SyntaxProblem::UnopenedBracket, "]"));
        assert!(matches!(wrong("a: {y: [2, 3}\n"), (SyntaxProblem::WrongBracket { expected: ']', .. }, "}")));
        assert_eq!(wrong("b: {x: 1 y: 2}\n"), (SyntaxProblem::MissingComma, ":"));
        assert_eq!(wrong("a: [[1, 2] [3, 4]]\n"), (SyntaxProblem::MissingComma, "["));
        assert_eq!(wrong("a: [-x, - y]\n"), (SyntaxProblem::DashInBrackets, "-"));
        assert_eq!(wrong("a: \"abc\nb: 3\n"), (SyntaxProblem::UnclosedQuote, "\""));
        assert_eq!(wrong("a: 'abc"), (SyntaxProblem::UnclosedQuote, "'"));
        assert_eq!(wrong("a: 'it's fine'\n"), (SyntaxProblem::TextAfterQuote, "s"));
        assert_eq!(wrong("a: \"C:\\data\"\n").0, SyntaxProblem::Backslash);
    }

    #[test]
    fn characters_with_a_meaning_in_yaml_are_named() {
        assert_eq!(wrong("x: @2\n"), (SyntaxProblem::ReservedCharacter { found: '@' }, "@"));
        assert_eq!(wrong("x: *wool\n"), (SyntaxProblem::UnknownAlias { name: "wool".to_owned() }, "*wool"));
        assert_eq!(wrong("x: * 2\n").0, SyntaxProblem::ReservedCharacter { found: '*' });
        assert_eq!(wrong("x: ? y\n").0, SyntaxProblem::ReservedCharacter { found: '?' });
    }

    #[test]
    fn unknown_words_of_the_parser_are_explained_in_general() {
        let text = "a: 1\n  b\n";
        assert_eq!(explain(text, 7, "something new").1, SyntaxProblem::Indentation { spaces: 2, spaces_above: 0 });
        assert_eq!(explain(text, 3, "something new").1, SyntaxProblem::OutOfPlace);
        assert_eq!(
            explain(text, text.len(), "something new").1,
            SyntaxProblem::Indentation { spaces: 0, spaces_above: 2 }
        );
        assert_eq!(explain("", 0, "something new").0, Span::default());
    }
}

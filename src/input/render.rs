//! Diagnostics as people read them: the message, file, line and column, the quoted line, and what to write instead.

use annotate_snippets::{AnnotationKind, Element, Group, Level, Origin, Renderer, Snippet, normalize_untrusted_str};

use super::diagnostic::{Diagnostic, Severity};
use super::document::{Source, Span};
use super::location::char_start;

/// So many diagnostics are written out; the rest is counted.
const SHOWN: usize = 40;

/// Places further apart than this many bytes are quoted one by one, without the lines between them.
const WINDOW: usize = 20_000;

/// Writes the diagnostics out in the order given, each followed by an empty line. `colour` adds terminal colours.
pub fn render(source: &Source, diagnostics: &[Diagnostic], colour: bool) -> String {
    let renderer = if colour { Renderer::styled() } else { Renderer::plain() };
    let mut output = String::new();
    for diagnostic in diagnostics.iter().take(SHOWN) {
        let report = [group(source, diagnostic)];
        output.push_str(&renderer.render(&report));
        output.push_str("\n\n");
    }
    let hidden = diagnostics.len().saturating_sub(SHOWN);
    if hidden > 0 {
        let title = Level::NOTE.primary_title(format!("{hidden} more of {}", source.name));
        let help = Level::HELP.message("correct those above first; many of the others may go with them");
        output.push_str(&renderer.render(&[title.element(help)]));
        output.push_str("\n\n");
    }
    output
}

fn group<'a>(source: &'a Source, diagnostic: &'a Diagnostic) -> Group<'a> {
    let level = match diagnostic.severity {
        Severity::Error => Level::ERROR,
        Severity::Warning => Level::WARNING,
    };
    let mut group = Group::with_title(level.primary_title(diagnostic.message.as_str()));
    match diagnostic.span {
        Some(span) => group = group.elements(quotes(source, span, diagnostic)),
        None => group = group.element(Origin::path(normalize_untrusted_str(&source.name))),
    }
    if let Some(help) = &diagnostic.help {
        // each line on its own, as control characters are made visible and a line break is one
        let help: Vec<String> = help.lines().map(normalize_untrusted_str).collect();
        group = group.element(Level::HELP.message(help.join("\n")));
    }
    group
}

/// A place to mark in the text.
struct Mark<'a> {
    kind: AnnotationKind,
    span: Span,
    label: &'a str,
}

/// The quoted lines: in one piece where all places are near each other, else one piece a place.
fn quotes<'a>(source: &'a Source, span: Span, diagnostic: &'a Diagnostic) -> Vec<Element<'a>> {
    let primary =
        Mark { kind: AnnotationKind::Primary, span: in_one_line(&source.text, span), label: &diagnostic.label };
    let mut marks = vec![primary];
    for related in &diagnostic.related {
        let span = in_one_line(&source.text, related.span);
        marks.push(Mark { kind: AnnotationKind::Context, span, label: &related.label });
    }
    let first = marks.iter().map(|mark| mark.span.start).min().unwrap_or(0);
    let last = marks.iter().map(|mark| mark.span.end).max().unwrap_or(0);
    if last - first <= WINDOW {
        vec![quote(source, marks).into()]
    } else {
        marks.into_iter().map(|mark| quote(source, vec![mark]).into()).collect()
    }
}

fn quote<'a>(source: &'a Source, marks: Vec<Mark<'a>>) -> Snippet<'a, annotate_snippets::Annotation<'a>> {
    let text = &source.text;
    let first = marks.iter().map(|mark| mark.span.start).min().unwrap_or(0);
    let last = marks.iter().map(|mark| mark.span.end).max().unwrap_or(0);
    let start = line_start(text, first);
    let end = text[last..].find('\n').map_or(text.len(), |newline| last + newline);
    let lines_before = text[..start].bytes().filter(|byte| *byte == b'\n').count();
    let annotations = marks.into_iter().map(|mark| {
        let label = (!mark.label.is_empty()).then(|| normalize_untrusted_str(mark.label));
        mark.kind.span(mark.span.start - start..mark.span.end - start).label(label)
    });
    Snippet::source(text[start..end].trim_end_matches('\r'))
        .path(normalize_untrusted_str(&source.name))
        .line_start(lines_before + 1)
        .annotations(annotations)
}

/// The part of a span in its first line, on character boundaries; a place after the last line goes to its end.
fn in_one_line(text: &str, span: Span) -> Span {
    let mut start = char_start(text, span.start);
    if start == text.len() {
        start = text.trim_end_matches(['\n', '\r']).len();
    }
    let line_end = text[start..].find(['\n', '\r']).map_or(text.len(), |newline| start + newline);
    let end = char_start(text, span.end.clamp(start, line_end));
    Span { start, end }
}

fn line_start(text: &str, offset: usize) -> usize {
    let start = text[..offset].rfind('\n').map_or(0, |newline| newline + 1);
    // a byte-order mark is no character of the first line
    if text[start..offset].starts_with('\u{feff}') { start + '\u{feff}'.len_utf8() } else { start }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::input::Related;

    fn error(start: usize, end: usize, label: &str) -> Diagnostic {
        Diagnostic {
            severity: Severity::Error,
            span: Some(Span { start, end }),
            message: "something is wrong".to_owned(),
            label: label.to_owned(),
            help: None,
            related: Vec::new(),
        }
    }

    fn source(text: &str) -> Source {
        Source { name: "wall.yaml".to_owned(), text: text.to_owned() }
    }

    #[test]
    fn message_place_line_label_help_and_related_place_are_shown() {
        let mut diagnostic = error(18, 23, "written again");
        diagnostic.help = Some("remove one\nof them".to_owned());
        diagnostic.related = vec![Related { span: Span { start: 9, end: 14 }, label: "first here".to_owned() }];
        let expected = "\
error: something is wrong
 --> wall.yaml:3:1
  |
2 | title: a
  | ----- first here
3 | title: b
  | ^^^^^ written again
  |
  = help: remove one
          of them

";
        assert_eq!(render(&source("unit: mm\ntitle: a\ntitle: b"), &[diagnostic], false), expected);
    }

    #[test]
    fn places_outside_the_text_do_not_panic() {
        for text in ["", "\n", "λ", "a\r\nb\r\n", "\u{feff}a"] {
            for start in 0..8 {
                for end in 0..8 {
                    let shown = render(&source(text), &[error(start, end, "here")], true);
                    assert!(shown.contains("here"), "{text:?} {start} {end}: {shown}");
                }
            }
        }
    }

    #[test]
    fn a_long_line_is_cut_around_the_place() {
        let text = format!("x: [{}]", "100, ".repeat(100_000));
        let shown = render(&source(&text), &[error(250_004, 250_007, "here")], false);
        assert!(shown.contains("wall.yaml:1:250005"));
        assert!(shown.lines().all(|line| line.chars().count() < 160), "{shown}");
    }

    #[test]
    fn of_many_diagnostics_the_first_are_shown_and_the_rest_counted() {
        let many: Vec<Diagnostic> = (0..SHOWN + 7).map(|_| error(0, 1, "")).collect();
        let shown = render(&source("a: b"), &many, false);
        assert_eq!(shown.matches("something is wrong").count(), SHOWN);
        assert!(shown.contains("7 more of wall.yaml"));
    }

    #[test]
    fn escape_sequences_of_a_file_do_not_reach_the_terminal() {
        let mut diagnostic = error(0, 1, "\u{1b}[2J");
        diagnostic.help = Some("\u{1b}[2J".to_owned());
        diagnostic.message = "\u{1b}[2J".to_owned();
        let mut source = source("a: \u{1b}[2J");
        source.name = "\u{1b}[2J".to_owned();
        let shown = render(&source, &[diagnostic.clone()], false);
        assert!(!shown.contains('\u{1b}'), "{shown:?}");
        diagnostic.span = None;
        let shown = render(&source, &[diagnostic], false);
        assert!(!shown.contains('\u{1b}'), "{shown:?}");
    }
}

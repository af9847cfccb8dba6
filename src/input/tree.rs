//! YAML text as a tree of positioned nodes: duplicates kept, aliases followed, limits enforced.
//!
//! Nothing here knows what a junction file means. Tags (`!…`), keys that are lists or blocks and a second document in
//! the file are refused: this format has no use for them, and each hides what a file says.

use std::collections::BTreeMap;
use std::rc::Rc;

use saphyr_parser::{Event, Parser, ScalarStyle};

use super::document::Span;
use super::problem::{FileProblem, Problem, SyntaxProblem};
use super::syntax;

/// How deep lists and blocks may nest; a junction file needs six levels.
pub(super) const DEPTH_LIMIT: usize = 32;

/// The most values a file may hold once aliases are followed. 20,000 boxes of four numbers each take 240,000.
pub(super) const NODE_LIMIT: usize = 600_000;

/// The most entries a list may have, and the most regions a section may have once build-ups are laid out.
pub(super) const LIST_LIMIT: usize = 20_000;

/// A value of the file and where it stands. An alias is the very node it points to.
#[derive(Debug)]
pub(super) struct Node {
    pub(super) span: Span,
    pub(super) content: Content,
}

/// What a value is.
#[derive(Debug)]
pub(super) enum Content {
    /// A word, number or text; `quoted` if it is one in quotes or a `|` or `>` block, and so certainly text.
    Scalar { text: String, quoted: bool },
    /// A list.
    List(Vec<Rc<Node>>),
    /// Keys with their values in file order; keys are scalars.
    Mapping(Vec<(Rc<Node>, Rc<Node>)>),
}

impl Node {
    /// Whether nothing was written: `key:` alone, `~` or `null`.
    pub(super) fn is_nothing(&self) -> bool {
        matches!(&self.content, Content::Scalar { text, quoted: false } if matches!(text.as_str(), "" | "~" | "null"))
    }

    /// The text of a scalar.
    pub(super) fn text(&self) -> Option<&str> {
        match &self.content {
            Content::Scalar { text, .. } => Some(text),
            _ => None,
        }
    }
}

/// What was found in a file: its tree, if it could be read to the end, and what is wrong with the YAML itself.
pub(super) struct Tree {
    pub(super) root: Option<Rc<Node>>,
    pub(super) problems: Vec<(Span, Problem)>,
}

/// Reads YAML. Stops at the first error of syntax or exceeded limit; other problems do not stop it.
pub(super) fn build(text: &str) -> Tree {
    let mut builder = Builder::new(text);
    if let Some((span, problem)) = syntax::strange_character(text) {
        return Tree { root: None, problems: vec![(span, Problem::Syntax(problem))] };
    }
    let mut parser = Parser::new_from_str(text);
    while let Some(next) = parser.next_event() {
        let outcome = match next {
            Ok((event, span)) => builder.event(event, span),
            Err(error) => {
                let at = builder.byte(error.marker().index());
                let (span, problem) = syntax::explain(text, at, error.info());
                Err((span, Problem::Syntax(problem)))
            }
        };
        if let Err(problem) = outcome {
            builder.problems.push(problem);
            return Tree { root: None, problems: builder.problems };
        }
    }
    Tree { root: builder.root, problems: builder.problems }
}

/// A finished node with what an alias to it costs: values in it, and levels of nesting.
#[derive(Clone)]
struct Counted {
    node: Rc<Node>,
    values: usize,
    levels: usize,
}

/// A list or mapping that is being read.
struct Open {
    start: usize,
    in_brackets: bool,
    anchor: usize,
    values_before: usize,
    levels: usize,
    children: Children,
}

enum Children {
    List(Vec<Rc<Node>>),
    Mapping { entries: Vec<(Rc<Node>, Rc<Node>)>, key: Option<Rc<Node>> },
}

struct Builder<'t> {
    text: &'t str,
    /// Byte of each character, where they differ; the parser counts characters.
    bytes: Option<Vec<u32>>,
    open: Vec<Open>,
    /// Finished anchored values; one that is still being read is missing.
    anchors: BTreeMap<usize, Counted>,
    values: usize,
    documents: usize,
    root: Option<Rc<Node>>,
    problems: Vec<(Span, Problem)>,
}

type Stop = (Span, Problem);

impl<'t> Builder<'t> {
    fn new(text: &'t str) -> Self {
        let bytes = (!text.is_ascii()).then(|| {
            let byte = |(byte, _)| u32::try_from(byte).expect("files are limited to 16 MiB");
            text.char_indices().map(byte).collect()
        });
        Self {
            text,
            bytes,
            open: Vec::new(),
            anchors: BTreeMap::new(),
            values: 0,
            documents: 0,
            root: None,
            problems: Vec::new(),
        }
    }

    fn byte(&self, character: usize) -> usize {
        match &self.bytes {
            None => character.min(self.text.len()),
            Some(bytes) => bytes.get(character).map_or(self.text.len(), |byte| *byte as usize),
        }
    }

    /// The parser's span in bytes, without the space and the comments it may count in at the end.
    fn span(&self, span: saphyr_parser::Span) -> Span {
        let (start, end) = (self.byte(span.start.index()), self.byte(span.end.index()));
        let written = self.text.get(start..end).unwrap_or("").trim_end();
        Span { start, end: start + written.len() }
    }

    fn event(&mut self, event: Event<'_>, place: saphyr_parser::Span) -> Result<(), Stop> {
        let span = self.span(place);
        match event {
            Event::DocumentStart(_) => {
                self.documents += 1;
                if self.documents > 1 {
                    return Err((span, SyntaxProblem::SecondDocument.into()));
                }
            }
            Event::Scalar(text, style, anchor, tag) => {
                self.refuse_tag(tag.is_some(), span);
                let quoted = style != ScalarStyle::Plain;
                let span = if text.is_empty() && !quoted { self.place_of_nothing(span) } else { span };
                let node = Node { span, content: Content::Scalar { text: text.into_owned(), quoted } };
                self.count(1, 0, span)?;
                self.finish(Counted { node: Rc::new(node), values: 1, levels: 0 }, anchor)?;
            }
            Event::SequenceStart(anchor, tag) => {
                self.refuse_tag(tag.is_some(), span);
                self.begin(span, anchor, Children::List(Vec::new()))?;
            }
            Event::MappingStart(anchor, tag) => {
                self.refuse_tag(tag.is_some(), span);
                self.begin(span, anchor, Children::Mapping { entries: Vec::new(), key: None })?;
            }
            Event::SequenceEnd | Event::MappingEnd => self.end(span)?,
            Event::Alias(anchor) => {
                let Some(target) = self.anchors.get(&anchor).cloned() else {
                    return Err((span, SyntaxProblem::AliasOfItself.into()));
                };
                self.count(target.values, target.levels, span)?;
                self.finish(target, 0)?;
            }
            Event::Nothing | Event::StreamStart | Event::StreamEnd | Event::DocumentEnd => {}
        }
        Ok(())
    }

    fn refuse_tag(&mut self, tagged: bool, span: Span) {
        if tagged {
            self.problems.push((span, SyntaxProblem::Tag.into()));
        }
    }

    /// A value that was not written is shown at its key.
    fn place_of_nothing(&self, span: Span) -> Span {
        match self.open.last().map(|open| &open.children) {
            Some(Children::Mapping { key: Some(key), .. }) => key.span,
            _ => span,
        }
    }

    fn count(&mut self, values: usize, levels: usize, span: Span) -> Result<(), Stop> {
        self.values += values;
        if self.values > NODE_LIMIT {
            return Err((span, FileProblem::TooManyValues.into()));
        }
        if self.open.len() + levels > DEPTH_LIMIT {
            return Err((span, FileProblem::TooDeep.into()));
        }
        Ok(())
    }

    fn begin(&mut self, span: Span, anchor: usize, children: Children) -> Result<(), Stop> {
        let in_brackets = self.text[span.start..span.end].ends_with(['[', '{']);
        let values_before = self.values;
        self.count(1, 1, span)?;
        self.open.push(Open { start: span.start, in_brackets, anchor, values_before, levels: 1, children });
        Ok(())
    }

    fn end(&mut self, end: Span) -> Result<(), Stop> {
        let open = self.open.pop().expect("the parser ends what it began");
        let (content, last) = match open.children {
            Children::List(items) => {
                let last = items.last().map(|item| item.span.end);
                (Content::List(items), last)
            }
            Children::Mapping { entries, .. } => {
                let last = entries.last().map(|(key, value)| key.span.end.max(value.span.end));
                (Content::Mapping(entries), last)
            }
        };
        // brackets end with their closing one, blocks with their last entry
        let end = if open.in_brackets { (end.start + 1).min(self.text.len()) } else { last.unwrap_or(open.start) };
        let span = Span { start: open.start, end: end.max(open.start) };
        let values = self.values - open.values_before;
        self.finish(Counted { node: Rc::new(Node { span, content }), values, levels: open.levels }, open.anchor)
    }

    /// Puts a finished node where it belongs.
    fn finish(&mut self, counted: Counted, anchor: usize) -> Result<(), Stop> {
        if anchor > 0 {
            self.anchors.insert(anchor, counted.clone());
        }
        let Counted { node, levels, .. } = counted;
        let in_section = self.is_in_section();
        let Some(open) = self.open.last_mut() else {
            self.root = Some(node);
            return Ok(());
        };
        open.levels = open.levels.max(levels + 1);
        match &mut open.children {
            Children::List(items) if items.len() == LIST_LIMIT => {
                let problem = if in_section { FileProblem::TooManyRegions } else { FileProblem::TooManyEntries };
                return Err((node.span, problem.into()));
            }
            Children::List(items) => items.push(node),
            Children::Mapping { key: key @ None, .. } => *key = Some(node),
            Children::Mapping { key, entries } => {
                let key = key.take().expect("a key comes before its value");
                match &key.content {
                    Content::Scalar { .. } => entries.push((key, node)),
                    _ => self.problems.push((key.span, SyntaxProblem::KeyIsNoWord.into())),
                }
            }
        }
        Ok(())
    }

    /// Whether the innermost open list is the one of the top key `section`.
    fn is_in_section(&self) -> bool {
        match self.open.as_slice() {
            [Open { children: Children::Mapping { key: Some(key), .. }, .. }, _] => key.text() == Some("section"),
            _ => false,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn tree(text: &str) -> Rc<Node> {
        let tree = build(text);
        assert_eq!(tree.problems, [], "{text}");
        tree.root.expect("a tree")
    }

    fn entries(node: &Node) -> &[(Rc<Node>, Rc<Node>)] {
        match &node.content {
            Content::Mapping(entries) => entries,
            other => panic!("{other:?}"),
        }
    }

    fn items(node: &Node) -> &[Rc<Node>] {
        match &node.content {
            Content::List(items) => items,
            other => panic!("{other:?}"),
        }
    }

    fn refusal(text: &str) -> (Problem, &str) {
        let mut problems = build(text).problems;
        assert_eq!(problems.len(), 1, "{problems:?}");
        let (span, problem) = problems.remove(0);
        (problem, &text[span.start..span.end])
    }

    #[test]
    fn spans_cover_what_was_written() {
        let text = "ä: [1, 'λ b' ] # note\nb:\n  - c: x y # note\n    d:\n  - {e: 1}  \n";
        let root = tree(text);
        let of = |node: &Node| &text[node.span.start..node.span.end];
        assert_eq!(of(&root), text.trim_end());
        let [(a, list), (_, blocks)] = entries(&root) else { panic!() };
        assert_eq!((of(a), of(list)), ("ä", "[1, 'λ b' ]"));
        assert_eq!((of(&items(list)[1]), items(list)[1].text()), ("'λ b'", Some("λ b")));
        assert_eq!(of(&items(blocks)[0]), "c: x y # note\n    d");
        assert_eq!(of(&items(blocks)[1]), "{e: 1}");
        let (d, nothing) = &entries(&items(blocks)[0])[1];
        assert!(nothing.is_nothing());
        assert_eq!(nothing.span, d.span);
    }

    #[test]
    fn duplicates_and_quoting_are_kept() {
        let root = tree("a: 12\na: \"12\"\n");
        let quoted: Vec<bool> =
            entries(&root).iter().map(|(_, v)| matches!(v.content, Content::Scalar { quoted: true, .. })).collect();
        assert_eq!(quoted, [false, true]);
    }

    #[test]
    fn an_alias_is_the_value_it_points_to() {
        let root = tree("a: &wall [1, 2]\nb: *wall\n");
        assert!(Rc::ptr_eq(&entries(&root)[0].1, &entries(&root)[1].1));
    }

    #[test]
    fn what_hides_a_meaning_is_refused() {
        use SyntaxProblem::*;
        let of = Problem::Syntax;
        assert_eq!(refusal("a: !!int 3\n"), (of(Tag), "!!int 3"));
        assert_eq!(refusal("a: {[1]: 2}\n"), (of(KeyIsNoWord), "[1]"));
        assert_eq!(refusal("a: 1\n---\nb: 2\n"), (of(SecondDocument), "---"));
        assert_eq!(refusal("a: &x [*x]\n"), (of(AliasOfItself), "*x"));
    }

    #[test]
    fn limits_are_kept() {
        let brackets = |depth: usize| format!("a: {}1{}", "[".repeat(depth), "]".repeat(depth));
        tree(&brackets(DEPTH_LIMIT - 1));
        assert_eq!(refusal(&brackets(DEPTH_LIMIT)).0, Problem::File(FileProblem::TooDeep));
        assert_eq!(refusal(&brackets(100_000)).0, Problem::Syntax(SyntaxProblem::TooDeep));
        let blocks: String = (0..100).map(|depth| format!("{}a:\n", " ".repeat(depth))).collect();
        assert_eq!(refusal(&blocks).0, Problem::File(FileProblem::TooDeep));
        let list = |length: usize| format!("points: [{}]", "1,".repeat(length));
        tree(&list(LIST_LIMIT));
        assert_eq!(refusal(&list(LIST_LIMIT + 1)).0, Problem::File(FileProblem::TooManyEntries));
        assert_eq!(
            refusal(&format!("section: [{}]", "1,".repeat(LIST_LIMIT + 1))).0,
            Problem::File(FileProblem::TooManyRegions)
        );
        assert_eq!(
            refusal(&format!("a: {{{}}}", "b,".repeat(NODE_LIMIT))).0,
            Problem::File(FileProblem::TooManyValues)
        );
    }

    #[test]
    fn aliases_are_counted_before_they_are_followed() {
        let mut bomb = String::from("a0: &a0 [x, x, x, x, x, x, x, x, x, x]\n");
        for level in 1..20 {
            let below = format!("*a{}", level - 1);
            bomb += &format!("a{level}: &a{level} [{}]\n", [below.as_str(); 10].join(", "));
        }
        assert_eq!(refusal(&bomb), (Problem::File(FileProblem::TooManyValues), "*a4"));
        let mut ladder = String::from("a0: &a0 [x]\n");
        for level in 1..100 {
            ladder += &format!("a{level}: &a{level} [*a{}]\n", level - 1);
        }
        assert_eq!(refusal(&ladder), (Problem::File(FileProblem::TooDeep), "*a30"));
    }
}

//! The small tools with which the parts of a file are checked by hand. Each reports what it dislikes and gives `None`;
//! the caller goes on with the rest, so that all problems of a file are found in one go.

use std::rc::Rc;

use super::diagnostic::{Diagnostic, Related, Severity};
use super::document::{LengthUnit, Span, Spanned};
use super::names::KnownNames;
use super::nearest::nearest;
use super::parameters::Parameters;
use super::problem::{KeyProblem, NameFault, NameProblem, Problem, SyntaxProblem};
use super::tree::{Content, Node};

/// Near names are looked for this often at most, so that a file of wrong names is answered quickly.
const MOST_SUGGESTIONS: usize = 200;

/// The longest name, in characters; names stand in tables and drawings.
const LONGEST_NAME: usize = 100;

/// Reads nodes and keeps what was found wrong.
pub(super) struct Reader<'s> {
    pub(super) text: &'s str,
    /// The unit of the file's lengths.
    pub(super) unit: LengthUnit,
    pub(super) parameters: Parameters,
    /// The names of the file's lists, for suggestions.
    pub(super) known: KnownNames,
    diagnostics: Vec<Diagnostic>,
    suggestions_left: usize,
}

impl<'s> Reader<'s> {
    pub(super) fn new(text: &'s str) -> Self {
        Self {
            text,
            unit: LengthUnit::default(),
            parameters: Parameters::default(),
            known: KnownNames::default(),
            diagnostics: Vec::new(),
            suggestions_left: MOST_SUGGESTIONS,
        }
    }

    pub(super) fn report(&mut self, span: Span, problem: impl Into<Problem>) {
        self.diagnostics.push(problem.into().at(Some(span)));
    }

    /// Reports a problem of the file as a whole.
    pub(super) fn report_file(&mut self, problem: impl Into<Problem>) {
        self.diagnostics.push(problem.into().at(None));
    }

    /// Reports a problem that an earlier place explains.
    pub(super) fn report_with(&mut self, span: Span, problem: impl Into<Problem>, related: Span, label: &str) {
        let mut diagnostic = problem.into().at(Some(span));
        diagnostic.related.push(Related { span: related, label: label.to_owned() });
        self.diagnostics.push(diagnostic);
    }

    /// What was reported, in file order, equal ones once (an alias is read wherever it is used).
    /// If there are errors, remarks are left out: they may be consequences.
    pub(super) fn finish(mut self) -> (Vec<Diagnostic>, Vec<Diagnostic>) {
        let place = |diagnostic: &Diagnostic| diagnostic.span.map(|span| span.start);
        self.diagnostics.sort_by(|a, b| (place(a), &a.message, a.span).cmp(&(place(b), &b.message, b.span)));
        self.diagnostics.dedup();
        self.diagnostics.into_iter().partition(|diagnostic| diagnostic.severity == Severity::Error)
    }

    pub(super) fn suggest<'a>(&mut self, word: &str, candidates: impl Iterator<Item = &'a str>) -> Option<&'a str> {
        self.suggestions_left = self.suggestions_left.checked_sub(1)?;
        nearest(word, candidates)
    }

    /// A block whose keys are given.
    pub(super) fn fields<'n>(&mut self, node: &'n Node, block: &Block) -> Option<Fields<'n>> {
        let Content::Mapping(entries) = &node.content else {
            self.wrong_type(node, block.what.clone(), "a block of `key: value` entries", block.example.clone());
            return None;
        };
        let mut fields =
            Fields { span: node.span, block: block.clone(), entries: Vec::new(), meant: Vec::new(), incomplete: false };
        for (key, value) in entries {
            let word = key.text().unwrap_or("");
            if is_merge_key(key) {
                self.report(key.span, SyntaxProblem::MergeKey);
                fields.incomplete = true;
                continue;
            }
            let Some(known) = block.keys.iter().find(|known| **known == word) else {
                // `kind:internal` without a space is one word to YAML
                let sought = word.split_once(':').map_or(word, |(before, _)| before);
                let nearest = self.suggest(sought, block.keys.iter().copied());
                let nearest = nearest.and_then(|near| block.keys.iter().copied().find(|known| *known == near));
                fields.meant.extend(nearest);
                let problem =
                    KeyProblem::UnknownKey { key: word.to_owned(), place: block.place, nearest, known: block.keys };
                self.report(key.span, problem);
                continue;
            };
            match fields.entries.iter().find(|(earlier, ..)| earlier == known) {
                Some((_, first, _)) => {
                    let problem = KeyProblem::DuplicateKey { key: word.to_owned() };
                    self.report_with(key.span, problem, *first, "first written here");
                }
                None => fields.entries.push((known, key.span, value)),
            }
        }
        Some(fields)
    }

    /// The value of a key that must be there.
    pub(super) fn require<'n>(
        &mut self,
        fields: &Fields<'n>,
        key: &'static str,
        example: &'static str,
    ) -> Option<&'n Node> {
        let found = fields.get(key);
        // a misspelt key has been reported as such
        if found.is_none() && !fields.perhaps_meant(&[key]) {
            let problem = KeyProblem::MissingKey { key, place: fields.block.what.clone(), example };
            match fields.block.owner {
                Some(owner) => self.report(owner, problem),
                None => self.report_file(problem),
            }
        }
        found
    }

    /// A block of names of the user's choosing; of equal ones the first counts. Nothing at all is an empty block.
    pub(super) fn named<'n>(&mut self, node: &'n Node, list: &NamedBlock) -> Option<Vec<(Spanned<String>, &'n Node)>> {
        if node.is_nothing() {
            return Some(Vec::new());
        }
        let Content::Mapping(entries) = &node.content else {
            let expected = "a block of `name: value` entries";
            self.wrong_type(node, format!("`{}`", list.key), expected, list.example.to_owned());
            return None;
        };
        let mut first_places = std::collections::BTreeMap::new();
        let mut named = Vec::new();
        for (key, value) in entries {
            if is_merge_key(key) {
                self.report(key.span, SyntaxProblem::MergeKey);
                continue;
            }
            let Some(name) = self.name(key, list.noun) else {
                continue;
            };
            match first_places.get(&name.value).copied() {
                Some(first) => {
                    let problem = KeyProblem::DuplicateKey { key: name.value };
                    self.report_with(key.span, problem, first, "first written here");
                }
                None => {
                    first_places.insert(name.value.clone(), name.span);
                    named.push((name, value.as_ref()));
                }
            }
        }
        Some(named)
    }

    /// A name of the user's choosing.
    pub(super) fn name(&mut self, node: &Node, noun: &'static str) -> Option<Spanned<String>> {
        let name = node.text().map(str::trim);
        let fault = match name {
            None => Some(NameFault::NoWord),
            Some("") => Some(NameFault::Nothing),
            Some(name) if name.chars().any(char::is_control) => Some(NameFault::ControlCharacter),
            Some(name) if name.chars().count() > LONGEST_NAME => Some(NameFault::TooLong),
            Some(_) => None,
        };
        if let Some(fault) = fault {
            self.report(node.span, NameProblem::BadName { noun, fault });
            return None;
        }
        name.map(|name| Spanned { value: name.to_owned(), span: node.span })
    }

    /// Text on one line: line breaks and other white space within become single spaces.
    pub(super) fn line_of_text(&mut self, node: &Node, what: &str, example: &str) -> Option<String> {
        let text = node.text().filter(|_| !node.is_nothing());
        let words: Vec<&str> = text.unwrap_or("").split(|c: char| c.is_whitespace() || c.is_control()).collect();
        let line = words.into_iter().filter(|word| !word.is_empty()).collect::<Vec<_>>().join(" ");
        if line.is_empty() {
            self.wrong_type(node, what.to_owned(), "text", example.to_owned());
            return None;
        }
        Some(line)
    }

    /// A list.
    pub(super) fn list<'n>(
        &mut self,
        node: &'n Node,
        what: &str,
        expected: &'static str,
        example: &str,
    ) -> Option<&'n [Rc<Node>]> {
        match &node.content {
            Content::List(items) => Some(items),
            _ if dash_without_space(node).is_some() => {
                let start = dash_without_space(node).map_or(node.span.start, |span| span.start);
                self.report(Span { start, end: start + 1 }, SyntaxProblem::NoSpaceAfterDash);
                None
            }
            _ => {
                self.wrong_type(node, what.to_owned(), expected, example.to_owned());
                None
            }
        }
    }

    /// One of several given words, with what it stands for.
    pub(super) fn choice<T: Copy>(&mut self, node: &Node, choice: &Choice<T>) -> Option<T> {
        let word = match node.text() {
            Some(word) if !node.is_nothing() => word,
            _ => {
                let example = choice.words.first().map_or(String::new(), |word| format!("`{word}`"));
                self.wrong_type(node, choice.what.clone(), "a word", example);
                return None;
            }
        };
        if let Some(place) = choice.words.iter().position(|candidate| *candidate == word) {
            return Some(choice.values[place]);
        }
        let nearest = self.suggest(word, choice.words.iter().copied());
        let nearest = nearest.and_then(|near| choice.words.iter().copied().find(|known| *known == near));
        let problem = KeyProblem::UnknownWord {
            what: choice.what.clone(),
            word: word.to_owned(),
            choices: choice.words,
            nearest,
            meaning: choice.meaning,
        };
        self.report(node.span, problem);
        None
    }

    pub(super) fn wrong_type(&mut self, node: &Node, what: String, expected: &'static str, example: String) {
        self.report(node.span, KeyProblem::WrongType { what, expected, found: kind_of(node), example });
    }
}

/// YAML's `<<`, which merges another block into this one. It would hide where a key comes from, so it is refused.
fn is_merge_key(key: &Node) -> bool {
    matches!(&key.content, Content::Scalar { text, quoted: false } if text == "<<")
}

/// Where an entry of a list was begun with a dash and no space, which YAML takes for a key or a word.
fn dash_without_space(node: &Node) -> Option<Span> {
    let first = match &node.content {
        Content::Mapping(entries) => &entries.first()?.0,
        _ => node,
    };
    let after_dash = first.text().and_then(|text| text.strip_prefix('-'))?;
    after_dash.starts_with(char::is_alphabetic).then_some(first.span)
}

/// What a node is, in a reader's words.
pub(super) fn kind_of(node: &Node) -> &'static str {
    match &node.content {
        Content::List(_) => "a list",
        Content::Mapping(_) => "a block of entries",
        _ if node.is_nothing() => "nothing",
        Content::Scalar { quoted: true, .. } => "text in quotes",
        Content::Scalar { text, .. } if text.trim().parse::<f64>().is_ok() => "a number",
        Content::Scalar { .. } => "text",
    }
}

/// A block with given keys: what to call it, and what may stand in it.
#[derive(Clone)]
pub(super) struct Block {
    /// Which one it is: "the environment `flat`".
    pub(super) what: String,
    /// What kind it is: "an environment".
    pub(super) place: &'static str,
    /// Its keys.
    pub(super) keys: &'static [&'static str],
    /// What it looks like.
    pub(super) example: String,
    /// Where to report a missing key; `None`: it is the file itself.
    pub(super) owner: Option<Span>,
}

/// A block of names of the user's choosing.
pub(super) struct NamedBlock {
    /// The key it stands under.
    pub(super) key: &'static str,
    /// What the names are names of: "an environment".
    pub(super) noun: &'static str,
    /// What it looks like.
    pub(super) example: &'static str,
}

/// A choice of words, each with a value.
pub(super) struct Choice<T: 'static> {
    pub(super) what: String,
    pub(super) words: &'static [&'static str],
    pub(super) values: &'static [T],
    /// What the words mean, where they do not say.
    pub(super) meaning: Option<&'static str>,
}

/// The entries of a block, each known key at most once.
pub(super) struct Fields<'n> {
    pub(super) span: Span,
    block: Block,
    entries: Vec<(&'static str, Span, &'n Node)>,
    /// Keys that an unknown one was probably meant to be.
    meant: Vec<&'static str>,
    /// Keys were to come from elsewhere; that they are missing is no fault of its own.
    incomplete: bool,
}

impl<'n> Fields<'n> {
    pub(super) fn get(&self, key: &str) -> Option<&'n Node> {
        self.entries.iter().find(|(known, ..)| *known == key).map(|(.., value)| *value)
    }

    /// Where a key stands, if it does.
    pub(super) fn key_span(&self, key: &str) -> Option<Span> {
        self.entries.iter().find(|(known, ..)| *known == key).map(|(_, span, _)| *span)
    }

    /// Whether one of these keys was probably meant by an unknown one.
    pub(super) fn perhaps_meant(&self, keys: &[&str]) -> bool {
        self.incomplete || self.meant.iter().any(|meant| keys.contains(meant))
    }

    /// The keys written, in file order.
    pub(super) fn keys(&self) -> impl Iterator<Item = &'static str> + '_ {
        self.entries.iter().map(|(key, ..)| *key)
    }
}

//! The sentences about files, their YAML and their expressions; all others are in `wording`.

use super::expression::{ExpressionFault, function_names};
use super::load::SIZE_LIMIT_BYTES;
use super::names::FirstNames;
use super::problem::{FileProblem, SyntaxProblem};
use super::tree::{DEPTH_LIMIT, LIST_LIMIT, NODE_LIMIT};
use super::wording::{Words, name_list, quoted, say};

pub(super) fn file_words(problem: &FileProblem) -> Words {
    match problem {
        FileProblem::NoSuchFile => say("there is no such file", "", "check the path and its spelling"),
        FileProblem::Folder => say("this is a folder, not a junction file", "", "name a file in it"),
        FileProblem::Unreadable { reason } => say(format!("the file cannot be read: {reason}"), "", ""),
        FileProblem::TooLarge { bytes } => {
            let size = bytes.map_or(String::new(), |bytes| format!(": {} MB", bytes / 1_000_000));
            say(
                format!("the file is too large{size}, where {} MiB are allowed", SIZE_LIMIT_BYTES / (1024 * 1024)),
                "",
                "a junction file takes a few kilobytes; check that this is the file you meant",
            )
        }
        FileProblem::NotUtf8 => say(
            "the file is not UTF-8 text",
            "the first character that is not UTF-8",
            "save it as UTF-8 in your editor, or retype this character",
        ),
        FileProblem::Utf16 => say("the file is UTF-16 text, not UTF-8", "", "save it as UTF-8 in your editor"),
        FileProblem::Empty => say("the file is empty", "", "a junction file starts with `title:`"),
        FileProblem::NoKeys { found } => say(
            format!("a junction file must be a block of `key: value` entries, not {found}"),
            "expected `title:` or another key",
            "start with `title: ` and the title, `plane: vertical`, then `environments:` and `section:`",
        ),
        FileProblem::TooDeep => say(
            format!("the file nests more than {DEPTH_LIMIT} levels deep"),
            "one level too many",
            "a junction file needs six levels; check brackets and indentation",
        ),
        FileProblem::TooManyValues => say(
            format!("the file holds more than {} values", thousands(NODE_LIMIT)),
            "one value too many",
            "values repeated with `&` and `*` count each time; divide the drawing into several junctions",
        ),
        FileProblem::TooManyEntries => say(
            format!("this list has more than {} entries", thousands(LIST_LIMIT)),
            "one entry too many",
            "simplify the outline, or divide it",
        ),
        FileProblem::TooManyRegions => say(
            format!("the section has more than {} regions", thousands(LIST_LIMIT)),
            "one region too many",
            "each layer of a build-up is a region; simplify the drawing, or divide it into several junctions",
        ),
    }
}

pub(super) fn syntax_words(problem: &SyntaxProblem) -> Words {
    match problem {
        SyntaxProblem::StrangeCharacter { code } => say(
            format!("there is a control character in the file (code {code})"),
            "invisible here",
            "delete it; this may also be no text file at all",
        ),
        SyntaxProblem::TabIndentation => {
            say("this line is indented with a tab", "a tab", "indent with spaces; most editors can convert tabs")
        }
        SyntaxProblem::Tab => say("there is a tab where a space is expected", "a tab", "replace it with a space"),
        SyntaxProblem::OddSpace => say(
            "this line is indented with a special space",
            "not an ordinary space",
            "replace it with ordinary spaces; it may come from a web page or a word processor",
        ),
        SyntaxProblem::Indentation { spaces, spaces_above } => say(
            "the indentation of this line does not fit the lines above it",
            format!("indented by {}, the line above by {}", count_spaces(*spaces), count_spaces(*spaces_above)),
            "entries that belong together are indented by the same number of spaces",
        ),
        SyntaxProblem::OutOfPlace => say(
            "this does not belong after the value before it",
            "unexpected here",
            "put it on a line of its own; text with special characters goes between quotes",
        ),
        SyntaxProblem::NoColon => say(
            "this line has no `key: value`",
            "expected a colon and a value",
            "write a key, a colon, a space and the value; list entries start with a dash and a space",
        ),
        SyntaxProblem::NoSpaceAfterColon => {
            say("a space is missing after the colon", "expected a space after this", "write `key: value`")
        }
        SyntaxProblem::NoSpaceAfterDash => {
            say("a space is missing after the dash", "expected a space after this", "write `- mineral wool: 140`")
        }
        SyntaxProblem::ColonInText => say(
            "text with a colon and a space in it must be in quotes",
            "a second colon in this line",
            "put the whole value between double quotes, as in `title: \"Wall: part two\"`",
        ),
        SyntaxProblem::UnclosedQuote => {
            say("these quotes are not closed", "opened here", "add the same quote mark at the end of the text")
        }
        SyntaxProblem::TextAfterQuote => say(
            "there is text after the closing quote",
            "unexpected here",
            "put the whole value between quotes; an apostrophe goes between double quotes, as in `\"it's\"`",
        ),
        SyntaxProblem::Backslash => say(
            "between double quotes a backslash has a special meaning",
            "not understood",
            "use single quotes, as in `'C:\\files'`",
        ),
        SyntaxProblem::UnclosedBracket { expected } => {
            say("this bracket is not closed", "opened here", format!("add `{expected}` at the end of its contents"))
        }
        SyntaxProblem::UnopenedBracket => {
            say("there is no open bracket that this one could close", "one bracket too many", "remove it")
        }
        SyntaxProblem::WrongBracket { expected, .. } => {
            say("this bracket does not match the one that is open", format!("expected `{expected}`"), "")
        }
        SyntaxProblem::MissingComma => say(
            "between brackets, entries are separated by commas",
            "expected a comma before this, or the closing bracket",
            "write lists as `[0, 200]` and blocks as `{ x: [0, 200], y: [0, 100] }`",
        ),
        SyntaxProblem::DashInBrackets => say(
            "between brackets a minus must not be followed by a space",
            "this is taken for a list's dash",
            "write it next to its number or name, as in `[-wool, 0]`",
        ),
        SyntaxProblem::ReservedCharacter { found } => say(
            format!("a value cannot start with `{found}`"),
            "has a special meaning here",
            "put the text between quotes, or start an expression with a number, a name or a parenthesis",
        ),
        SyntaxProblem::UnknownAlias { name } => say(
            format!("`*{0}` repeats a value marked `&{0}`, and there is none before it", quoted(name)),
            "unknown mark",
            "start an expression with a number, a name or a parenthesis; put text that starts with `*` between quotes",
        ),
        SyntaxProblem::AliasOfItself => {
            say("this value repeats itself", "inside the value it repeats", "write the value out")
        }
        SyntaxProblem::MergeKey => {
            say("`<<` is not supported", "merges another block into this one", "write the keys out")
        }
        SyntaxProblem::Tag => say(
            "a value cannot start with `!`",
            "taken for a type, which this format does not use",
            "remove it, or put the text between quotes",
        ),
        SyntaxProblem::KeyIsNoWord => say(
            "a key must be a word or words",
            "a list or block",
            "write `key: value`; check the brackets before the colon",
        ),
        SyntaxProblem::SecondDocument => say(
            "there is a second document in the file",
            "starts here",
            "keep one junction in a file; several files can be rated in one go",
        ),
        SyntaxProblem::TooDeep => file_words(&FileProblem::TooDeep),
    }
}

pub(super) fn expression_words(fault: &ExpressionFault, nearest: Option<&str>, parameters: &FirstNames) -> Words {
    match fault {
        ExpressionFault::UnknownName { name } => {
            let help = match (nearest, parameters) {
                (Some(near), _) => format!("did you mean `{}`?", quoted(near)),
                (None, names) if names.total == 0 => {
                    "expected a number; names stand for numbers under `parameters:`, and the file has none".to_owned()
                }
                (None, names) => format!("expected a number or a parameter; the file has {}", name_list(names)),
            };
            say(format!("there is no parameter `{}`", quoted(name)), "unknown name", help)
        }
        ExpressionFault::UnknownFunction { name } => {
            let functions = FirstNames::of(function_names());
            let help = match nearest {
                Some(near) => format!("did you mean `{near}`?"),
                None => format!("the functions are {}; a factor before a parenthesis takes `*`", name_list(&functions)),
            };
            say(format!("there is no function `{}`", quoted(name)), "unknown function", help)
        }
        ExpressionFault::WrongArguments { function, expected, found } => {
            let expected = expected.map_or("two values or more".to_owned(), |_| "one value".to_owned());
            say(format!("`{function}` takes {expected}, not {found}"), format!("expected {expected}"), "")
        }
        ExpressionFault::DivisionByZero => {
            say("division by zero", "this is zero", "check the parameters it is made of")
        }
        ExpressionFault::RootOfNegative => {
            say("the square root of a negative number", "no such number", "check the parameters it is made of")
        }
        ExpressionFault::NotFinite => say("this number is too large to compute with", "too large", ""),
        ExpressionFault::TooLong => say("this expression is too long", "", "use parameters for parts of it"),
        ExpressionFault::TooDeep => {
            say("the parentheses nest too deep", "one too many", "use parameters for parts of it")
        }
        ExpressionFault::NoValue { found } => {
            let message = if found.is_empty() {
                "the expression ends too early"
            } else {
                "a value is missing in this expression"
            };
            let help = match found.as_str() {
                "*" => "powers are written as products, as in `a * a`",
                _ => "",
            };
            say(message, "expected a number, a name or a parenthesis", help)
        }
        ExpressionFault::NoOperator { found } if found == "(" => {
            say("an operator is missing before this parenthesis", "expected `+`, `-`, `*` or `/` before this", "")
        }
        ExpressionFault::NoOperator { .. } => say(
            "two values stand side by side in this expression",
            "expected `+`, `-`, `*` or `/` before this",
            "a parameter's name is one word; join words with underscores",
        ),
        ExpressionFault::Unit { name } => say(
            format!("a number is written without its unit, here `{}`", quoted(name)),
            "leave this out",
            "lengths are in the file's `unit`, temperatures in °C, conductivities in W/(m·K), resistances in m²K/W",
        ),
        ExpressionFault::Comma { with_point: Some(number) } => say(
            "a number takes a decimal point, not a comma",
            "expected a point",
            format!("write `{}`", quoted(number)),
        ),
        ExpressionFault::Comma { with_point: None } => {
            say("a comma outside a function", "unexpected here", "commas separate the values of `min` and `max`")
        }
        ExpressionFault::NotANumber { written } => say(
            format!("`{}` is not a number to compute with", quoted(written)),
            "expected a number",
            "write a number such as 12.5, or an expression",
        ),
        ExpressionFault::StrangeCharacter { found } => {
            let help = match found {
                '−' | '–' | '—' => "write the minus of the keyboard, `-`",
                '×' | '·' => "write `*`",
                '÷' | ':' => "write `/`",
                '^' => "powers are written as products, as in `a * a`",
                '%' => "write the number alone; percentages are numbers from 0 to 100",
                '=' => "write the value alone",
                _ => "an expression holds numbers, names, + - * / and parentheses",
            };
            say(format!("`{found}` has no meaning in a number"), "unexpected here", help)
        }
        ExpressionFault::Unclosed => say("this parenthesis is not closed", "opened here", "add `)`"),
        ExpressionFault::Unopened => say("there is no open parenthesis to close", "one too many", "remove it"),
        // reported where the name is defined; never shown
        ExpressionFault::Reported => say("this cannot be computed", "", ""),
    }
}

/// A limit as one writes it: 20,000.
fn thousands(number: usize) -> String {
    format!("{},{:03}", number / 1000, number % 1000)
}

fn count_spaces(spaces: usize) -> String {
    match spaces {
        0 => "none".to_owned(),
        1 => "1 space".to_owned(),
        more => format!("{more} spaces"),
    }
}

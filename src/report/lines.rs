//! Breaking text into lines of a given width.

/// Holds a number and its unit on one line; written as an ordinary space, so that a search finds it.
pub(super) const HELD_SPACE: char = '\u{a0}';

/// A number and its unit, held on one line.
pub(super) fn with_unit(number: impl std::fmt::Display, unit: &str) -> String {
    format!("{number}{HELD_SPACE}{unit}")
}

/// The text with control characters (which a YAML string may smuggle in) made into spaces.
pub(super) fn plain(text: &str) -> String {
    text.chars().map(|c| if c.is_control() { ' ' } else { c }).collect()
}

/// How many columns a text takes.
pub(super) fn columns(text: &str) -> usize {
    text.chars().count()
}

/// Breaks a text between words into lines of at most `width` columns; a longer word is broken where the line ends.
///
/// Yields at least one line.
pub(super) fn broken(text: &str, width: usize) -> Vec<String> {
    broken_after(text, width, width)
}

/// The same, where the first line has another width.
pub(super) fn broken_after(text: &str, first_width: usize, width: usize) -> Vec<String> {
    let mut lines: Vec<String> = Vec::new();
    let mut line = String::new();
    for word in text.split(' ').filter(|word| !word.is_empty()) {
        let limit = |lines: &[String]| if lines.is_empty() { first_width.max(1) } else { width.max(1) };
        if line.is_empty() {
            // A word that opens a line needs no space before it.
        } else if columns(&line) + 1 + columns(word) > limit(&lines) {
            lines.push(std::mem::take(&mut line));
        } else {
            line.push(' ');
        }
        for letter in word.chars() {
            if columns(&line) == limit(&lines) {
                lines.push(std::mem::take(&mut line));
            }
            line.push(if letter == HELD_SPACE { ' ' } else { letter });
        }
    }
    lines.push(line);
    lines
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn breaks_between_words_and_only_then_within_one() {
        assert_eq!(broken("cut plane nearer than 1 m", 12), ["cut plane", "nearer than", "1 m"]);
        assert_eq!(broken("a incomprehensible", 6), ["a", "incomp", "rehens", "ible"]);
        assert_eq!(broken("", 6), [""]);
        assert_eq!(broken(&format!("layer of {}", with_unit(140, "mm")), 12), ["layer of", "140 mm"]);
        assert_eq!(broken("Stoß über Eck", 8), ["Stoß", "über Eck"]);
    }

    #[test]
    fn control_characters_are_made_harmless() {
        assert_eq!(plain("red\u{1b}[31m\nwall"), "red [31m wall");
    }
}

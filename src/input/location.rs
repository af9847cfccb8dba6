//! Where in a file something stands, as people and editors count it: lines and columns from 1.

use super::document::Source;

/// The line and column of a byte of the text, both from 1; columns count characters.
///
/// An offset beyond the end is taken as the end, one inside a character as its first byte. A byte-order mark at the
/// very start takes no column.
pub fn line_column(source: &Source, offset: usize) -> (usize, usize) {
    line_columns(source, &[offset])[0]
}

/// [`line_column`] of many places, in their order. The text is read once, however many there are.
pub fn line_columns(source: &Source, offsets: &[usize]) -> Vec<(usize, usize)> {
    let text = &source.text;
    let mut by_offset: Vec<(usize, usize)> = offsets.iter().copied().enumerate().map(|(k, at)| (at, k)).collect();
    by_offset.sort_unstable();
    let mut places = vec![(1, 1); offsets.len()];
    let (mut line, mut column, mut read) = (1, 1, 0);
    for (offset, k) in by_offset {
        let end = char_start(text, offset);
        for (at, character) in text[read..end].char_indices() {
            match character {
                '\n' => (line, column) = (line + 1, 1),
                '\u{feff}' if read + at == 0 => {}
                _ => column += 1,
            }
        }
        read = end;
        places[k] = (line, column);
    }
    places
}

/// The first byte of the character that byte `offset` of the text belongs to; the end for anything beyond.
pub(super) fn char_start(text: &str, offset: usize) -> usize {
    let offset = offset.min(text.len());
    (0..=offset).rev().find(|start| text.is_char_boundary(*start)).unwrap_or(0)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn place(text: &str, offset: usize) -> (usize, usize) {
        line_column(&Source { name: String::new(), text: text.to_owned() }, offset)
    }

    #[test]
    fn lines_and_columns_count_from_one() {
        assert_eq!(place("", 0), (1, 1));
        assert_eq!(place("ab\ncd", 1), (1, 2));
        assert_eq!(place("ab\ncd", 3), (2, 1));
        assert_eq!(place("ab\r\ncd", 5), (2, 2));
        assert_eq!(place("ab\n", 99), (2, 1));
    }

    #[test]
    fn many_places_keep_their_order() {
        let source = Source { name: String::new(), text: "\u{feff}a\nλ: 2\n".to_owned() };
        let offsets = [9, 0, 7, 3, 99, 4];
        let one_by_one: Vec<_> = offsets.iter().map(|&offset| line_column(&source, offset)).collect();
        assert_eq!(one_by_one, [(2, 4), (1, 1), (2, 2), (1, 1), (3, 1), (1, 2)]);
        assert_eq!(line_columns(&source, &offsets), one_by_one);
    }

    #[test]
    fn columns_count_characters_and_skip_the_byte_order_mark() {
        assert_eq!(place("λ: 2", 4), (1, 4));
        assert_eq!(place("λ: 2", 1), (1, 1));
        assert_eq!(place("\u{feff}ab", 4), (1, 2));
    }
}

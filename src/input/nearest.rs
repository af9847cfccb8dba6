//! The nearest name to a misspelt word: one rule for keys, materials, environments, build-ups and parameters.

/// Words longer than this are not compared: the cost grows with the product of both lengths.
const LONGEST_WORD: usize = 100;

/// Only so many candidates are looked at, so that a file of a hundred thousand wrong names is still answered quickly.
const MOST_CANDIDATES: usize = 2000;

/// The candidate that `word` was probably meant to be, or `None` if none is near.
///
/// Letter case, and the order of words, do not count. A candidate is near if a few letters must change (none in
/// words of one or two letters, one in up to five, two in up to eight, three beyond; neighbours swapped count as one
/// change), or else if it contains all words of `word`, as "mineral wool" contains "wool".
pub fn nearest<'a>(word: &str, candidates: impl Iterator<Item = &'a str>) -> Option<&'a str> {
    let sought = Folded::new(word)?;
    candidates
        .take(MOST_CANDIDATES)
        .filter_map(|candidate| Some((sought.distance(&Folded::new(candidate)?)?, candidate)))
        .min_by_key(|(distance, _)| *distance)
        .map(|(_, candidate)| candidate)
}

/// A word prepared for comparison: in small letters, as written and with its parts in alphabetical order.
struct Folded {
    parts: Vec<String>,
    as_written: Vec<char>,
    sorted: Vec<char>,
}

impl Folded {
    fn new(word: &str) -> Option<Self> {
        let lower = word.to_lowercase();
        let mut parts: Vec<String> =
            lower.split(|c: char| !c.is_alphanumeric()).filter(|part| !part.is_empty()).map(str::to_owned).collect();
        let as_written: Vec<char> = parts.concat().chars().collect();
        if as_written.is_empty() || as_written.len() > LONGEST_WORD {
            return None;
        }
        parts.sort();
        let sorted = parts.concat().chars().collect();
        Some(Self { parts, as_written, sorted })
    }

    /// How far a candidate is: first by letters to change, then (one beyond all those) by letters it has in excess.
    fn distance(&self, candidate: &Self) -> Option<(usize, usize)> {
        let allowed = match self.as_written.len() {
            0..=2 => 0,
            3..=5 => 1,
            6..=8 => 2,
            _ => 3,
        };
        let as_written = edit_distance(&self.as_written, &candidate.as_written, allowed);
        let sorted = edit_distance(&self.sorted, &candidate.sorted, allowed);
        if let Some(edits) = as_written.into_iter().chain(sorted).min() {
            return Some((edits, 0));
        }
        let contained = self.as_written.len() > 2 && self.parts.iter().all(|part| candidate.parts.contains(part));
        contained.then_some((LONGEST_WORD, candidate.as_written.len()))
    }
}

/// Letters to insert, leave out, exchange, or swap with their neighbour, if there are at most `allowed` of them.
fn edit_distance(a: &[char], b: &[char], allowed: usize) -> Option<usize> {
    if a.len().abs_diff(b.len()) > allowed {
        return None;
    }
    let mut before_last: Vec<usize> = Vec::new();
    let mut last: Vec<usize> = (0..=b.len()).collect();
    for i in 1..=a.len() {
        let mut row = vec![i];
        for j in 1..=b.len() {
            let exchanged = last[j - 1] + usize::from(a[i - 1] != b[j - 1]);
            let mut least = exchanged.min(last[j] + 1).min(row[j - 1] + 1);
            if i > 1 && j > 1 && a[i - 1] == b[j - 2] && a[i - 2] == b[j - 1] {
                least = least.min(before_last[j - 2] + 1);
            }
            row.push(least);
        }
        before_last = std::mem::replace(&mut last, row);
    }
    Some(last[b.len()]).filter(|distance| *distance <= allowed)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn near(word: &str) -> Option<&'static str> {
        nearest(
            word,
            ["mineral wool", "reinforced concrete (1 % steel)", "steel", "environments", "x", "y"].into_iter(),
        )
    }

    #[test]
    fn misspellings_are_recognised() {
        assert_eq!(near("minral wool"), Some("mineral wool"));
        assert_eq!(near("Mineral Wool"), Some("mineral wool"));
        assert_eq!(near("mineralwool"), Some("mineral wool"));
        assert_eq!(near("wool, mineral"), Some("mineral wool"));
        assert_eq!(near("setel"), Some("steel"));
        assert_eq!(near("enviroment"), Some("environments"));
    }

    #[test]
    fn part_of_a_name_is_enough() {
        assert_eq!(near("wool"), Some("mineral wool"));
        assert_eq!(near("reinforced concrete"), Some("reinforced concrete (1 % steel)"));
    }

    #[test]
    fn what_is_far_is_not_offered() {
        for word in ["brick", "", "  ", "z", "xy", "ste"] {
            assert_eq!(near(word), None, "{word:?}");
        }
        assert_eq!(near(&"steel".repeat(100_000)), None);
    }

    #[test]
    fn fewer_changes_win_over_more() {
        assert_eq!(nearest("stele", ["steal", "steel", "stale"].into_iter()), Some("steel"));
        assert_eq!(nearest("steel", ["stainless steel", "steels"].into_iter()), Some("steels"));
    }
}

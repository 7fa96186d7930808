//! The nearest known name to one that is not known, for hints: "did you mean `leg`?".
//!
//! The distance is the number of single-letter insertions, deletions, replacements and swaps of neighbours
//! (optimal string alignment); letters that differ only in case count a half, so that `KN` finds `kN`.

/// Longest name that is compared; longer ones have no neighbour worth naming.
const LONGEST: usize = 64;

/// Fewest letters of a beginning that stands for the whole name.
const SHORTEST_BEGINNING: usize = 3;

/// The candidate nearest to `name`, if one is near enough (a third of the letters, at least one); otherwise the
/// first that begins with it.
pub(super) fn nearest<'c>(name: &str, candidates: impl IntoIterator<Item = &'c str>) -> Option<&'c str> {
    let mut begun = None;
    let letters: Vec<char> = name.chars().take(LONGEST + 1).collect();
    if letters.is_empty() || letters.len() > LONGEST {
        return None;
    }
    let mut best: Option<(usize, &str)> = None;
    for candidate in candidates {
        let other: Vec<char> = candidate.chars().take(LONGEST + 1).collect();
        if other.len() > LONGEST || candidate == name {
            continue;
        }
        if letters.len() >= SHORTEST_BEGINNING && candidate.starts_with(name) {
            begun = begun.or(Some(candidate));
        }
        let found = distance(&letters, &other);
        let allowed = 2 * (letters.len().max(other.len()) / 3).max(1);
        // A name of one or two letters is near only to its other spelling in capitals or to a longer form.
        let allowed = if letters.len().min(other.len()) < 2 { 1 } else { allowed };
        if found <= allowed && best.is_none_or(|(least, _)| found < least) {
            best = Some((found, candidate));
        }
    }
    best.map(|(_, candidate)| candidate).or(begun)
}

/// Twice the edit distance (a difference of case alone counts one).
fn distance(a: &[char], b: &[char]) -> usize {
    let width = b.len() + 1;
    let mut table = vec![0; (a.len() + 1) * width];
    for (column, cell) in table.iter_mut().take(width).enumerate() {
        *cell = 2 * column;
    }
    for row in 1..=a.len() {
        table[row * width] = 2 * row;
        for column in 1..=b.len() {
            let (x, y) = (a[row - 1], b[column - 1]);
            let replace = if x == y { 0 } else { 2 - usize::from(x.to_lowercase().eq(y.to_lowercase())) };
            let mut least = (table[(row - 1) * width + column - 1] + replace)
                .min(table[(row - 1) * width + column] + 2)
                .min(table[row * width + column - 1] + 2);
            if row > 1 && column > 1 && x == b[column - 2] && a[row - 2] == y {
                least = least.min(table[(row - 2) * width + column - 2] + 2);
            }
            table[row * width + column] = least;
        }
    }
    table[a.len() * width + b.len()]
}

/// "did you mean `name`?", when there is a near name.
pub(super) fn suggestion<'c>(name: &str, candidates: impl IntoIterator<Item = &'c str>) -> Option<String> {
    nearest(name, candidates).map(|found| format!("did you mean `{found}`?"))
}

/// The names in a row: `a`, `b`, `c`.
pub(super) fn listed<'c>(names: impl IntoIterator<Item = &'c str>) -> String {
    let mut text = String::new();
    for name in names {
        if !text.is_empty() {
            text.push_str(", ");
        }
        text.push('`');
        text.push_str(name);
        text.push('`');
    }
    text
}

#[cfg(test)]
mod tests {
    use super::*;

    const KEYS: [&str; 5] = ["leg", "legs", "throat", "path", "kN"];

    #[test]
    fn one_slip_finds_its_name() {
        assert_eq!(nearest("lag", KEYS), Some("leg"));
        assert_eq!(nearest("thraot", KEYS), Some("throat"));
        assert_eq!(nearest("pth", KEYS), Some("path"));
        assert_eq!(nearest("KN", KEYS), Some("kN"));
        assert_eq!(nearest("aisc", ["nominal", "aisc-360-22-lrfd"]), Some("aisc-360-22-lrfd"));
    }

    #[test]
    fn a_strange_name_finds_nothing() {
        assert_eq!(nearest("colour", KEYS), None);
        assert_eq!(nearest("", KEYS), None);
        assert_eq!(nearest(&"leg".repeat(1000), KEYS), None);
        assert_eq!(nearest("x", ["y", "z"]), None);
    }

    #[test]
    fn a_swap_of_neighbours_is_one_step() {
        let letters = |text: &str| text.chars().collect::<Vec<_>>();
        assert_eq!(distance(&letters("carne"), &letters("crane")), 2);
        assert_eq!(distance(&letters("Leg"), &letters("leg")), 1);
        assert_eq!(distance(&letters("abc"), &letters("")), 6);
    }
}

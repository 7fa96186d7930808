//! Text to document: the TOML tree with the place of every key and value, in the order of the file.
//!
//! This is the only file that knows the TOML reader. Numbers keep the text they were written as, so that a
//! message can show `1e999`; texts know whether a position inside them is a position in the file.

use super::faults::{Faults, Span};
use toml::Spanned;
use toml::de::{DeTable, DeValue};

/// A value with its place.
#[derive(Debug, Clone)]
pub(super) struct Node {
    /// Place of the value; of a table under a header, the header.
    pub(super) span: Span,
    /// The value.
    pub(super) value: Value,
}

/// A value of the file.
#[derive(Debug, Clone)]
pub(super) enum Value {
    /// A text.
    Text(Text),
    /// An integer or a decimal number; infinite or NaN when it is not finite.
    Number(f64),
    /// `true` or `false`.
    Boolean,
    /// A date or time.
    Date(String),
    /// A list.
    List(Vec<Node>),
    /// A table.
    Table(Table),
}

impl Value {
    /// What it is, in words.
    pub(super) fn kind(&self) -> &'static str {
        match self {
            Self::Text(_) => "a text",
            Self::Number(_) => "a number",
            Self::Boolean => "true or false",
            Self::Date(_) => "a date",
            Self::List(_) => "a list",
            Self::Table(_) => "a table",
        }
    }
}

/// A text of the file.
#[derive(Debug, Clone)]
pub(super) struct Text {
    /// Its letters.
    pub(super) content: String,
    /// Where the first letter stands in the file, when the letters stand there as they are.
    pub(super) inner: Option<usize>,
}

/// A key with its value.
#[derive(Debug, Clone)]
pub(super) struct Entry {
    /// The key.
    pub(super) key: String,
    /// Place of the key.
    pub(super) key_span: Span,
    /// The value.
    pub(super) node: Node,
}

/// Keys and values, in the order of the file.
#[derive(Debug, Clone)]
pub(super) struct Table {
    /// Place of the header, or of the braces.
    pub(super) span: Span,
    /// The entries.
    pub(super) entries: Vec<Entry>,
}

impl Table {
    /// The entry of a key.
    pub(super) fn get(&self, key: &str) -> Option<&Entry> {
        self.entries.iter().find(|entry| entry.key == key)
    }
}

/// Reads a text; `None` when it is so damaged that nothing more can be said about it.
///
/// Keys given twice leave a usable document and are reported beside all other faults.
pub(super) fn read(text: &str, faults: &mut Faults<'_>) -> Option<Table> {
    if text.trim_matches(|letter: char| letter.is_whitespace() || letter == '\u{feff}').is_empty() {
        faults.whole("the file is empty").hint("`weldpole new` prints a starter file");
        return None;
    }
    let (root, errors) = DeTable::parse_recoverable(text);
    let mut usable = true;
    let mut last_line = 0;
    for error in &errors {
        let message = error.message();
        let span = error.span().unwrap_or(0..0);
        usable &= message == "duplicate key";
        let line = faults.line(&span);
        if line == last_line {
            continue;
        }
        last_line = line;
        let (what, expected) = match message.split_once(", expected ") {
            Some((what, expected)) => (what, Some(expected)),
            None => (message, None),
        };
        if what == "duplicate key" {
            let found = faults.found(&span);
            faults.at(span, format!("`{found}` is given twice")).hint("keep one of them");
            continue;
        }
        let reported = faults.at(span, format!("not valid TOML: {}", lower_first(what)));
        let unquoted = what.contains("string values must be quoted") || expected == Some("`nan`");
        if unquoted {
            reported
                .accepted("a number, or a text in straight quotes")
                .hint("write a text as \"nominal\" or \"1/4 in\"");
        } else if let Some(expected) = expected {
            reported.accepted(expected);
        }
    }
    usable.then(|| table(root.get_ref(), 0..0, text))
}

fn lower_first(text: &str) -> String {
    let mut letters = text.chars();
    letters.next().map_or_else(String::new, |first| first.to_lowercase().chain(letters).collect())
}

fn table(source: &DeTable<'_>, span: Span, text: &str) -> Table {
    let mut entries: Vec<Entry> = source
        .iter()
        .map(|(key, value)| Entry {
            key: key.get_ref().clone().into_owned(),
            key_span: key.span(),
            node: node(value, text),
        })
        .collect();
    entries.sort_by_key(|entry| entry.key_span.start);
    Table { span, entries }
}

fn node(source: &Spanned<DeValue<'_>>, text: &str) -> Node {
    let span = source.span();
    let value = match source.get_ref() {
        DeValue::String(content) => {
            // A text in single quotes without escapes stands in the file letter by letter.
            let inner = span.start + 1;
            let plain = text.get(inner..span.end.saturating_sub(1)) == Some(content.as_ref());
            Value::Text(Text { content: content.clone().into_owned(), inner: plain.then_some(inner) })
        }
        DeValue::Integer(integer) if integer.radix() == 10 => {
            Value::Number(integer.as_str().parse().unwrap_or(f64::NAN))
        }
        DeValue::Integer(integer) => {
            Value::Number(u64::from_str_radix(integer.as_str(), integer.radix()).map_or(f64::NAN, |whole| {
                #[allow(clippy::cast_precision_loss)] // beyond 2^53 the nearest number is meant
                let number = whole as f64;
                number
            }))
        }
        DeValue::Float(float) => Value::Number(float.as_str().parse().unwrap_or(f64::NAN)),
        DeValue::Boolean(_) => Value::Boolean,
        DeValue::Datetime(date) => Value::Date(date.to_string()),
        DeValue::Array(list) => Value::List(list.iter().map(|item| node(item, text)).collect()),
        DeValue::Table(inner) => Value::Table(table(inner, span.clone(), text)),
    };
    Node { span, value }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn parsed(text: &str) -> (Option<Table>, Vec<String>) {
        let mut faults = Faults::new("f", text);
        let table = read(text, &mut faults);
        (table, faults.finish().iter().map(ToString::to_string).collect())
    }

    #[test]
    fn entries_keep_their_order_and_place() {
        let (table, faults) = parsed("z = 1\na = \"5 mm\"\n[[weld]]\nleg = 8\n");
        assert!(faults.is_empty());
        let table = table.unwrap();
        let keys: Vec<&str> = table.entries.iter().map(|entry| entry.key.as_str()).collect();
        assert_eq!(keys, ["z", "a", "weld"]);
        let Value::Text(text) = &table.get("a").unwrap().node.value else { panic!("a text") };
        assert_eq!((text.content.as_str(), text.inner), ("5 mm", Some(11)));
    }

    #[test]
    fn numbers_of_every_form_are_read() {
        let (table, faults) =
            parsed("a = 1_000\nb = 0x10\nc = 1e999\nd = nan\ne = 123456789012345678901234567890\n");
        assert!(faults.is_empty(), "{faults:?}");
        let table = table.unwrap();
        let number = |key: &str| {
            let Value::Number(number) = table.get(key).unwrap().node.value else { panic!("a number") };
            number
        };
        assert!((number("a") - 1000.0).abs() < 1e-12 && (number("b") - 16.0).abs() < 1e-12);
        assert!(number("c").is_infinite() && number("d").is_nan());
        assert!((number("e") - 1.234_567_890_123_456_8e29).abs() < 1e15);
    }

    #[test]
    fn syntax_faults_are_collected_one_a_line() {
        let (table, faults) = parsed("a = \nb = [1,, 2]\nc = 3\n");
        assert!(table.is_none());
        assert_eq!(faults.len(), 2, "{faults:?}");
    }

    #[test]
    fn a_key_given_twice_leaves_the_rest_usable() {
        let (table, faults) = parsed("a = 1\na = 2\n");
        assert!(table.is_some());
        assert_eq!(faults, ["f:2:1: `a` is given twice; hint: keep one of them"]);
    }

    #[test]
    fn deep_nesting_and_strange_bytes_are_faults() {
        assert!(parsed(&format!("a = {}", "[".repeat(100_000))).0.is_none());
        assert!(parsed(&format!("a{} = 1", ".a".repeat(10_000))).0.is_none());
        assert!(parsed("\u{0}\u{1}\u{7f}").0.is_none());
        assert_eq!(parsed(" \n").1, ["f: the file is empty; hint: `weldpole new` prints a starter file"]);
    }
}

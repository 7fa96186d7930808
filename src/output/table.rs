//! Text blocks: wrapped paragraphs, lines of label and value, and tables with aligned columns.
//!
//! Everything that came from a file passes through [`visible`], so that a title cannot move a terminal's
//! cursor or break a line.

use super::layout::{Emphasis, Layout};

/// Spaces between two columns.
const GAP: usize = 2;
/// A flexible column is never narrower than this.
const LEAST_FLEXIBLE: usize = 10;

/// `text` with control characters (line breaks, escape codes) shown as spaces.
pub(super) fn visible(text: &str) -> String {
    text.chars().map(|character| if character.is_control() { ' ' } else { character }).collect()
}

/// Number of characters.
fn width(text: &str) -> usize {
    text.chars().count()
}

/// `text` cut to `columns` characters, the cut marked by three dots.
pub(super) fn clip(text: &str, columns: usize) -> String {
    let text = visible(text);
    if width(&text) <= columns {
        return text;
    }
    let kept: String = text.chars().take(columns.saturating_sub(3)).collect();
    format!("{}...", kept.trim_end())
}

/// Breaks `text` at spaces into lines of at most `columns` characters; longer words are cut.
pub(super) fn wrap(text: &str, columns: usize) -> Vec<String> {
    let columns = columns.max(1);
    let mut lines = Vec::new();
    let mut line = String::new();
    for word in visible(text).split_whitespace() {
        let mut word: Vec<char> = word.chars().collect();
        if !line.is_empty() && width(&line) + 1 + word.len() > columns {
            lines.push(std::mem::take(&mut line));
        }
        while word.len() > columns {
            lines.push(word.drain(..columns).collect());
        }
        if !line.is_empty() && !word.is_empty() {
            line.push(' ');
        }
        line.extend(word);
    }
    if !line.is_empty() || lines.is_empty() {
        lines.push(line);
    }
    lines
}

/// Wrapped text whose first line begins with `first` and whose other lines are indented as far.
pub(super) fn hanging(first: &str, text: &str, columns: usize) -> String {
    let indent = width(first);
    let mut block = String::new();
    for (index, line) in wrap(text, columns.saturating_sub(indent)).iter().enumerate() {
        let start = if index == 0 { first.to_owned() } else { " ".repeat(indent) };
        block.push_str(format!("{start}{line}").trim_end());
        block.push('\n');
    }
    block
}

/// Lines of a label and a value, the values aligned and wrapped.
pub(super) fn labelled(indent: usize, rows: &[(&str, String)], columns: usize) -> String {
    let label_width = rows.iter().map(|(label, _)| width(label)).max().unwrap_or(0);
    rows.iter()
        .map(|(label, value)| {
            let first = format!("{}{label:<label_width$}{}", " ".repeat(indent), " ".repeat(GAP));
            hanging(&first, value, columns)
        })
        .collect()
}

/// A text across all columns, cut to the width.
fn across(text: &Cell, indent: usize, layout: &Layout) -> String {
    let shown = clip(&text.text, layout.columns().saturating_sub(indent));
    let painted = text.emphasis.map_or_else(|| shown.clone(), |emphasis| (layout.paint)(emphasis, &shown));
    format!("{}{painted}\n", " ".repeat(indent))
}

/// Side on which a column's text stands.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Side {
    /// Text.
    Left,
    /// Numbers.
    Right,
    /// Text that is wrapped when the table would be too wide.
    Flexible,
}

/// One cell.
#[derive(Debug, Clone)]
pub(super) struct Cell {
    text: String,
    emphasis: Option<Emphasis>,
}

impl Cell {
    /// A cell whose words are emphasised.
    pub(super) fn emphasised(text: &str, emphasis: Emphasis) -> Self {
        Self { text: visible(text), emphasis: Some(emphasis) }
    }
}

impl<T: AsRef<str>> From<T> for Cell {
    fn from(text: T) -> Self {
        Self { text: visible(text.as_ref()), emphasis: None }
    }
}

/// A table with one line of column titles.
#[derive(Debug, Clone)]
pub(super) struct Table {
    columns: Vec<(String, Side)>,
    rows: Vec<Row>,
}

/// One row of a table.
#[derive(Debug, Clone)]
enum Row {
    Cells(Vec<Cell>),
    /// Text across all columns.
    Across(Cell),
}

impl Table {
    /// An empty table with these columns.
    pub(super) fn new(columns: &[(&str, Side)]) -> Self {
        let columns = columns.iter().map(|(title, side)| ((*title).to_owned(), *side)).collect();
        Self { columns, rows: Vec::new() }
    }

    /// Adds a row.
    pub(super) fn row(&mut self, cells: Vec<Cell>) {
        self.rows.push(Row::Cells(cells));
    }

    /// Adds a text across all columns.
    pub(super) fn across(&mut self, text: Cell) {
        self.rows.push(Row::Across(text));
    }

    /// The table as text, its title line only when a column has a title.
    pub(super) fn render(&self, indent: usize, layout: &Layout) -> String {
        let widths = self.widths(layout.columns().saturating_sub(indent));
        let mut block = String::new();
        if self.columns.iter().any(|(title, _)| !title.is_empty()) {
            let titles: Vec<Cell> = self.columns.iter().map(|(title, _)| Cell::from(title)).collect();
            block.push_str(&self.lines(&titles, &widths, indent, layout));
        }
        for row in &self.rows {
            match row {
                Row::Cells(cells) => block.push_str(&self.lines(cells, &widths, indent, layout)),
                Row::Across(text) => block.push_str(&across(text, indent, layout)),
            }
        }
        block
    }

    /// Natural widths, the flexible columns narrowed as far as the table is too wide.
    fn widths(&self, available: usize) -> Vec<usize> {
        let natural = |index: usize| {
            let cells = self.rows.iter().filter_map(|row| match row {
                Row::Cells(cells) => cells.get(index).map(|cell| width(&cell.text)),
                Row::Across(_) => None,
            });
            cells.chain([width(&self.columns[index].0)]).max().unwrap_or(0)
        };
        let mut widths: Vec<usize> = (0..self.columns.len()).map(natural).collect();
        let mut excess =
            (widths.iter().sum::<usize>() + GAP * widths.len().saturating_sub(1)).saturating_sub(available);
        for ((_, side), width) in self.columns.iter().zip(&mut widths) {
            if *side == Side::Flexible {
                let narrowed = width.saturating_sub(excess).max(LEAST_FLEXIBLE.min(*width));
                excess -= (*width - narrowed).min(excess);
                *width = narrowed;
            }
        }
        widths
    }

    /// One row, on as many lines as its longest wrapped cell.
    fn lines(&self, row: &[Cell], widths: &[usize], indent: usize, layout: &Layout) -> String {
        let wrapped: Vec<Vec<String>> = row
            .iter()
            .zip(widths)
            .map(|(cell, columns)| {
                if width(&cell.text) <= *columns {
                    vec![cell.text.clone()]
                } else {
                    wrap(&cell.text, *columns)
                }
            })
            .collect();
        let height = wrapped.iter().map(Vec::len).max().unwrap_or(0);
        let mut block = String::new();
        for index in 0..height {
            let mut line = " ".repeat(indent);
            for (column, lines) in wrapped.iter().enumerate() {
                let text = lines.get(index).map_or("", String::as_str);
                let space = " ".repeat(widths[column].saturating_sub(width(text)));
                let shown = match row[column].emphasis {
                    Some(emphasis) if !text.is_empty() => (layout.paint)(emphasis, text),
                    Some(_) | None => text.to_owned(),
                };
                let gap = if column == 0 { "" } else { "  " };
                line.push_str(gap);
                line.push_str(&match self.columns[column].1 {
                    Side::Right => space + &shown,
                    Side::Left | Side::Flexible => shown + &space,
                });
            }
            block.push_str(line.trim_end());
            block.push('\n');
        }
        block
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn lines_stay_within_the_width_and_lose_no_word() {
        let text = "a weld is a curve with a size, and averyveryverylongword is cut where it must be";
        let lines = wrap(text, 12);
        assert!(lines.iter().all(|line| line.chars().count() <= 12), "{lines:?}");
        let joined: String = lines.concat().chars().filter(|character| *character != ' ').collect();
        assert_eq!(joined, text.replace(' ', ""));
    }

    #[test]
    fn columns_are_aligned_and_the_flexible_one_gives_way() {
        let mut table = Table::new(&[("what", Side::Flexible), ("size", Side::Right)]);
        table.row(vec![
            "a long description that does not fit in the width of the page at all".into(),
            "1".into(),
        ]);
        table.row(vec!["short".into(), "1000".into()]);
        let text = table.render(2, &Layout { width: 72, ..Layout::default() });
        insta::assert_snapshot!(text);
    }

    #[test]
    fn a_name_cannot_control_the_terminal() {
        assert_eq!(visible("a\u{1b}[31m\nb"), "a [31m b");
        assert_eq!(clip("a very long name", 10), "a very...");
    }
}

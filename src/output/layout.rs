//! How text for people is laid out: width, amount of detail, and how words are emphasised.
//!
//! The library knows what deserves emphasis and nothing about terminals: the caller passes a [`Painter`].
//! Painting happens after padding, so colour codes never disturb a column.

/// What a word is, for a caller that wants to show it in colour.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Emphasis {
    /// A verification that holds.
    Satisfied,
    /// A verification that does not hold, or a broken rule.
    Exceeded,
    /// No answer.
    NotSolved,
    /// A caution.
    Caution,
    /// A heading.
    Heading,
}

/// Turns text that deserves emphasis into what the terminal shows.
pub type Painter = fn(Emphasis, &str) -> String;

/// Settings of the text for people.
#[derive(Debug, Clone, Copy)]
pub struct Layout {
    /// Columns available: 80 fits every terminal and page.
    pub width: usize,
    /// Every case in detail, rather than the governing one in detail and the others in a table.
    pub all_cases: bool,
    /// How words are emphasised.
    pub paint: Painter,
}

impl Layout {
    /// Fewer columns than this cannot hold the tables.
    pub const LEAST_WIDTH: usize = 72;

    /// The width in use: at least [`Layout::LEAST_WIDTH`].
    #[must_use]
    pub fn columns(&self) -> usize {
        self.width.max(Self::LEAST_WIDTH)
    }
}

impl Default for Layout {
    fn default() -> Self {
        Self { width: 80, all_cases: false, paint: plain }
    }
}

/// Leaves text as it is.
#[must_use]
pub fn plain(_: Emphasis, text: &str) -> String {
    text.to_owned()
}

//! Letters to tokens of an expression: numbers, names and signs, each with its place in the text.
//!
//! A number is `12`, `0.5`, `.5` or `1.2e3`; an `e` without digits behind it begins a name. Signs that people
//! paste from other programs (`·`, `×`, `−`, `°`) are named in the hint, never guessed.

use super::faults::Span;

/// Longest expression, in bytes.
pub(super) const LONGEST: usize = 1000;

/// What is wrong with an expression, and where in its text.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct ExpressionFault {
    /// Place in the text of the expression.
    pub(super) span: Span,
    /// What was found.
    pub(super) message: String,
    /// What is accepted.
    pub(super) accepted: Option<String>,
    /// What to do.
    pub(super) hint: Option<String>,
}

impl ExpressionFault {
    /// A fault without further words.
    pub(super) fn new(span: Span, message: impl Into<String>) -> Self {
        Self { span, message: message.into(), accepted: None, hint: None }
    }

    /// With what is accepted.
    pub(super) fn accepted(mut self, text: impl Into<String>) -> Self {
        self.accepted = Some(text.into());
        self
    }

    /// With a hint.
    pub(super) fn hint(mut self, text: impl Into<String>) -> Self {
        self.hint = Some(text.into());
        self
    }
}

/// One token.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) enum Token<'t> {
    /// A number; true when it is written with digits alone.
    Number(f64, bool),
    /// The name of a unit, a function or a parameter.
    Name(&'t str),
    /// One of `+ - * / ^ ( ) ,`.
    Sign(char),
}

/// Whether a text can be the name of a parameter.
pub(super) fn is_name(text: &str) -> bool {
    let mut letters = text.chars();
    letters.next().is_some_and(begins_name) && letters.all(continues_name)
}

fn begins_name(letter: char) -> bool {
    letter.is_alphabetic() || letter == '_'
}

fn continues_name(letter: char) -> bool {
    letter.is_alphanumeric() || letter == '_'
}

/// The tokens of a text.
///
/// # Errors
/// A text that is too long, a letter that means nothing, a number that is not finite.
pub(super) fn tokens(text: &str) -> Result<Vec<(Token<'_>, Span)>, ExpressionFault> {
    if text.len() > LONGEST {
        let message = format!("the expression is too long, found {} bytes", text.len());
        return Err(ExpressionFault::new(0..text.len(), message)
            .accepted(format!("at most {LONGEST} bytes"))
            .hint("name parts of it as parameters"));
    }
    let mut found = Vec::new();
    let mut at = 0;
    while let Some(letter) = text[at..].chars().next() {
        let rest = &text[at..];
        let width = match letter {
            _ if letter.is_whitespace() => {
                at += letter.len_utf8();
                continue;
            }
            '+' | '-' | '*' | '/' | '^' | '(' | ')' | ',' => {
                found.push((Token::Sign(letter), at..at + 1));
                1
            }
            '0'..='9' | '.' => {
                let width = number_width(rest);
                let written = &rest[..width];
                let span = at..at + width;
                let value: f64 = written.parse().map_err(|_| {
                    ExpressionFault::new(span.clone(), format!("`{written}` is not a number"))
                })?;
                if !value.is_finite() {
                    return Err(ExpressionFault::new(span, format!("`{written}` is too large a number")));
                }
                found.push((Token::Number(value, written.bytes().all(|byte| byte.is_ascii_digit())), span));
                width
            }
            _ if begins_name(letter) => {
                let width = rest.find(|letter| !continues_name(letter)).unwrap_or(rest.len());
                found.push((Token::Name(&rest[..width]), at..at + width));
                width
            }
            _ => return Err(stray(letter, at)),
        };
        at += width;
    }
    Ok(found)
}

fn number_width(text: &str) -> usize {
    let bytes = text.as_bytes();
    let digits = |mut at: usize| {
        while bytes.get(at).is_some_and(u8::is_ascii_digit) {
            at += 1;
        }
        at
    };
    let mut end = digits(0);
    if bytes.get(end) == Some(&b'.') {
        end = digits(end + 1);
    }
    if matches!(bytes.get(end), Some(b'e' | b'E')) {
        let sign = usize::from(matches!(bytes.get(end + 1), Some(b'+' | b'-')));
        let exponent = digits(end + 1 + sign);
        if exponent > end + 1 + sign {
            end = exponent;
        }
    }
    end
}

fn stray(letter: char, at: usize) -> ExpressionFault {
    let span = at..at + letter.len_utf8();
    let shown = letter.escape_debug();
    let fault = ExpressionFault::new(span, format!("`{shown}` has no meaning in an expression"))
        .accepted("numbers with units, parameters, `+ - * / ^ ( ) ,` and functions");
    match letter {
        '·' | '×' | '⋅' => fault.hint("write `*` or a space between units"),
        '−' | '–' | '—' => fault.hint("write the minus sign `-` of the keyboard"),
        '°' => fault.hint("write `deg`"),
        '²' => fault.hint("write `^2`"),
        '³' => fault.hint("write `^3`"),
        '"' | '\'' | '″' | '′' => fault.hint("write `in` or `ft`"),
        _ => fault,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn kinds(text: &str) -> Vec<Token<'_>> {
        tokens(text).unwrap().into_iter().map(|(token, _)| token).collect()
    }

    #[test]
    fn numbers_names_and_signs() {
        assert_eq!(kinds("140mm"), [Token::Number(140.0, true), Token::Name("mm")]);
        assert_eq!(kinds("1.5e-3"), [Token::Number(1.5e-3, false)]);
        assert_eq!(kinds("2e"), [Token::Number(2.0, true), Token::Name("e")]);
        assert_eq!(kinds(".5 in"), [Token::Number(0.5, false), Token::Name("in")]);
        assert_eq!(kinds("-b_2"), [Token::Sign('-'), Token::Name("b_2")]);
        assert_eq!(kinds(""), []);
    }

    #[test]
    fn strange_letters_are_named_with_a_hint() {
        let fault = tokens("12 kN·m").unwrap_err();
        assert_eq!(fault.span, 5..7);
        assert_eq!(fault.hint.as_deref(), Some("write `*` or a space between units"));
        assert!(tokens("1 \u{0} 2").unwrap_err().message.contains("\\0"));
        assert!(tokens(".").unwrap_err().message.contains("not a number"));
        assert!(tokens("1e999").unwrap_err().message.contains("too large"));
    }

    #[test]
    fn the_length_has_a_limit() {
        assert!(tokens(&"1".repeat(300)).is_ok());
        assert!(tokens(&" ".repeat(LONGEST)).is_ok());
        assert!(tokens(&" ".repeat(LONGEST + 1)).is_err());
    }

    #[test]
    fn names_begin_with_a_letter() {
        assert!(is_name("b") && is_name("_x1") && is_name("größe"));
        assert!(!is_name("") && !is_name("1b") && !is_name("a-b") && !is_name("a b"));
    }
}

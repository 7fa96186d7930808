//! Joint file to model.

mod dimension;
mod document;
mod evaluate;
mod expression;
mod faults;
mod fields;
mod lexer;
mod nearest;
mod parameters;
mod quantity;

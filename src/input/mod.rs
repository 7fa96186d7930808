//! Joint file to model.

mod dimension;
mod evaluate;
mod expression;
mod faults;
mod lexer;
mod nearest;
mod quantity;

//! Joint file to model.

//! Questions that take many analyses: each is a stream of joints or loads through `analysis`.
//!
//! | study | question |
//! |---|---|
//! | [`selfcheck`] | whether the program computes what others have published |

pub mod selfcheck;

//! Questions that take many analyses: each is a stream of joints or loads through `analysis`.
//!
//! | study | question |
//! |---|---|
//! | [`load`] | how a load is turned and shifted |
//! | [`selfcheck`] | whether the program computes what others have published |
//! | [`sweep`] | how the strength follows a parameter of the joint or a property of its load |

pub mod load;
pub mod selfcheck;
pub mod sweep;

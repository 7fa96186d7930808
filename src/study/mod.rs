//! Questions that take many analyses: each is a stream of joints or loads through `analysis`.

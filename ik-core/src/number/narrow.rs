//! What [`Fixed16`](super::Fixed16) and [`Short32`](super::Short32) share: arithmetic for chips that multiply 32 bits by
//! 32 bits into 32, and have neither a divider nor a count of leading zeros (Cortex-M0 and M0+).

pub(super) mod chord;
pub(super) mod normal;

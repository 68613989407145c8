//! One checker per promise. Each takes a solver, servo or output, whoever made it, and says what is wrong with
//! it; `breaking.rs` feeds each of them wrong ones.

pub mod channel;
pub mod continuity;
pub mod limits;
pub mod mirror;
pub mod output;
pub mod published_pose;
pub mod reach;
pub mod round_trip;
pub mod servo;
pub mod totality;

/// Fails with a message unless `true`.
macro_rules! ensure {
    ($holds:expr, $($message:tt)+) => {
        // Not `!`: a comparison with NaN must fail too, and does so either way round here.
        if $holds {} else { return Err(format!($($message)+)); }
    };
}
pub(crate) use ensure;

//! A servo's centre and gain, or its measured points, from readings taken on the bench.
//!
//! | room | what is in it |
//! | --- | --- |
//! | [`readings`] | pulse and angle pairs from a CSV file, checked |
//! | [`regression`] | weighted least squares, with the errors of what it gives |
//! | [`mod@fit`] | what the readings say: line, curve, misread rows, backlash, whether points are worth it |
//! | [`block`] | the servo's lines of a sheet, new or in place |
//!
//! The pulse is what was sent and is exact; the angle is what was read. So angles are fitted on pulses, never the other way
//! round.

pub mod block;
pub mod fit;
pub mod readings;
pub mod regression;

pub use block::{Block, edited_sheet};
pub use fit::{Backlash, Fit, FitError, Row, Wanted, fit};
pub use readings::{Approach, Reading, ReadingsError, read};
pub use regression::{Regression, Term, regress};

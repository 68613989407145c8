//! Number systems that only the PC has.

mod float64;

pub use float64::Float64;

//! Damped least squares on nalgebra, roll-hip leg, to joint angles.
#![no_std]
#![no_main]

image::measure!(contenders::LeastSquares<ik_core::RollHip>);

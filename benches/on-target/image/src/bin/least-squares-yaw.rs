//! Damped least squares on nalgebra, yaw-hip leg, to joint angles.
#![no_std]
#![no_main]

image::measure!(contenders::LeastSquares<ik_core::YawHip>);

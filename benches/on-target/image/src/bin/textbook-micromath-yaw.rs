//! The textbook form on micromath, yaw-hip leg, to joint angles.
#![no_std]
#![no_main]

image::measure!(contenders::Textbook<ik_core::YawHip, contenders::OnMicromath>);

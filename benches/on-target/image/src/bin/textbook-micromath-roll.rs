//! The textbook form on micromath, roll-hip leg, to joint angles.
#![no_std]
#![no_main]

image::measure!(contenders::Textbook<ik_core::RollHip, contenders::OnMicromath>);

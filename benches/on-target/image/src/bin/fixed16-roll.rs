//! ik-core, Fixed16, roll-hip leg, to joint angles.
#![no_std]
#![no_main]

image::measure!(contenders::Ours<ik_core::RollHip, ik_core::Fixed16>);

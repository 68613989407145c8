//! ik-core, Float32, roll-hip leg, to joint angles.
#![no_std]
#![no_main]

image::measure!(contenders::Ours<ik_core::RollHip, ik_core::Float32>);

//! ik-core, Short32, yaw-hip leg, to joint angles.
#![no_std]
#![no_main]

image::measure!(contenders::Ours<ik_core::YawHip, ik_core::Short32>);

//! ik-core, Short32, yaw-hip leg, to timer ticks.
#![no_std]
#![no_main]

image::measure!(contenders::OursToTicks<ik_core::YawHip, ik_core::Short32>);

//! ik-core, Short32, roll-hip leg, to timer ticks.
#![no_std]
#![no_main]

image::measure!(contenders::OursToTicks<ik_core::RollHip, ik_core::Short32>);

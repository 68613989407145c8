//! ik-core, Fixed16, roll-hip leg, to timer ticks.
#![no_std]
#![no_main]

image::measure!(contenders::OursToTicks<ik_core::RollHip, ik_core::Fixed16>);

//! The call alone, over the targets of the yaw-hip leg.
#![no_std]
#![no_main]

image::measure!(contenders::Nothing<ik_core::YawHip>);

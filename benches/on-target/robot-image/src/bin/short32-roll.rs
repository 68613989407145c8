//! Short32, roll-hip leg.
#![no_std]
#![no_main]

robot_image::measure!(RollHip, Short32);

//! Float32, roll-hip leg, timer.
#![no_std]
#![no_main]

robot_image::measure!(RollHip, Float32, Timer);

//! Fixed32, roll-hip leg, timer.
#![no_std]
#![no_main]

robot_image::measure!(RollHip, Fixed32, Timer);

//! Float32, yaw-hip leg, timer.
#![no_std]
#![no_main]

robot_image::measure!(YawHip, Float32, Timer);

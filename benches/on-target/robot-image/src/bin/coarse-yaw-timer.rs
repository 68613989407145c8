//! Coarse, yaw-hip leg, timer.
#![no_std]
#![no_main]

robot_image::measure!(YawHip, Coarse, Timer);

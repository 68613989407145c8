//! Fixed16, yaw-hip leg.
#![no_std]
#![no_main]

robot_image::measure!(YawHip, Fixed16);

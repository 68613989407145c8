//! Coarse, yaw-hip leg.
#![no_std]
#![no_main]

robot_image::measure!(YawHip, Coarse);

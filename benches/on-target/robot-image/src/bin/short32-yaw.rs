//! Short32, yaw-hip leg.
#![no_std]
#![no_main]

robot_image::measure!(YawHip, Short32);

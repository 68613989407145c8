//! Float32, yaw-hip leg, expander.
#![no_std]
#![no_main]

robot_image::measure!(YawHip, Float32, Expander);

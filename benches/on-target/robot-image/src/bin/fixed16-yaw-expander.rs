//! Fixed16, yaw-hip leg, expander.
#![no_std]
#![no_main]

robot_image::measure!(YawHip, Fixed16, Expander);

//! Float32, roll-hip leg, expander.
#![no_std]
#![no_main]

robot_image::measure!(RollHip, Float32, Expander);

//! Fixed16, roll-hip leg, expander.
#![no_std]
#![no_main]

robot_image::measure!(RollHip, Fixed16, Expander);

//! Coarse, roll-hip leg, expander.
#![no_std]
#![no_main]

robot_image::measure!(RollHip, Coarse, Expander);

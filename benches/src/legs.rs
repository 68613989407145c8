//! The demo legs, mm: hip offset or coxa, thigh or femur, shank or tibia.

/// The orchard walker's leg: roll hip, knee forward.
pub const ORCHARD: [f64; 3] = [31.5, 94.0, 107.0];
/// The culvert walker's leg: yaw hip, knee up.
pub const CULVERT: [f64; 3] = [42.0, 71.0, 118.0];

/// What the first joint does.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Shape {
    /// It rolls about x: the orchard walker's leg.
    RollHip,
    /// It yaws about z: the culvert walker's leg.
    YawHip,
}

impl Shape {
    /// Both.
    pub const ALL: [Self; 2] = [Self::RollHip, Self::YawHip];

    /// The demo leg of this shape.
    pub const fn leg(self) -> [f64; 3] {
        match self {
            Self::RollHip => ORCHARD,
            Self::YawHip => CULVERT,
        }
    }

    /// Its name in reports.
    pub const fn name(self) -> &'static str {
        match self {
            Self::RollHip => "roll-hip",
            Self::YawHip => "yaw-hip",
        }
    }
}

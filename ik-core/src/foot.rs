//! Foot positions.

use crate::number::Number;

/// A foot position in mm: in the leg's frame (x forward, y outboard, z up) unless a function says otherwise.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Foot<N: Number> {
    /// Forward.
    pub x: N::Length,
    /// Outboard in the leg's frame, left in the body's.
    pub y: N::Length,
    /// Up.
    pub z: N::Length,
}

impl<N: Number> Foot<N> {
    /// The frame's origin.
    pub const ORIGIN: Self = Self { x: N::NO_LENGTH, y: N::NO_LENGTH, z: N::NO_LENGTH };

    /// A foot from lengths of the number system.
    pub const fn new(x: N::Length, y: N::Length, z: N::Length) -> Self {
        Self { x, y, z }
    }

    /// A foot from mm as `f64`, rounded and saturated to what the number system holds. For constants: fixed
    /// point has no NaN and takes it for 0, so what was computed or received goes through
    /// [`try_from_mm`](Foot::try_from_mm).
    ///
    /// On a chip without an FPU this links software floating point unless the arguments are constants;
    /// [`new`](Foot::new) does not.
    #[inline]
    pub fn from_mm(x: f64, y: f64, z: f64) -> Self {
        Self { x: N::length_from_mm(x), y: N::length_from_mm(y), z: N::length_from_mm(z) }
    }

    /// Like [`from_mm`](Foot::from_mm); `None` if a coordinate is NaN or infinite.
    pub fn try_from_mm(x: f64, y: f64, z: f64) -> Option<Self> {
        (x.is_finite() && y.is_finite() && z.is_finite()).then(|| Self::from_mm(x, y, z))
    }

    /// x, y, z in mm.
    pub fn mm(&self) -> [f64; 3] {
        self.lengths().map(N::mm)
    }

    /// x, y, z.
    pub const fn lengths(&self) -> [N::Length; 3] {
        [self.x, self.y, self.z]
    }
}

#[cfg(feature = "defmt")]
impl<N: Number> defmt::Format for Foot<N> {
    fn format(&self, f: defmt::Formatter<'_>) {
        let [x, y, z] = self.lengths().map(N::micrometres);
        defmt::write!(f, "foot ({=i32}, {=i32}, {=i32}) um", x, y, z);
    }
}

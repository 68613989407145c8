//! From words to a limb and an output of ik-core.

use ik_core::output::Output;
use ik_core::{
    Bend, Dimensions, Expander, Foot, GeometryError, Hip, Leg, Limb, Limits, Mounting, RollHip, Servo,
    ServoSpec, Side, Timer, Turns, YawHip,
};

use crate::{Bits, LegWords, ServoWords};

/// A hip whose legs are built from words.
pub trait BuildHip: Hip {
    /// Its name in those of images.
    const WORD: &'static str;

    /// The leg's measures.
    ///
    /// # Errors
    /// What cannot be.
    fn dimensions(measures_mm: [f64; 3], bends_back: bool) -> Result<Dimensions<Self>, GeometryError>;
}

impl BuildHip for RollHip {
    const WORD: &'static str = "roll";

    fn dimensions([offset, thigh, shank]: [f64; 3], back: bool) -> Result<Dimensions<Self>, GeometryError> {
        Dimensions::roll_hip(offset, thigh, shank, if back { Bend::Backward } else { Bend::Forward })
    }
}

impl BuildHip for YawHip {
    const WORD: &'static str = "yaw";

    fn dimensions([coxa, femur, tibia]: [f64; 3], back: bool) -> Result<Dimensions<Self>, GeometryError> {
        Dimensions::yaw_hip(coxa, femur, tibia, if back { Bend::Down } else { Bend::Up })
    }
}

/// An output that is built from words.
pub trait BuildOutput: Output + Copy + 'static {
    /// Its name in those of images.
    const WORD: &'static str;

    /// The output.
    ///
    /// # Errors
    /// What cannot be.
    fn build(words: &LegWords) -> Result<Self, &'static str>;
}

impl BuildOutput for Timer {
    const WORD: &'static str = "timer";

    fn build(words: &LegWords) -> Result<Self, &'static str> {
        let LegWords { clock_hz, divider, bits, frame_hz, .. } = *words;
        let bits = bits.min(255) as u8;
        if divider == 0 {
            Timer::finest(clock_hz, bits, frame_hz)
        } else {
            Timer::new(clock_hz, divider, bits, frame_hz)
        }
        .map_err(|error| error.message())
    }
}

impl BuildOutput for Expander {
    const WORD: &'static str = "expander";

    fn build(words: &LegWords) -> Result<Self, &'static str> {
        Expander::nearest(words.clock_hz, words.bits.min(255) as u8, words.frame_hz)
            .map_err(|error| error.message())
    }
}

impl LegWords {
    /// The limb of these words.
    ///
    /// # Errors
    /// What ik-core refuses.
    pub fn limb<H: BuildHip, N: Bits>(&self) -> Result<Limb<H, N>, &'static str> {
        let [hip, thigh, knee] = self.range_deg;
        let dimensions = H::dimensions(self.measures_mm, self.bends_back).map_err(|error| error.message())?;
        let limits = Limits::degrees(hip, thigh, knee).map_err(|error| error.message())?;
        let [hip, thigh, knee] = self.servos;
        let side = if self.right { Side::Right } else { Side::Left };
        let [x, y, z] = self.at_mm;
        Ok(Limb {
            leg: Leg::from_dimensions(dimensions, limits).map_err(|error| error.message())?,
            mounting: Mounting::new(Foot::from_mm(x, y, z), side),
            servos: [hip.servo()?, thigh.servo()?, knee.servo()?],
        })
    }
}

impl ServoWords {
    fn servo<N: Bits>(&self) -> Result<Servo<N>, &'static str> {
        let [centre_us, joint_at_centre_deg, us_per_degree, trim_us] = self.measures;
        Servo::from_spec(ServoSpec {
            centre_us,
            joint_at_centre_deg,
            us_per_degree,
            turns: if self.against { Turns::Against } else { Turns::With },
            trim_us,
            pulse_us: self.pulse_us,
        })
        .map_err(|error| error.message())
    }
}

//! From words to a limb of ik-core.

use ik_core::channel::Counts;
use ik_core::drive::Drive;
use ik_core::output::Counting;
use ik_core::{
    Bend, Channel, Curve, Dimensions, Expander, Foot, GeometryError, Hip, Leg, Limb, Limits, MeasuredServo,
    Mounting, Parallelogram, RollHip, ServoSpec, Side, Timer, Turns, YawHip,
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

/// What drives a leg's joints, on an output, built from words.
pub trait BuildDrive<N: Bits>: Drive<N, Sent = Counts> + 'static {
    /// Of these servos on this output.
    ///
    /// # Errors
    /// What cannot be.
    fn build(curves: &[Curve; 3], counting: Counting) -> Result<Self, &'static str>;

    /// The joint ranges that it leaves.
    ///
    /// # Errors
    /// If it leaves none.
    fn limits(limits: Limits, _bend: Bend, _curves: &[Curve; 3]) -> Result<Limits, &'static str> {
        Ok(limits)
    }
}

impl<N: Bits, const BENDS: usize> BuildDrive<N> for [Channel<N, BENDS>; 3] {
    fn build([hip, thigh, knee]: &[Curve; 3], counting: Counting) -> Result<Self, &'static str> {
        let channel = |curve| Channel::from_curve(curve, counting).map_err(|error| error.message());
        Ok([channel(hip)?, channel(thigh)?, channel(knee)?])
    }
}

impl<N: Bits, const BENDS: usize> BuildDrive<N> for Parallelogram<Channel<N, BENDS>> {
    fn build(curves: &[Curve; 3], counting: Counting) -> Result<Self, &'static str> {
        BuildDrive::build(curves, counting).map(Parallelogram)
    }

    fn limits(limits: Limits, bend: Bend, [_, thigh, shank]: &[Curve; 3]) -> Result<Limits, &'static str> {
        limits
            .through_parallelogram(bend, thigh.joint_deg(), shank.joint_deg())
            .map_err(|error| error.message())
    }
}

impl LegWords {
    /// The limb of these words.
    ///
    /// # Errors
    /// What ik-core refuses.
    pub fn limb<H: BuildHip, N: Bits, D: BuildDrive<N>>(&self) -> Result<Limb<H, N, D>, &'static str> {
        let [hip, thigh, knee] = self.range_deg;
        let dimensions = H::dimensions(self.measures_mm, self.bends_back).map_err(|error| error.message())?;
        let limits = Limits::degrees(hip, thigh, knee).map_err(|error| error.message())?;
        let [hip, thigh, knee] = &self.servos;
        let curves = [hip.curve()?, thigh.curve()?, knee.curve()?];
        let limits = D::limits(limits, dimensions.bend(), &curves)?;
        let side = if self.right { Side::Right } else { Side::Left };
        let [x, y, z] = self.at_mm;
        Ok(Limb {
            leg: Leg::from_dimensions(dimensions, limits).map_err(|error| error.message())?,
            mounting: Mounting::new(Foot::from_mm(x, y, z), side),
            servos: D::build(&curves, self.counting()?)?,
        })
    }

    fn counting(&self) -> Result<Counting, &'static str> {
        let (clock_hz, divider, frame_hz) = (self.clock_hz, self.divider, self.frame_hz);
        let bits = self.bits.min(255) as u8;
        if self.expander {
            Expander::nearest(clock_hz, bits, frame_hz).map(|expander| expander.counting())
        } else if divider == 0 {
            Timer::finest(clock_hz, bits, frame_hz).map(|timer| timer.counting())
        } else {
            Timer::new(clock_hz, divider, bits, frame_hz).map(|timer| timer.counting())
        }
        .map_err(|error| error.message())
    }
}

impl ServoWords {
    fn curve(&self) -> Result<Curve, &'static str> {
        let (trim_us, pulse_us) = (self.trim_us, self.pulse_us);
        match self.measured.get(..self.points as usize) {
            None | Some([]) => {
                let [centre_us, joint_at_centre_deg, us_per_degree] = self.straight;
                let turns = if self.against { Turns::Against } else { Turns::With };
                ServoSpec { centre_us, joint_at_centre_deg, us_per_degree, turns, trim_us, pulse_us }.curve()
            }
            Some(points) => MeasuredServo { points, trim_us, pulse_us }.curve(),
        }
        .map_err(|error| error.message())
    }
}

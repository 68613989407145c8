//! ik-core's servo behind plain `f64`, so that a wrong one can take its place.

use super::solver::{NumberSystem, angle};
use ik_core::{Angle, Coarse, End, Fixed32, Float32, Number, Pulse, Servo, ServoError, ServoSpec, Short32};
use ik_host_tests::numbers::Float64;

/// A servo: ik-core's, or a wrong one that must be found out.
pub trait ServoModel {
    fn number(&self) -> NumberSystem;
    fn spec(&self) -> ServoSpec;
    /// An angle as the number system holds it, rad.
    fn quantised(&self, radians: f64) -> f64;
    fn command(&self, radians: f64) -> (Pulse, Option<End>);
    fn angle(&self, pulse: Pulse) -> f64;
    fn pulse_range(&self) -> [Pulse; 2];
}

/// ik-core's servo.
pub fn core(number: NumberSystem, spec: ServoSpec) -> Result<Box<dyn ServoModel>, ServoError> {
    Ok(match number {
        NumberSystem::Float32 => Box::new(Core::<Float32>::new(number, spec)?),
        NumberSystem::Coarse => Box::new(Core::<Coarse>::new(number, spec)?),
        NumberSystem::Fixed32 => Box::new(Core::<Fixed32>::new(number, spec)?),
        NumberSystem::Short32 => Box::new(Core::<Short32>::new(number, spec)?),
        NumberSystem::Float64 => Box::new(Core::<Float64>::new(number, spec)?),
    })
}

struct Core<N: Number> {
    number: NumberSystem,
    spec: ServoSpec,
    core: Servo<N>,
}

impl<N: Number> Core<N> {
    fn new(number: NumberSystem, spec: ServoSpec) -> Result<Self, ServoError> {
        Ok(Self { number, spec, core: Servo::from_spec(spec)? })
    }
}

impl<N: Number> ServoModel for Core<N> {
    fn number(&self) -> NumberSystem {
        self.number
    }
    fn spec(&self) -> ServoSpec {
        self.spec
    }
    fn quantised(&self, radians: f64) -> f64 {
        angle::<N>(radians).radians()
    }
    fn command(&self, radians: f64) -> (Pulse, Option<End>) {
        let command = self.core.command(angle(radians));
        (command.pulse, command.held)
    }
    fn angle(&self, pulse: Pulse) -> f64 {
        Angle::radians(self.core.angle(pulse))
    }
    fn pulse_range(&self) -> [Pulse; 2] {
        self.core.pulse_range()
    }
}

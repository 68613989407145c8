//! Places on the body as a number system holds them.

use crate::sheet::NumberSystem;
use ik_core::{Fixed16, Fixed32, Float32, Foot, Number, Short32};

/// The type of a number system's lengths, if it is one of `fixed`'s.
pub(super) const fn fixed_type(number: NumberSystem) -> Option<&'static str> {
    match number {
        NumberSystem::Float32 | NumberSystem::Coarse => None,
        NumberSystem::Fixed32 | NumberSystem::Short32 => Some("I16F16"),
        NumberSystem::Fixed16 => Some("I10F6"),
    }
}

/// x, y, z as expressions; `None` if the number system does not reach so far.
pub(super) fn expressions(number: NumberSystem, at_mm: [f64; 3]) -> Option<[String; 3]> {
    let fixed = |bits: [i32; 3]| bits.map(|bits| format!("mm({bits})"));
    match number {
        NumberSystem::Float32 | NumberSystem::Coarse => {
            held::<Float32>(at_mm).map(|at| at.lengths().map(|length| format!("{length:?}")))
        }
        NumberSystem::Fixed32 => {
            held::<Fixed32>(at_mm).map(|at| fixed(at.lengths().map(|length| length.to_bits())))
        }
        NumberSystem::Short32 => {
            held::<Short32>(at_mm).map(|at| fixed(at.lengths().map(|length| length.to_bits())))
        }
        NumberSystem::Fixed16 => {
            held::<Fixed16>(at_mm).map(|at| fixed(at.lengths().map(|length| i32::from(length.to_bits()))))
        }
    }
}

/// Half of the coarsest step, 1/64 mm, and a hair.
const MOST_ROUNDING_MM: f64 = 0.5001 / 64.0;

fn held<N: Number>(at_mm: [f64; 3]) -> Option<Foot<N>> {
    let [x, y, z] = at_mm;
    let at = Foot::<N>::try_from_mm(x, y, z)?;
    // What saturates is elsewhere.
    at.mm().iter().zip(at_mm).all(|(held, asked)| (held - asked).abs() <= MOST_ROUNDING_MM).then_some(at)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn places_are_rounded_and_never_saturated() {
        let at = |number, x: f64| expressions(number, [x, -1.5, 0.0]).map(|[x, y, z]| [x, y, z].join(" "));
        assert_eq!(at(NumberSystem::Fixed16, 42.51).unwrap(), "mm(2721) mm(-96) mm(0)");
        assert_eq!(at(NumberSystem::Fixed16, 600.0), None);
        assert_eq!(at(NumberSystem::Fixed32, 600.0).unwrap(), "mm(39321600) mm(-98304) mm(0)");
        assert_eq!(at(NumberSystem::Float32, 0.1).unwrap(), "0.1 -1.5 0.0");
    }
}

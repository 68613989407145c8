//! Every way to solve a leg that is counted: ik-core's own, and those it is compared with.
//!
//! The code here runs on the chip, where it is counted, and on the PC, where its answers are judged; both must
//! give the same bits.
#![cfg_attr(not(test), no_std)]
#![forbid(unsafe_code)]

mod contender;
mod forward;
mod in_flash;
mod inverse;
mod least_squares;
mod nothing;
mod ours;
mod ours_to_ticks;
mod textbook;

pub use contender::{Contender, Named, PublishedHip, To};
pub use forward::{Forward, foot_error_mm};
pub use inverse::{Inverse, joint_error_rad};
pub use least_squares::LeastSquares;
pub use nothing::Nothing;
pub use ours::Ours;
pub use ours_to_ticks::OursToTicks;
pub use textbook::{OnCordic, OnLibm, OnMicromath, Textbook};

use ik_core::{Coarse, Fixed16, Fixed32, Float32, RollHip, Short32, YawHip};

/// Something that is done with every contender.
pub trait Visit {
    /// With this one.
    fn visit<C: Contender>(&mut self);
}

/// Gives every contender its name, and goes through them all.
macro_rules! contenders {
    ($($contender:ty => $name:literal,)*) => {
        $(impl Named for $contender {
            const NAME: &'static str = $name;
        })*

        /// Goes through all contenders, in the order of the table.
        pub fn visit_all(visit: &mut impl Visit) {
            $(visit.visit::<$contender>();)*
        }
    };
}

contenders! {
    Nothing<RollHip> => "nothing-roll",
    Nothing<YawHip> => "nothing-yaw",
    Ours<RollHip, Float32> => "float32-roll",
    Ours<YawHip, Float32> => "float32-yaw",
    Ours<RollHip, Fixed32> => "fixed32-roll",
    Ours<YawHip, Fixed32> => "fixed32-yaw",
    Ours<RollHip, Short32> => "short32-roll",
    Ours<YawHip, Short32> => "short32-yaw",
    Ours<RollHip, Fixed16> => "fixed16-roll",
    Ours<YawHip, Fixed16> => "fixed16-yaw",
    Ours<RollHip, Coarse> => "coarse-roll",
    Ours<YawHip, Coarse> => "coarse-yaw",
    Textbook<RollHip, OnLibm> => "textbook-libm-roll",
    Textbook<YawHip, OnLibm> => "textbook-libm-yaw",
    Textbook<RollHip, OnMicromath> => "textbook-micromath-roll",
    Textbook<YawHip, OnMicromath> => "textbook-micromath-yaw",
    Textbook<RollHip, OnCordic> => "textbook-cordic-roll",
    Textbook<YawHip, OnCordic> => "textbook-cordic-yaw",
    LeastSquares<RollHip> => "least-squares-roll",
    LeastSquares<YawHip> => "least-squares-yaw",
    OursToTicks<RollHip, Float32> => "float32-roll-ticks",
    OursToTicks<YawHip, Float32> => "float32-yaw-ticks",
    OursToTicks<RollHip, Fixed32> => "fixed32-roll-ticks",
    OursToTicks<YawHip, Fixed32> => "fixed32-yaw-ticks",
    OursToTicks<RollHip, Short32> => "short32-roll-ticks",
    OursToTicks<YawHip, Short32> => "short32-yaw-ticks",
    OursToTicks<RollHip, Fixed16> => "fixed16-roll-ticks",
    OursToTicks<YawHip, Fixed16> => "fixed16-yaw-ticks",
    OursToTicks<RollHip, Coarse> => "coarse-roll-ticks",
    OursToTicks<YawHip, Coarse> => "coarse-yaw-ticks",
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::{collections::BTreeSet, fs, path::Path};

    /// How far a contender's foot may be off over the published targets, mm: by the first part of its name. What
    /// ik-core is worth is the survey's business; here it only must not be nonsense.
    const OFF_MM: [(&str, f64); 9] = [
        ("float32-", 1e-3),
        ("fixed32-", 1e-3),
        ("short32-", 1e-3),
        ("fixed16-", 0.05),
        ("coarse-", 3.0),
        ("textbook-libm-", 7e-5),
        // Its root is off by up to 6 %.
        ("textbook-micromath-", 55.0),
        ("textbook-cordic-", 0.12),
        // It stops at 0.001 mm by its own arithmetic.
        ("least-squares-", 1.05e-3),
    ];

    /// Largest foot error over the published targets, mm.
    fn off_mm<C: Contender>() -> f64 {
        C::Hip::PUBLISHED.targets.iter().fold(0.0, |largest, &target| {
            let answer = C::solve(&C::LEG, &C::foot(target));
            assert_eq!(C::bits(&answer)[3], 0, "{} does not reach {target:?}", C::NAME);
            let off = foot_error_mm::<C::Hip>(C::joints(&answer), target);
            assert!(off.is_finite(), "{} at {target:?}", C::NAME);
            largest.max(off)
        })
    }

    #[test]
    fn every_contender_reaches_every_target() {
        struct Judge;
        impl Visit for Judge {
            fn visit<C: Contender>(&mut self) {
                if C::TO == To::Nothing {
                    return;
                }
                let bound = OFF_MM.iter().find(|(name, _)| C::NAME.starts_with(name));
                let &(_, most) = bound.unwrap_or_else(|| panic!("no bound for {}", C::NAME));
                let off = off_mm::<C>();
                assert!(off <= most, "{}: {off} mm, more than {most} mm", C::NAME);
                assert!(C::OURS || off > most / 2.0, "{}: {off} mm; {most} mm is too slack", C::NAME);
            }
        }
        visit_all(&mut Judge);
    }

    #[test]
    fn no_pulse_leaves_its_range() {
        struct Judge;
        impl Visit for Judge {
            fn visit<C: Contender>(&mut self) {
                if C::TO == To::Ticks {
                    for &target in C::Hip::PUBLISHED.targets {
                        let [hip, thigh, knee, _] = C::bits(&C::solve(&C::LEG, &C::foot(target)));
                        // 600 us and 2400 us at 48 MHz / 15, without the ends: the ordinary way is counted.
                        for ticks in [hip, thigh, knee] {
                            assert!((1921..7680).contains(&ticks), "{} at {target:?}: {ticks}", C::NAME);
                        }
                    }
                }
            }
        }
        visit_all(&mut Judge);
    }

    #[test]
    fn every_contender_has_an_image_and_every_image_a_contender() {
        struct Names(BTreeSet<String>);
        impl Visit for Names {
            fn visit<C: Contender>(&mut self) {
                assert!(self.0.insert(C::NAME.into()), "{} twice", C::NAME);
            }
        }
        let mut names = Names(BTreeSet::new());
        visit_all(&mut names);
        let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../image/src/bin");
        let images: BTreeSet<String> = fs::read_dir(folder)
            .expect("the images' folder")
            .map(|entry| entry.expect("an entry").path())
            .map(|path| path.file_stem().expect("a file").to_string_lossy().into_owned())
            .collect();
        assert_eq!(names.0, images);
    }
}

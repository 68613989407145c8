//! A servo of a sheet as ik-core's curve.

use crate::sheet::{Servo, ServoCurve, Turns};
use ik_core::{Curve, MeasuredServo, ServoError, ServoSpec};

/// The curve of a servo as ik-core makes it.
pub(super) fn curve(servo: &Servo, trim_us: f64) -> Result<Curve, ServoError> {
    match &servo.curve {
        ServoCurve::Straight { centre_us, joint_at_centre_deg, us_per_degree, turns } => ServoSpec {
            centre_us: *centre_us,
            joint_at_centre_deg: *joint_at_centre_deg,
            us_per_degree: *us_per_degree,
            turns: match turns {
                Turns::With => ik_core::Turns::With,
                Turns::Against => ik_core::Turns::Against,
            },
            trim_us,
            pulse_us: servo.pulse_us,
        }
        .curve(),
        ServoCurve::Measured { measured } => {
            MeasuredServo { points: measured, trim_us, pulse_us: servo.pulse_us }.curve()
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_sheets_angles_and_ik_cores_are_the_same() {
        let straight = ServoCurve::Straight {
            centre_us: 1480.0,
            joint_at_centre_deg: 20.0,
            us_per_degree: 9.7,
            turns: Turns::Against,
        };
        let bent = vec![[700.0, 70.0], [1200.0, 31.0], [1500.0, 0.0], [2300.0, -75.0]];
        for curve_of in [straight, ServoCurve::Measured { measured: bent }] {
            let servo = Servo {
                curve: curve_of,
                pulse_us: [800.0, 2250.0],
                dead_band_us: 0.0,
                speed_s_per_60_deg: None,
                stall_torque_n_mm: None,
                slew_us_per_frame: None,
                start_us: None,
            };
            for trim_us in [-90.0, 0.0, 12.5, 200.0] {
                let curve = curve(&servo, trim_us).expect("a curve");
                assert_eq!(curve.pulse_us(), servo.sent_us(trim_us));
                let (core, plain) = (curve.joint_deg(), servo.range_deg(trim_us));
                for (core, plain) in core.into_iter().zip(plain) {
                    assert!((core - plain).abs() < 1e-9, "{core} {plain}");
                }
            }
        }
    }
}

//! The servos' slews and first pulses of a sheet as ik-core's bounds.

use super::{BENDS, Counter, Refused, of_servo, servo};
use crate::sheet::Robot;
use ik_core::frame::ServoBounds;
use ik_core::{Channel, Fixed32, Pulse};

/// The bounds of the servos of the `leg`th leg of a sheet, hip, thigh (femur), knee, in counts of its output: the same in
/// every number system. `None` for a servo whose slew or first pulse the sheet does not give. The leg's trim is added to the
/// first pulse as to every other, and held within the pulses that are ever sent.
///
/// # Errors
/// What ik-core refuses, and why.
pub fn servo_bounds(robot: &Robot, leg: usize) -> Result<[Option<ServoBounds>; 3], Refused> {
    let mount = &robot.legs[leg];
    let kind = &robot.kinds[mount.kind];
    let counting = Counter::of_kind(robot, mount.kind)?.counting();
    let bounds = |joint: usize| {
        let (sheet, trim_us) = (&kind.servos[joint], mount.trim_us[joint]);
        let (Some(slew_us), Some(start_us)) = (sheet.slew_us_per_frame, sheet.start_us) else {
            return Ok(None);
        };
        let [shortest, longest] = sheet.sent_us(trim_us);
        let start = Pulse::from_us((start_us + trim_us).max(shortest).min(longest));
        let curve = servo::curve(sheet, trim_us).map_err(|error| of_servo(kind, joint, error))?;
        let channel = Channel::<Fixed32, BENDS>::from_curve(&curve, counting)
            .map_err(|error| of_servo(kind, joint, error))?;
        ServoBounds::on_channel(&channel, counting, start, Pulse::from_us(slew_us))
            .map(Some)
            .map_err(|error| of_servo(kind, joint, error))
    };
    Ok([bounds(0)?, bounds(1)?, bounds(2)?])
}

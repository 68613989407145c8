//! `toehold solve`: one target.

use super::ending::{Ending, print};
use super::robots;
use crate::report;
use crate::sheet::Robot;
use crate::solve::{leg_frame, solve};
use std::path::PathBuf;

/// Solves one foot position in every number system, side by side.
#[derive(Debug, clap::Args)]
pub(super) struct Call {
    /// The robot sheet, or the name of a demo robot; without it, the first demo robot
    #[arg(value_name = "SHEET")]
    sheet: Option<PathBuf>,
    /// The leg, by its name in the sheet; without it, the first
    #[arg(long, value_name = "NAME")]
    leg: Option<String>,
    /// The foot in mm: x forward, y outboard (with --on-body: left), z up
    #[arg(long, value_name = "X,Y,Z", allow_hyphen_values = true, value_parser = foot)]
    foot: Foot,
    /// The foot is given in the body's frame, not the leg's
    #[arg(long)]
    on_body: bool,
    /// Print JSON instead of a table
    #[arg(long)]
    json: bool,
}

/// x, y, z in mm.
#[derive(Debug, Clone, Copy)]
struct Foot([f64; 3]);

fn foot(text: &str) -> Result<Foot, String> {
    let parts: Vec<_> = text.split(',').map(str::trim).collect();
    let [x, y, z] = parts[..] else {
        return Err(format!("{} numbers where three are wanted, as in 20,110.5,-60", parts.len()));
    };
    let number = |axis: &str, part: &str| {
        part.parse::<f64>()
            .map_err(|_| format!("{axis} is {part:?}, which is no number of mm; 110.5 would be"))
    };
    Ok(Foot([number("x", x)?, number("y", y)?, number("z", z)?]))
}

impl Call {
    pub(super) fn run(&self) -> Ending {
        self.solved().unwrap_or_else(|ending| ending)
    }

    fn solved(&self) -> Result<Ending, Ending> {
        let source = robots::named_or_first_demo(self.sheet.as_ref());
        let robot = source.robot()?;
        let leg = self.leg_of(&robot)?;
        let foot = if self.on_body { leg_frame(&robot, leg, self.foot.0) } else { self.foot.0 };
        let solved = solve(&robot, leg, foot, self.on_body)
            .map_err(|error| Ending::WrongInput(format!("{}: {error}", source.shown())))?;
        let printed =
            if self.json { report::json(&solved) } else { report::solved_text(&solved, &source.shown()) };
        print(&printed)?;
        Ok(Ending::Within)
    }

    fn leg_of(&self, robot: &Robot) -> Result<usize, Ending> {
        let Some(name) = &self.leg else { return Ok(0) };
        robot.legs.iter().position(|leg| leg.name == *name).ok_or_else(|| {
            let known: Vec<_> = robot.legs.iter().map(|leg| format!("{:?}", leg.name)).collect();
            Ending::WrongInput(format!(
                "toehold: {} has no leg {name:?}; its legs are {}",
                robot.name,
                known.join(", ")
            ))
        })
    }
}

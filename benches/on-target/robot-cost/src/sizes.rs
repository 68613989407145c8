//! What is subtracted, the call alone; and what a number system takes of the flash: by the images of the published table, whose leg and servos are constants, as
//! in a firmware. It does not depend on the leg's measures.

use std::collections::BTreeMap;

use contenders::{Contender, Visit};
use emulation::{Setting, Trouble};
use reckoning::Window;

use crate::{arguments::Arguments, job::Hip};

/// The image with nothing in it, and the ending of those that go all the way from foot to ticks.
const NOTHING: &str = "nothing-roll";
const TO_TICKS: &str = "-ticks";

/// What is subtracted, and the flash.
pub struct Sizes {
    /// Bytes by number system and hip.
    flash: BTreeMap<String, i64>,
    /// The call alone.
    pub call: Call,
}

/// What the call alone takes, with its return.
#[derive(Debug, Clone, Copy)]
pub struct Call {
    pub instructions: u64,
    pub cycles: [u64; 2],
}

impl Sizes {
    pub fn of(arguments: &Arguments, setting: Setting<'_>, numbers: &[String]) -> Result<Self, Trouble> {
        struct Names(Vec<&'static str>);
        impl Visit for Names {
            fn visit<C: Contender>(&mut self) {
                self.0.push(C::NAME);
            }
        }
        let mut names = Names(Vec::new());
        contenders::visit_all(&mut names);
        let is_asked = |name: &str| numbers.iter().any(|number| name.starts_with(&format!("{number}-")));
        names.0.retain(|name| *name == NOTHING || is_asked(name) && name.ends_with(TO_TICKS));
        let images = emulation::images(arguments.way, setting.chip, "image", &names.0)?;
        let image = |name: &str| images.get(name).ok_or_else(|| Trouble::NotNamed(name.into()));
        let nothing = emulation::flash_bytes(image(NOTHING)?)? as i64;
        let mut flash = BTreeMap::new();
        for name in names.0 {
            flash.insert(name.to_owned(), emulation::flash_bytes(image(name)?)? as i64 - nothing);
        }
        let windows = emulation::run(NOTHING, image(NOTHING)?, setting)?.windows;
        let least = |of: fn(&Window) -> u64| windows.iter().map(of).min().unwrap_or(0);
        let call = Call {
            instructions: least(|window| window.instructions),
            cycles: [least(|window| window.cycles[0]), least(|window| window.cycles[1])],
        };
        Ok(Self { flash, call })
    }

    pub fn of_leg(&self, hip: Hip, number: &str) -> Option<i64> {
        let hip = match hip {
            Hip::Roll => "roll",
            Hip::Yaw => "yaw",
        };
        self.flash.get(&format!("{number}-{hip}{TO_TICKS}")).copied()
    }
}

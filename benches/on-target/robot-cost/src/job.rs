//! What is to be measured.

use std::{fs, path::Path};

use robot::{LegWords, MOST_TARGETS, ServoWords};
use serde::Deserialize;

/// Legs, each to be measured in every number system on every chip.
#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Job {
    pub legs: Vec<Leg>,
    /// Names of number systems.
    pub numbers: Vec<String>,
}

/// A leg as its sheet has it.
#[derive(Debug, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Leg {
    /// For messages.
    pub name: String,
    pub hip: Hip,
    pub output: Output,
    pub measures_mm: [f64; 3],
    pub bends_back: bool,
    pub range_deg: [[f64; 2]; 3],
    pub at_mm: [f64; 3],
    pub right: bool,
    pub servos: [Servo; 3],
    pub clock_hz: u32,
    pub divider: u32,
    pub bits: u32,
    pub frame_hz: f64,
    /// In the leg's frame, mm: answers to them are compared with this PC's.
    pub compared: Vec<[f64; 3]>,
    /// The same: those for which instructions are counted.
    pub counted: Vec<[f64; 3]>,
    /// So many of them, from the first on, stand for the work volume.
    pub typical: usize,
}

#[derive(Debug, Clone, Copy, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum Hip {
    Roll,
    Yaw,
}

#[derive(Debug, Clone, Copy, Deserialize)]
#[serde(rename_all = "lowercase")]
pub enum Output {
    Timer,
    Expander,
}

#[derive(Debug, Clone, Copy, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Servo {
    pub centre_us: f64,
    pub joint_at_centre_deg: f64,
    pub us_per_degree: f64,
    pub trim_us: f64,
    pub against: bool,
    pub pulse_us: [f64; 2],
}

impl Job {
    pub fn read(path: &Path) -> Result<Self, String> {
        let complaint = |problem: String| format!("{}: {problem}", path.display());
        let text = fs::read_to_string(path).map_err(|error| complaint(error.to_string()))?;
        let job: Self = serde_json::from_str(&text).map_err(|error| complaint(error.to_string()))?;
        for leg in &job.legs {
            if leg.typical == 0 || leg.typical > leg.counted.len() {
                let (typical, counted) = (leg.typical, leg.counted.len());
                return Err(complaint(format!(
                    "{}: typical is {typical}; it must be 1 to {counted}",
                    leg.name
                )));
            }
            for (what, targets) in [("compared", &leg.compared), ("counted", &leg.counted)] {
                if targets.is_empty() || targets.len() > MOST_TARGETS {
                    let count = targets.len();
                    return Err(complaint(format!(
                        "{}: {count} targets are {what}; it must be 1 to {MOST_TARGETS}",
                        leg.name
                    )));
                }
            }
        }
        Ok(job)
    }
}

impl Leg {
    pub fn words(&self) -> LegWords {
        LegWords {
            measures_mm: self.measures_mm,
            bends_back: self.bends_back,
            range_deg: self.range_deg,
            at_mm: self.at_mm,
            right: self.right,
            servos: self.servos.map(|servo| ServoWords {
                measures: [servo.centre_us, servo.joint_at_centre_deg, servo.us_per_degree, servo.trim_us],
                against: servo.against,
                pulse_us: servo.pulse_us,
            }),
            clock_hz: self.clock_hz,
            divider: self.divider,
            bits: self.bits,
            frame_hz: self.frame_hz,
        }
    }
}

//! What is to be measured.

use std::{fs, path::Path};

use robot::{LegWords, MOST_TARGETS, POINTS, ServoWords};
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
    /// Whether the knee's servo sits on the body.
    pub parallelogram: bool,
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

#[derive(Debug, Clone, Deserialize)]
#[serde(deny_unknown_fields)]
pub struct Servo {
    pub curve: Curve,
    pub trim_us: f64,
    pub pulse_us: [f64; 2],
}

#[derive(Debug, Clone, Deserialize)]
#[serde(rename_all = "kebab-case")]
pub enum Curve {
    Straight {
        centre_us: f64,
        joint_at_centre_deg: f64,
        us_per_degree: f64,
        against: bool,
    },
    /// Pulse, us, and joint's angle, degrees.
    Measured(Vec<[f64; 2]>),
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
            servos: self.servos.each_ref().map(Servo::words),
            expander: matches!(self.output, Output::Expander),
            clock_hz: self.clock_hz,
            divider: self.divider,
            bits: self.bits,
            frame_hz: self.frame_hz,
        }
    }

    /// The features of the images that drive it.
    pub fn features(&self) -> Vec<&'static str> {
        let bends = self.servos.iter().map(|servo| match &servo.curve {
            Curve::Straight { .. } => 0,
            Curve::Measured(points) => points.len().saturating_sub(2),
        });
        let mut features = match bends.max().unwrap_or(0) {
            0 => vec![],
            1..=2 => vec!["bends-2"],
            3..=6 => vec!["bends-6"],
            _ => vec!["bends-14"],
        };
        if self.parallelogram {
            features.push("parallelogram");
        }
        features
    }
}

impl Servo {
    fn words(&self) -> ServoWords {
        let mut words = ServoWords {
            straight: [0.0; 3],
            against: false,
            trim_us: self.trim_us,
            pulse_us: self.pulse_us,
            points: 0,
            measured: [[0.0; 2]; POINTS],
        };
        match &self.curve {
            Curve::Straight { centre_us, joint_at_centre_deg, us_per_degree, against } => {
                words.straight = [*centre_us, *joint_at_centre_deg, *us_per_degree];
                words.against = *against;
            }
            Curve::Measured(points) => {
                words.points = points.len().min(POINTS) as u32;
                for (word, point) in words.measured.iter_mut().zip(points) {
                    *word = *point;
                }
            }
        }
        words
    }
}

//! Pictures of a survey, as SVG for the page: computed here, drawn by plotters, coloured by the page's style sheet.
//!
//! | module | picture |
//! | --- | --- |
//! | [`side_view`] | the leg in its plane, to scale: reach, joint ranges, work volume, the worst place |
//! | [`error_map`] | the foot error over a slice of the work volume |
//! | [`spread`] | the share of the targets that stays within an error |
//! | [`pulses`] | the pulses that the work volume needs, against what each servo bears |
//!
//! What is drawn is worked out apart from the drawing: [`leg_plane`], [`slice`], [`used_pulses`].
//! [`canvas`], [`axis`] and [`palette`] serve them all.

mod axis;
mod canvas;
mod error_map;
mod leg_plane;
mod palette;
mod pulses;
mod side_view;
mod slice;
mod spread;
mod trimmed;
mod used_pulses;

pub use trimmed::trim_drawing;

pub(super) use palette::style as palette_style;
pub(super) use used_pulses::UsedPulse;

use crate::machine::{self, Machine};
use crate::survey::{Judge, KindFindings, NumberFindings, Survey};

/// A picture and the words that belong to it.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Picture {
    /// Short, for the heading.
    pub(super) title: String,
    /// What somebody who does not see it should know.
    pub(super) alternative: String,
    /// What everybody should know to read it.
    pub(super) caption: String,
    /// What its lines and areas mean.
    pub(super) key: Vec<KeyEntry>,
    /// Drawing units.
    pub(super) width: u32,
    /// Drawing units.
    pub(super) height: u32,
    /// The inside of the `svg` element.
    pub(super) body: String,
}

/// A line or area and what it means.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct KeyEntry {
    /// How it is shown.
    pub(super) mark: Mark,
    /// Its colour in a drawing.
    pub(super) colour: String,
    /// What it means.
    pub(super) means: String,
}

/// How an entry of the key is shown.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Mark {
    /// A thin line.
    Line,
    /// A thick line.
    Bar,
    /// A filled area.
    Area,
    /// A ring.
    Ring,
}

impl Mark {
    /// What the templates call it.
    pub(super) const fn word(self) -> &'static str {
        match self {
            Self::Line => "line",
            Self::Bar => "bar",
            Self::Area => "area",
            Self::Ring => "ring",
        }
    }
}

/// A kind of leg of a survey with what computes and judges it.
struct Subject<'a> {
    survey: &'a Survey,
    findings: &'a KindFindings,
    kind: usize,
    judge: Judge,
    machines: Vec<Box<dyn Machine>>,
}

impl<'a> Subject<'a> {
    fn of(survey: &'a Survey, kind: usize) -> Self {
        let made = "the survey was made with it";
        Self {
            survey,
            findings: &survey.kinds[kind],
            kind,
            judge: Judge::of(&survey.robot, kind).expect(made),
            machines: machine::in_every_number(&survey.robot, kind).expect(made),
        }
    }

    fn sheet(&self) -> &crate::sheet::LegKind {
        &self.survey.robot.kinds[self.kind]
    }

    /// What the firmware uses: findings, and the machine that they are of.
    fn of_firmware(&self) -> impl Iterator<Item = (&NumberFindings, &dyn Machine)> {
        self.findings
            .numbers
            .iter()
            .zip(&self.machines)
            .filter(|(number, _)| number.firmware)
            .map(|(number, machine)| (number, machine.as_ref()))
    }
}

/// The pictures of a kind of leg, and the pulses it uses, from which one of them is drawn.
pub(super) fn of_kind(survey: &Survey, kind: usize) -> (Vec<Picture>, Vec<UsedPulse>) {
    let subject = Subject::of(survey, kind);
    let used = used_pulses::of(&subject);
    let mut pictures = vec![side_view::picture(&subject)];
    for (number, machine) in subject.of_firmware() {
        pictures.push(error_map::picture(&subject, number, machine, error_map::Error::Together));
        pictures.push(error_map::picture(&subject, number, machine, error_map::Error::Arithmetic));
    }
    pictures.extend(spread::pictures(&subject));
    pictures.push(pulses::picture(&used));
    (pictures, used)
}

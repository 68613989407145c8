//! What the templates see of a survey: every figure written out, every sentence that hangs on one made.

use crate::chips::{Chips, KindOnChips, Row};
use crate::report::chips as costs;
use crate::report::number::{count, foot, millimetres, significant};
use crate::report::picture::{self, Picture, UsedPulse};
use crate::sheet::Allowed;
use crate::survey::{Errors, KindFindings, NumberFindings, Survey, Verdict, Worst};
use minijinja::{Value, context};

/// The whole page.
pub(super) fn of(survey: &Survey, chips: Option<&Chips>, repeat: &str) -> Value {
    let robot = &survey.robot;
    let answers = survey.kinds.iter().flat_map(|kind| {
        let numbers = kind.numbers.iter().filter(|number| number.firmware);
        numbers.map(move |number| answer(&robot.allowed, kind, number))
    });
    context! {
        robot => &robot.name,
        about => robot.about.as_deref(),
        within => is_within(survey.verdict),
        firmware => robot.firmware.numbers.iter().map(|number| number.name()).collect::<Vec<_>>(),
        output => &survey.output.summary,
        answers => answers.collect::<Vec<_>>(),
        kinds => (0..survey.kinds.len()).map(|index| kind(survey, index)).collect::<Vec<_>>(),
        chips => chips.map(on_chips),
        repeat,
        toehold => survey.toehold,
        targets => whole(survey.targets),
        seed => survey.seed,
        sheet => crate::report::json(robot),
    }
}

/// What the legs cost on the chips.
fn on_chips(chips: &Chips) -> Value {
    let kind = |kind: &KindOnChips| {
        let row = |row: &Row| context! { firmware => row.firmware, cells => costs::cells(row) };
        let reasons = costs::reasons(kind).into_iter();
        context! {
            name => &kind.kind,
            leg => &kind.leg,
            legs => kind.legs,
            rows => kind.rows.iter().map(row).collect::<Vec<_>>(),
            reasons => reasons.map(|(rows, why)| format!("{}: {why}", rows.join("; "))).collect::<Vec<_>>(),
        }
    };
    let [counted, flash, estimated, _] = costs::what_it_is_worth();
    let left_out = chips.left_out.iter().map(|left| format!("{}: {}", left.class, left.why));
    context! {
        kinds => chips.kinds.iter().map(kind).collect::<Vec<_>>(),
        frame_ms => significant(1e3 / chips.frame_hz),
        notes => [counted, flash, estimated],
        sources => costs::cycle_sources(chips),
        left_out => left_out.collect::<Vec<_>>(),
    }
}

/// What matters most of one kind of leg in one number system of the firmware.
fn answer(allowed: &Allowed, kind: &KindFindings, number: &NumberFindings) -> Value {
    let error = |what: &str, worst: Worst, allowed_mm: f64, verdict: Verdict| {
        context! {
            what,
            found => millimetres(worst.mm),
            unit => "mm",
            allowed => millimetres(allowed_mm),
            within => is_within(verdict),
            at => foot(worst.foot_mm),
        }
    };
    let together = error(
        "largest foot error with the pulse",
        number.together.largest,
        allowed.with_pulse_mm,
        number.together_verdict,
    );
    let arithmetic = error(
        "largest foot error from arithmetic alone",
        number.arithmetic.largest,
        allowed.arithmetic_mm,
        number.arithmetic_verdict,
    );
    let unreached = context! {
        what => "of the work volume not reached as asked",
        found => format!("{:.2}", number.outcomes.unreached_percent),
        unit => "%",
        allowed => allowed.unreached_percent.to_string(),
        within => is_within(number.unreached_verdict),
        at => (),
    };
    context! { kind => &kind.kind, number => number.number, measures => vec![together, arithmetic, unreached] }
}

/// A kind of leg.
fn kind(survey: &Survey, index: usize) -> Value {
    let kind = &survey.kinds[index];
    let (pictures, used) = picture::of_kind(survey, index);
    let allowed = &survey.robot.allowed;
    context! {
        name => &kind.kind,
        shape => kind.shape,
        legs => kind.legs.join(", "),
        targets => whole(survey.targets),
        edges => whole(kind.targets.edges),
        grid => whole(kind.targets.grid),
        random => whole(kind.targets.random),
        references => context! {
            targets => kind.references.targets,
            angle_rad => significant(kind.references.largest_angle_rad),
            foot_mm => significant(kind.references.largest_foot_mm),
        },
        numbers => kind.numbers.iter().map(|number| in_number(allowed, number)).collect::<Vec<_>>(),
        pictures => pictures.into_iter().map(drawn).collect::<Vec<_>>(),
        pulses => used.iter().map(pulse).collect::<Vec<_>>(),
    }
}

/// A number system's rows in the tables.
fn in_number(allowed: &Allowed, number: &NumberFindings) -> Value {
    let outcomes = &number.outcomes;
    let sorts =
        [("arithmetic", &number.arithmetic), ("pulse", &number.pulse), ("together", &number.together)];
    let beyond = [
        ("arithmetic", number.arithmetic_verdict),
        ("with the pulse", number.together_verdict),
        ("unreached", number.unreached_verdict),
    ]
    .into_iter()
    .filter(|(_, verdict)| !is_within(*verdict));
    let counts = [outcomes.reached, outcomes.moved, outcomes.held, outcomes.pulse_held, outcomes.not_finite];
    context! {
        name => number.number,
        firmware => number.firmware,
        errors => sorts.map(|(_, errors)| figures(errors)).to_vec(),
        joint => number.joint.map_or_else(|| "–".into(), |joint| significant(joint.deg)),
        beyond => beyond.map(|(what, _)| what).collect::<Vec<_>>(),
        places => places(&sorts, number),
        outcomes => counts.map(whole).to_vec(),
        unreached => format!("{:.2}", outcomes.unreached_percent),
        unreached_allowed => allowed.unreached_percent.to_string(),
        unreached_within => is_within(number.unreached_verdict),
        clamping => millimetres(outcomes.clamping.mm),
        clamping_at => if outcomes.clamping.mm > 0.0 { foot(outcomes.clamping.foot_mm) } else { "–".into() },
    }
}

/// Largest, 99th percentile, mean.
fn figures(errors: &Errors) -> Vec<String> {
    [errors.largest.mm, errors.p99_mm, errors.mean_mm].map(millimetres).to_vec()
}

/// Where the largest errors sit: what, how much, where.
fn places(sorts: &[(&str, &Errors)], number: &NumberFindings) -> Vec<Vec<String>> {
    let mut places: Vec<_> = sorts
        .iter()
        .map(|(what, errors)| {
            let largest = errors.largest;
            vec![(*what).to_owned(), format!("{} mm", millimetres(largest.mm)), foot(largest.foot_mm)]
        })
        .collect();
    places.extend(number.joint.map(|joint| {
        let what = format!("joint angle: {}", joint.joint);
        vec![what, format!("{} deg", significant(joint.deg)), foot(joint.foot_mm)]
    }));
    places
}

fn drawn(picture: Picture) -> Value {
    let key = picture
        .key
        .into_iter()
        .map(|entry| context! { mark => entry.mark.word(), colour => entry.colour, means => entry.means });
    context! {
        title => picture.title,
        alternative => picture.alternative,
        caption => picture.caption,
        key => key.collect::<Vec<_>>(),
        width => picture.width,
        height => picture.height,
        // Drawn by us; plotters has escaped what text there is.
        body => Value::from_safe_string(picture.body),
    }
}

/// A servo's row.
fn pulse(pulse: &UsedPulse) -> Value {
    let whole = |pulses: [f64; 2]| pulses.map(|us| format!("{us:.0}")).to_vec();
    let left = (pulse.used_us[0] - pulse.safe_us[0]).min(pulse.safe_us[1] - pulse.used_us[1]);
    context! {
        joint => pulse.joint,
        used => whole(pulse.used_us),
        safe => whole(pulse.safe_us),
        // What is left to the nearer end.
        left => format!("{:.0}", left.max(0.0)),
        held => pulse.held,
    }
}

fn is_within(verdict: Verdict) -> bool {
    verdict == Verdict::Within
}

/// A whole number whose groups of digits no line break parts.
fn whole(number: u64) -> String {
    count(number).replace(' ', "\u{202f}")
}

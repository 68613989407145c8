//! The leg in its plane, to scale.

use super::axis::Axis;
use super::canvas::{
    self, Chart, Drawn, PLOT_WIDTH, chart, draw, height_around, line, text_from, worst_mark,
};
use super::leg_plane::{LegPlane, Place, circle};
use super::palette::{self, hex};
use super::{KeyEntry, Mark, Picture, Subject};
use crate::report::number::{foot, millimetres};
use crate::sheet::HipShape;
use plotters::prelude::*;
use plotters::style::text_anchor::HPos;

/// The plot's height for its width lies between these.
const LEAST_RATIO: f64 = 0.6;
const MOST_RATIO: f64 = 1.15;

pub(super) fn picture(subject: &Subject<'_>) -> Picture {
    let sheet = subject.sheet();
    let plane = LegPlane::of(sheet);
    let worst = subject
        .of_firmware()
        .map(|(number, _)| (number.together.largest, number.number))
        .reduce(|worst, other| if other.0.mm > worst.0.mm { other } else { worst })
        .expect("a firmware uses at least one number system");
    let pose = subject.judge.judge(worst.0.foot_mm).pose;
    let joints = plane.joints(pose.thigh, pose.knee);
    let (reach, work) = (plane.reach(), plane.work(sheet));
    let [x, y] = view(reach.iter().chain(&work).chain(&joints).copied().chain([(0.0, 0.0)]));
    let ratio = (y[1] - y[0]) / (x[1] - x[0]);
    let height = height_around((ratio * f64::from(PLOT_WIDTH)).round() as u32);
    let (right, up, axis_name) = match sheet.hip {
        HipShape::Roll => ("forward, mm", "up in the plane, mm", "roll axis"),
        HipShape::Yaw => ("outboard from the yaw axis, mm", "up, mm", "yaw axis"),
    };
    let [_, thigh_name, _] = sheet.joint_names();
    let drawing = draw(height, |area| {
        let mut chart = chart(area, &Axis::linear(x, 6, right), &Axis::linear(y, 6, up))?;
        let fill = |chart: &Chart<'_, '_>, outline: Vec<Place>, colour: RGBColor| {
            chart.plotting_area().draw(&Polygon::new(outline, colour.filled()))
        };
        fill(&chart, reach.clone(), palette::REACH)?;
        let hub = plane.thigh_joint();
        for (limits, colour) in
            [(plane.links_reach(), palette::LINKS_REACH), (plane.knee_reach(), palette::KNEE_REACH)]
        {
            for radius in limits {
                stroke_within(&mut chart, circle(hub, radius), [x, y], line(colour, 2))?;
            }
        }
        let axis = match sheet.hip {
            HipShape::Roll => [(x[0], 0.0), (x[1], 0.0)],
            HipShape::Yaw => [(0.0, y[0]), (0.0, y[1])],
        };
        stroke_within(&mut chart, axis.into_iter(), [x, y], line(palette::HIP_AXIS, 1))?;
        fill(&chart, plane.thigh_range(), palette::JOINT_RANGE)?;
        fill(&chart, plane.knee_range(pose.thigh), palette::JOINT_RANGE)?;
        let outline = work.iter().chain(work.first()).copied();
        stroke_within(&mut chart, outline, [x, y], line(palette::WORK, 2))?;
        let start = (sheet.hip == HipShape::Yaw).then_some((0.0, 0.0));
        let links: Vec<_> = start.into_iter().chain(joints).collect();
        stroke_within(&mut chart, links.iter().copied(), [x, y], line(palette::LEG, 4))?;
        for joint in &links[..links.len() - 1] {
            let plot = chart.plotting_area();
            plot.draw(&Circle::new(*joint, canvas::units(5), palette::LEG.filled()))?;
            plot.draw(&Circle::new(*joint, canvas::units(2), palette::PAPER.filled()))?;
        }
        worst_mark(&mut chart, plane.turned_into(worst.0.foot_mm))?;
        label(&chart, x, joints[0], thigh_name)?;
        label(&chart, x, joints[1], "knee")?;
        label(&chart, x, joints[2], "foot")
    });
    let entry = |mark, colour, means: &str| KeyEntry { mark, colour: hex(colour), means: means.into() };
    let ([inner, outer], [near, far]) = (plane.links_reach(), plane.knee_reach());
    Picture {
        title: "The leg in its plane, to scale".into(),
        alternative: format!(
            "Side view of the leg in its plane: the links reach from {} to {} mm from the {thigh_name} joint, the \
             knee’s range lets them reach from {} to {} mm; the work volume spans {:.0} to {:.0} mm {right_of} and \
             {:.0} to {:.0} mm up; the leg is drawn where the foot error is largest.",
            millimetres(inner),
            millimetres(outer),
            millimetres(near),
            millimetres(far),
            work[0].0,
            work[2].0,
            work[0].1.min(work[2].1),
            work[0].1.max(work[2].1),
            right_of = right.trim_end_matches(", mm"),
        ),
        caption: format!(
            "Drawn at the largest error of {}, {} mm at foot {} mm. The work volume is turned about the {axis_name} \
             into this plane.",
            worst.1,
            millimetres(worst.0.mm),
            foot(worst.0.foot_mm)
        ),
        key: vec![
            entry(Mark::Bar, palette::LEG, "the leg where the foot error is largest"),
            entry(Mark::Ring, palette::WORST, "that place"),
            entry(Mark::Line, palette::WORK, "work volume"),
            entry(
                Mark::Area,
                palette::REACH,
                &format!("where the {thigh_name} and knee ranges let the foot go"),
            ),
            entry(Mark::Area, palette::JOINT_RANGE, &format!("ranges of {thigh_name} and knee")),
            entry(
                Mark::Line,
                palette::LINKS_REACH,
                &format!("reach of the links: {} to {} mm", millimetres(inner), millimetres(outer)),
            ),
            entry(
                Mark::Line,
                palette::KNEE_REACH,
                &format!("reach within the knee’s range: {} to {} mm", millimetres(near), millimetres(far)),
            ),
            entry(Mark::Line, palette::HIP_AXIS, axis_name),
        ],
        width: drawing.width,
        height: drawing.height,
        body: drawing.body,
    }
}

/// What is in view, with a margin around it, the same scale both ways.
fn view(places: impl Iterator<Item = Place>) -> [[f64; 2]; 2] {
    let mut bounds = [[f64::INFINITY, f64::NEG_INFINITY]; 2];
    for (right, up) in places {
        for (bound, at) in bounds.iter_mut().zip([right, up]) {
            *bound = [bound[0].min(at), bound[1].max(at)];
        }
    }
    let [width, height] = bounds.map(|[least, most]| most - least);
    let margin = 0.06 * width.max(height);
    let widen = |[least, most]: [f64; 2], to: f64| {
        let more = ((to - (most - least)) / 2.0).max(0.0);
        [least - more, most + more]
    };
    let [x, y] = bounds.map(|[least, most]| [least - margin, most + margin]);
    let (across, tall) = (x[1] - x[0], y[1] - y[0]);
    [widen(x, tall / MOST_RATIO), widen(y, across * LEAST_RATIO)]
}

/// A line, as far as it is in view.
fn stroke_within(
    chart: &mut Chart<'_, '_>,
    places: impl Iterator<Item = Place>,
    [x, y]: [[f64; 2]; 2],
    style: ShapeStyle,
) -> Drawn {
    let inside = |(right, up): &Place| x[0] <= *right && *right <= x[1] && y[0] <= *up && *up <= y[1];
    let places: Vec<_> = places.collect();
    for run in places.split(|place| !inside(place)).filter(|run| run.len() > 1) {
        chart.plotting_area().draw(&PathElement::new(run.to_vec(), style))?;
    }
    Ok(())
}

/// A name beside a joint, on the side where there is room.
fn label(chart: &Chart<'_, '_>, x: [f64; 2], at: Place, name: &str) -> Drawn {
    let aside = (x[1] - x[0]) * 0.03;
    let (end, aside) =
        if at.0 > x[0] + 0.8 * (x[1] - x[0]) { (HPos::Right, -aside) } else { (HPos::Left, aside) };
    let style = text_from(palette::LABEL, end);
    chart.plotting_area().draw(&Text::new(name.to_owned(), (at.0 + aside, at.1 + aside.abs()), style))
}

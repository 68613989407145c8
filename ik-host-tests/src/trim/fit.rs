//! What readings say of a servo.

use super::readings::{Approach, Reading};
use super::regression::{Regression, Term, regress};
use serde::Serialize;
use statrs::distribution::{ContinuousCDF, FisherSnedecor, StudentsT};
use std::fmt;

/// What is asked of a fit.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Wanted {
    /// The pulse at which the joint's angle is given, µs.
    pub centre_us: f64,
    /// Whether every row counts, misread or not.
    pub keep_all: bool,
}

/// What the readings say.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Fit {
    /// The pulse of the centre, µs.
    pub centre_us: f64,
    /// The joint's angle there, degrees, and its standard error.
    pub joint_at_centre_deg: [f64; 2],
    /// Pulse for a degree, µs, always positive, and its standard error.
    pub us_per_degree: [f64; 2],
    /// Whether a longer pulse makes the angle larger.
    pub turns_with: bool,
    /// The standard deviation of what the line leaves, degrees.
    pub line_deviation_deg: f64,
    /// The same of the curve.
    pub curve_deviation_deg: f64,
    /// The farthest that the curve is from the line at a reading, degrees.
    pub bend_deg: f64,
    /// How likely so much of a bend is if the servo were straight.
    pub bend_by_chance: f64,
    /// Whether measured points are worth it: the bend is no chance, and larger than the readings are uncertain.
    pub points_are_worth_it: bool,
    /// Pulse and angle of every pulse that was read, the mean of both approaches, without rows that were left out.
    pub points: Vec<[f64; 2]>,
    /// The gap between the two approaches, if readings tell them apart.
    pub backlash: Option<Backlash>,
    /// The rows, in the order of the file.
    pub rows: Vec<Row>,
}

/// What a joint moves by when the servo comes from the other side.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Backlash {
    /// The whole gap, degrees, along the servo's own way: angles read on the way down less those on the way up.
    pub gap_deg: f64,
    /// Its standard error.
    pub error_deg: f64,
    /// Whether it is more than chance.
    pub is_real: bool,
}

/// A reading, and what the fit makes of it.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Row {
    /// Its line in the file.
    pub line: u64,
    /// The pulse, µs.
    pub pulse_us: f64,
    /// The angle, degrees.
    pub angle_deg: f64,
    /// The reading less the line, degrees.
    pub off_line_deg: f64,
    /// The reading less the curve that the other readings make, degrees.
    pub off_curve_deg: f64,
    /// Whether it looks misread: so far off the curve of the others that fewer than one in a hundred files would have such
    /// a row by chance.
    pub misread: bool,
    /// Whether it was left out.
    pub left_out: bool,
}

/// Why readings make no servo.
#[derive(Debug, Clone, PartialEq)]
pub enum FitError {
    /// Too few rows at too few pulses for what is asked.
    TooFew,
    /// No gain can be told: the angle does not change with the pulse beyond what scatter explains.
    NoGain,
    /// Angles do not all rise or all fall with the pulse: (pulse, angle) where they turn back.
    TurnsBack([f64; 2]),
}

impl fmt::Display for FitError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::TooFew => f.write_str(
                "too few readings that differ: take at least 4 at 3 or more pulses, a dozen over the whole range is better",
            ),
            Self::NoGain => f.write_str(
                "the angle does not change with the pulse beyond what scatter explains: is this the right column, and did \
                 the servo move?",
            ),
            Self::TurnsBack([us, degrees]) => write!(
                f,
                "the angle turns back at {us} us, {degrees:.2} degrees: a servo turns one way as its pulse grows; read it \
                 again there"
            ),
        }
    }
}

impl std::error::Error for FitError {}

/// How unlikely is no chance.
const BY_CHANCE: f64 = 0.01;
/// The curve is a cubic: a horn and its linkage bend a servo once or twice.
const CURVE_POWERS: usize = 3;

/// Fits readings.
///
/// # Errors
/// If they make no servo.
pub fn fit(readings: &[Reading], wanted: Wanted) -> Result<Fit, FitError> {
    let all: Vec<usize> = (0..readings.len()).collect();
    let misread = misread_rows(readings);
    let is_left_out = |row: &usize| !wanted.keep_all && misread.contains(row);
    let kept: Vec<usize> = all.iter().copied().filter(|row| !is_left_out(row)).collect();
    let line = of_power(readings, &kept, 1, wanted.centre_us).ok_or(FitError::TooFew)?;
    let (at_centre, slope) = (line.terms[0], line.terms[1]);
    let is_a_gain = slope.value != 0.0 && slope.value.abs() > 4.0 * slope.error;
    if !is_a_gain {
        return Err(FitError::NoGain);
    }
    let powers = curve_powers(readings, &kept);
    let curve = of_power(readings, &kept, powers, wanted.centre_us).unwrap_or_else(|| line.clone());
    let backlash = backlash(readings, &kept, powers, wanted.centre_us, slope.value > 0.0);
    let points = points(readings, &kept, backlash.filter(|backlash| backlash.is_real), slope.value > 0.0);
    turns_one_way(&points)?;
    let on = |regression: &Regression, us: f64| value_at(regression, us - wanted.centre_us);
    let bend_deg = points.iter().map(|[us, _]| (on(&curve, *us) - on(&line, *us)).abs()).fold(0.0, f64::max);
    let bend_by_chance = by_chance(&line, &curve);
    let typical = kept.iter().map(|row| readings[*row].uncertainty_deg).sum::<f64>() / kept.len() as f64;
    let rows = all
        .iter()
        .map(|row| {
            let reading = &readings[*row];
            let others: Vec<usize> = kept.iter().copied().filter(|other| other != row).collect();
            let of_others = of_power(readings, &others, curve_powers(readings, &others), wanted.centre_us);
            let predicted = of_others.as_ref().map_or(f64::NAN, |curve| on(curve, reading.pulse_us));
            Row {
                line: reading.line,
                pulse_us: reading.pulse_us,
                angle_deg: reading.angle_deg,
                off_line_deg: reading.angle_deg - on(&line, reading.pulse_us),
                off_curve_deg: reading.angle_deg - predicted,
                misread: misread.contains(row),
                left_out: is_left_out(row),
            }
        })
        .collect();
    Ok(Fit {
        centre_us: wanted.centre_us,
        joint_at_centre_deg: [at_centre.value, at_centre.error],
        us_per_degree: [1.0 / slope.value.abs(), slope.error / (slope.value * slope.value)],
        turns_with: slope.value > 0.0,
        line_deviation_deg: unweighted_deviation(&line),
        curve_deviation_deg: unweighted_deviation(&curve),
        bend_deg,
        bend_by_chance,
        points_are_worth_it: bend_by_chance < BY_CHANCE && bend_deg > typical,
        points,
        backlash,
        rows,
    })
}

/// The columns of a polynomial in the distance from the centre, in ms, which keeps them of one size.
fn columns(pulse_us: f64, centre_us: f64, powers: usize) -> Vec<f64> {
    let away = (pulse_us - centre_us) / 1000.0;
    (0..=powers).map(|power| away.powi(power as i32)).collect()
}

/// A polynomial of the given power through these rows; its second term in degrees per µs.
fn of_power(readings: &[Reading], rows: &[usize], powers: usize, centre_us: f64) -> Option<Regression> {
    let design: Vec<_> = rows.iter().map(|row| columns(readings[*row].pulse_us, centre_us, powers)).collect();
    let values: Vec<_> = rows.iter().map(|row| readings[*row].angle_deg).collect();
    let uncertainties: Vec<_> = rows.iter().map(|row| readings[*row].uncertainty_deg).collect();
    let mut fitted = regress(&design, &values, &uncertainties)?;
    for (power, term) in fitted.terms.iter_mut().enumerate() {
        let unit = 1000f64.powi(power as i32);
        *term = Term { value: term.value / unit, error: term.error / unit };
    }
    Some(fitted)
}

fn value_at(regression: &Regression, away_us: f64) -> f64 {
    regression.terms.iter().rev().fold(0.0, |sum, term| sum * away_us + term.value)
}

/// As high a power as the rows leave two degrees of freedom for, up to the curve's.
fn curve_powers(readings: &[Reading], rows: &[usize]) -> usize {
    let mut pulses: Vec<f64> = rows.iter().map(|row| readings[*row].pulse_us).collect();
    pulses.sort_by(f64::total_cmp);
    pulses.dedup();
    CURVE_POWERS.min(pulses.len().saturating_sub(2)).min(rows.len().saturating_sub(3)).max(1)
}

fn unweighted_deviation(regression: &Regression) -> f64 {
    let squares: f64 = regression.residuals.iter().map(|residual| residual * residual).sum();
    (squares / regression.freedom as f64).sqrt()
}

/// Rows that look misread: one after the other, the one farthest off the curve of the rest in units of its own scatter
/// (the externally studentised residual), as long as fewer than one file in a hundred would have such a row by chance
/// (Bonferroni's correction for having looked at every row), and no more than a quarter of all.
fn misread_rows(readings: &[Reading]) -> Vec<usize> {
    let mut left_out = Vec::new();
    while left_out.len() < readings.len() / 4 {
        let kept: Vec<usize> = (0..readings.len()).filter(|row| !left_out.contains(row)).collect();
        let powers = curve_powers(readings, &kept);
        let Some(curve) = of_power(readings, &kept, powers, 1500.0) else { break };
        let freedom = curve.freedom as f64 - 1.0;
        if freedom < 2.0 {
            break;
        }
        let studentised = |place: usize| {
            let weighted = curve.residuals[place] / readings[kept[place]].uncertainty_deg;
            let free = (1.0 - curve.leverages[place]).max(1e-9);
            let of_rest = ((curve.sum_of_squares - weighted * weighted / free) / freedom).max(1e-18);
            (weighted / (of_rest * free).sqrt()).abs()
        };
        let (place, largest) = (0..kept.len())
            .map(|place| (place, studentised(place)))
            .max_by(|a, b| a.1.total_cmp(&b.1))
            .unwrap_or((0, 0.0));
        let limit = StudentsT::new(0.0, 1.0, freedom)
            .map_or(f64::INFINITY, |t| t.inverse_cdf(1.0 - BY_CHANCE / (2.0 * kept.len() as f64)));
        // What lies within the readings' own uncertainty is no misreading, however well the rest lies.
        let certain = 4.0 * readings[kept[place]].uncertainty_deg;
        let alone = curve.residuals[place] / (1.0 - curve.leverages[place]).max(1e-9);
        if largest <= limit || alone.abs() <= certain {
            break;
        }
        left_out.push(kept[place]);
    }
    left_out
}

/// How likely the curve takes so much more off than the line by chance (the F test of nested regressions).
fn by_chance(line: &Regression, curve: &Regression) -> f64 {
    let (more, freedom) = (line.freedom as f64 - curve.freedom as f64, curve.freedom as f64);
    if more < 1.0 {
        return 1.0;
    }
    let gained = (line.sum_of_squares - curve.sum_of_squares).max(0.0) / more;
    let left = curve.sum_of_squares / freedom;
    if left <= 0.0 {
        return if gained > 0.0 { 0.0 } else { 1.0 };
    }
    FisherSnedecor::new(more, freedom).map_or(1.0, |f| f.sf(gained / left))
}

/// The gap between approaches, as one more column: ½ for up, −½ for down.
fn backlash(
    readings: &[Reading],
    rows: &[usize],
    powers: usize,
    centre_us: f64,
    turns_with: bool,
) -> Option<Backlash> {
    let sided: Vec<usize> = rows.iter().copied().filter(|row| readings[*row].approach.is_some()).collect();
    let up = sided.iter().filter(|row| readings[**row].approach == Some(Approach::Up)).count();
    if up < 2 || sided.len() - up < 2 {
        return None;
    }
    let design: Vec<_> = sided
        .iter()
        .map(|row| {
            let mut columns = columns(readings[*row].pulse_us, centre_us, powers);
            columns.push(if readings[*row].approach == Some(Approach::Up) { 0.5 } else { -0.5 });
            columns
        })
        .collect();
    let values: Vec<_> = sided.iter().map(|row| readings[*row].angle_deg).collect();
    let uncertainties: Vec<_> = sided.iter().map(|row| readings[*row].uncertainty_deg).collect();
    let fitted = regress(&design, &values, &uncertainties)?;
    let gap = fitted.terms.last()?;
    let t = StudentsT::new(0.0, 1.0, fitted.freedom as f64).ok()?;
    let by_chance = 2.0 * t.sf((gap.value / gap.error.max(1e-300)).abs());
    // Coming up a joint lags behind: below where it would be, along the servo's way.
    let gap_deg = if turns_with { -gap.value } else { gap.value };
    Some(Backlash { gap_deg, error_deg: gap.error, is_real: by_chance < BY_CHANCE })
}

/// Every pulse once, with the weighted mean of its angles; each is first moved by half of the gap, if there is one, to the
/// middle between the approaches, for at some pulses there may be readings of one side alone.
fn points(readings: &[Reading], rows: &[usize], gap: Option<Backlash>, turns_with: bool) -> Vec<[f64; 2]> {
    let lag = gap.map_or(0.0, |gap| if turns_with { gap.gap_deg / 2.0 } else { -gap.gap_deg / 2.0 });
    let in_the_middle = |reading: &Reading| match reading.approach {
        Some(Approach::Up) => reading.angle_deg + lag,
        Some(Approach::Down) => reading.angle_deg - lag,
        None => reading.angle_deg,
    };
    let mut pulses: Vec<f64> = rows.iter().map(|row| readings[*row].pulse_us).collect();
    pulses.sort_by(f64::total_cmp);
    pulses.dedup();
    pulses
        .into_iter()
        .map(|us| {
            let here = rows.iter().map(|row| &readings[*row]).filter(|reading| reading.pulse_us == us);
            let (sum, weights) = here.fold((0.0, 0.0), |(sum, weights), reading| {
                let weight = 1.0 / (reading.uncertainty_deg * reading.uncertainty_deg);
                (sum + weight * in_the_middle(reading), weights + weight)
            });
            [us, sum / weights]
        })
        .collect()
}

fn turns_one_way(points: &[[f64; 2]]) -> Result<(), FitError> {
    let falls = matches!(points, [[_, first], .., [_, last]] if last < first);
    match points.windows(2).find(|pair| (pair[1][1] <= pair[0][1]) != falls || pair[1][1] == pair[0][1]) {
        Some(pair) => Err(FitError::TurnsBack(pair[1])),
        None => Ok(()),
    }
}

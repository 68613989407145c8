//! The number system that carries bounds: what ik-core's solver, unchanged, is run with over a box of targets.
//!
//! Each primitive takes enclosures and errors of its operands and gives those of its result: the exact function over the
//! enclosures; what the operands' errors make of it; and what its table says that the primitive adds.

use super::carried::Table;
use super::decisions::{Misjudged, decide, note};
use super::interval::Interval;
use super::quantities::{Angle, Coord, Length, Product, Ratio, Sort, Square};
use crate::promises::Turning;
use ik_core::Number;
use ik_core::number::{Knee, Placed};
use std::f64::consts::{FRAC_PI_2, FRAC_PI_4, PI, TAU};
use std::marker::PhantomData;

/// Bounds by the table `T`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Bounded<T>(PhantomData<T>);

/// The smallest step of a leg, mm.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Scale {
    unit_mm: f64,
}

/// An unknown length, for what the certificate does not look at.
const ANY_LENGTH: Length = Length(Interval { low: 0.0, high: f64::MAX });

/// What a root is off by if its radicand is: the root lies in `root`, the radicand is off by `error`.
pub(super) fn root_error(error: f64, root: Interval) -> f64 {
    let sum = root.low + (root.low * root.low - error).max(0.0).sqrt();
    let by_quotient = if sum > 0.0 { error / sum } else { f64::INFINITY };
    error.sqrt().min(by_quotient)
}

/// The largest angle between two vectors that differ by a share of the length of the one.
fn angle_of(share: f64) -> f64 {
    if share < 1.0 { share.asin() } else { PI }
}

fn norm([a, b]: [f64; 2]) -> f64 {
    a.hypot(b)
}

/// The angle by which `from` is turned to come to `to`.
fn turned<T: Table>(from: [Product<T>; 2], to: [Coord<T>; 2], bounds: &Turning) -> Angle<T> {
    let exact_from = from.map(|v| v.exact);
    let exact_to = to.map(|v| v.exact);
    let length = |[a, b]: [Interval; 2]| (a.square() + b.square()).root();
    let (long_from, long_to) = (length(exact_from), length(exact_to));
    // The two are as long as one another.
    let longest = long_from.high.min(long_to.high);
    let shortest = long_from.low.max(long_to.low).min(longest);
    let gap = from[0].gap.max(from[1].gap);
    let (from_square, to_square) = (gap + from[0].square + from[1].square, to[0].square + to[1].square);
    let both = from_square + to_square;
    let least = |off: f64| (shortest * shortest - off).max(0.0).sqrt();
    let sum = least(from_square) + least(to_square);
    // How far apart rounding left the two lengths.
    let apart = both.sqrt().min(if sum > 0.0 { both / sum } else { f64::INFINITY });
    // What is wrong with `from` along and across itself.
    let facing = Interval::direction(exact_from);
    let (cosine, sine) = (facing.cosine().size(), facing.sine().size());
    let own = norm(from.map(|v| v.own));
    let own_along = (from[0].own * cosine + from[1].own * sine).min(own);
    let own_across = (from[0].own * sine + from[1].own * cosine).min(own);
    let displaced = norm(to.map(|v| v.displaced));
    let unit = to[0].unit.max(to[1].unit).max(from[0].unit).max(from[1].unit);
    // ±½ turn may be one angle less.
    let difference = Interval::direction(exact_to) - Interval::direction(exact_from);
    let turns = (difference.middle() / TAU).round() * TAU;
    let exact = Interval::new(difference.low - turns, difference.high - turns).widened(1e-15);
    let behind = exact.size() > PI - 1e-3;
    let most = longest + apart + own;
    // The difference in length counts by the tangent of half of the angle, or of the direction between the two from the
    // nearer axis; of either it is 1 at the most.
    let is_acute = exact.size() < PI / 2.0 - 1e-3;
    let tangent = if !is_acute {
        1.0
    } else if shortest >= bounds.by_products_from * unit {
        (exact.size() / 2.0).tan()
    } else if bounds.by_products_from == f64::INFINITY {
        let between = facing + exact * Interval::point(0.5);
        let axis = (between.middle() / FRAC_PI_2).round() * FRAC_PI_2;
        Interval::new(between.low - axis, between.high - axis).widened(1e-15).size().min(FRAC_PI_4).tan()
    } else {
        1.0
    };
    let products = (bounds.units2[0] + bounds.units2[1] * tangent) * unit * unit;
    let products = if products > 0.0 { (products / shortest).min(bounds.most_rad * most) } else { 0.0 };
    let kernel = (if is_acute { bounds.rad } else { bounds.obtuse_rad }
        + if behind { T::BOUNDS.angle.rad } else { 0.0 })
        * most
        + bounds.units * unit
        + products;
    let kernel = kernel.min(2.0 * most);
    let across = own_across + (apart + own_along) * tangent + kernel;
    let bent = (across + own).min((across + own) * (across + own) / shortest);
    let along = (apart + bent).min(2.0 * most);
    let across = across.min(2.0 * most);
    let share = |off: [f64; 2], facing: Interval| {
        let (cosine, sine) = (facing.cosine().size(), facing.sine().size());
        // To first order what is off along a vector does not turn it, to the second by no more than its square.
        let (all, across) = (norm(off) / shortest, (off[0] * sine + off[1] * cosine) / shortest);
        angle_of(all.min(across + all * all))
    };
    let to_off = if to[0].alike == to[1].alike { to.map(|v| v.alone) } else { to.map(|v| v.error) };
    let error = share(from.map(|v| v.full), facing)
        + share(to_off, Interval::direction(exact_to))
        + angle_of((apart + own_along) * tangent / shortest)
        + angle_of(kernel / shortest);
    // Around the circle where the two halves meet, a small error may be a whole turn in number.
    let (exact, error) = if exact.size() + error >= PI { (Interval::CIRCLE, TAU) } else { (exact, error) };
    Angle { exact, error, along, across, displaced, sort: Sort::Turn, ..Angle::constant(0.0, 0.0) }
}

/// A coordinate as a product that nothing is lost of.
fn plain<T>(coord: Coord<T>) -> Product<T> {
    Product {
        exact: coord.exact,
        own: coord.displaced,
        full: coord.error,
        gap: 0.0,
        square: coord.square,
        unit: coord.unit,
        of: PhantomData,
    }
}

impl<T: Table> Bounded<T> {
    fn root_within(square: Square<T>, rounding: f64, unit: f64) -> Coord<T> {
        let exact = square.exact.root();
        let error = root_error(square.error, exact) + rounding;
        let computed = exact.high + root_error(square.error, exact);
        Coord {
            square: square.error + rounding * (2.0 * computed + rounding),
            ..Coord::new(exact, error, 0.0, unit)
        }
    }
}

impl<T: Table> Number for Bounded<T> {
    type Length = Length;
    type Coord = Coord<T>;
    type Square = Square<T>;
    type Ratio = Ratio<T>;
    type Product = Product<T>;
    type Angle = Angle<T>;
    type Scale = Scale;
    /// 2·√(L1·L2), mm.
    type Unit = f64;
    type Gain = ();
    type Swing = ();
    type Line = ();

    const NAME: &'static str = T::BOUNDS.number;
    const NO_LENGTH: Length = Length(Interval::ZERO);
    const FARTHEST: Length = Length(Interval::point(f64::MAX));
    const NO_COORD: Coord<T> = Coord::new(Interval::ZERO, 0.0, 0.0, 0.0);
    const NO_SQUARE: Square<T> =
        Square { exact: Interval::ZERO, error: 0.0, constant: false, of: PhantomData };
    const NO_ANGLE: Angle<T> = Angle::constant(0.0, 0.0);
    const LEAST_ANGLE: Angle<T> = Angle { exact: Interval::point(-PI), ..Self::NO_ANGLE };
    /// What a folded knee is counted from; its rounding belongs to the knee's.
    const MOST_ANGLE: Angle<T> = Angle { exact: Interval::point(PI), ..Self::NO_ANGLE };

    fn scale_for(radius_mm: f64) -> Option<Scale> {
        (1.0..=T::BOUNDS.most_radius_mm)
            .contains(&radius_mm)
            .then(|| Scale { unit_mm: (T::BOUNDS.unit_mm)(radius_mm) })
    }
    fn length_from_mm(mm: f64) -> Length {
        Length(Interval::point(mm))
    }
    fn coord_from_mm(mm: f64, scale: Scale) -> Coord<T> {
        let error = ((T::BOUNDS.coord_of)(mm, scale.unit_mm) - mm).abs();
        // What the solver believes of the leg's measures is not where its foot is.
        Coord::new(Interval::point(mm), error, error, scale.unit_mm)
    }
    fn square_from_mm2(mm2: f64, scale: Scale) -> Square<T> {
        let error = T::BOUNDS.square_constant * scale.unit_mm * scale.unit_mm;
        Square { constant: true, ..Square::new(Interval::point(mm2).widened(0.0), error) }
    }
    fn ratio_from(value: f64) -> Ratio<T> {
        Ratio { exact: Interval::point(value), own: 0.0, full: 0.0, gap: 0.0, of: PhantomData }
    }
    fn cylinder_from_mm2(mm2: f64, scale: Scale) -> Square<T> {
        Square::new(Interval::point(mm2).widened(0.0), T::BOUNDS.cylinder * scale.unit_mm * scale.unit_mm)
    }
    fn product_from_mm(mm: f64, scale: Scale) -> Product<T> {
        let error = ((T::BOUNDS.product_of)(mm, scale.unit_mm) - mm).abs();
        Product {
            exact: Interval::point(mm),
            own: error,
            full: error,
            gap: 0.0,
            square: 0.0,
            unit: scale.unit_mm,
            of: PhantomData,
        }
    }
    fn unit_from_mm(unit_mm: f64, _: Scale) -> f64 {
        unit_mm
    }
    fn angle_from_turns(turns: f64) -> Angle<T> {
        Angle::constant(turns * TAU, T::BOUNDS.angle.relative * (turns * TAU).abs() + T::BOUNDS.angle.rad)
    }
    /// As the number system itself rounds them.
    fn range_from_turns(range: [f64; 2]) -> [Angle<T>; 2] {
        let rounded = T::System::range_from_turns(range).map(T::System::turns);
        let limit =
            |exact: f64, rounded: f64| Angle::constant(exact * TAU, ((rounded - exact) * TAU).abs() + 1e-15);
        [limit(range[0], rounded[0]), limit(range[1], rounded[1])]
    }
    fn gain_from(_: f64) {}
    fn swing_from(_: f64) {}
    fn line_from(_: f64, _: f64) {}

    /// A box that is looked at lies within the leg's radius: see [`Subject`](super::Subject).
    fn near(foot: [Length; 3], scale: Scale) -> Option<[Coord<T>; 3]> {
        Some(foot.map(|Length(exact)| Coord { exact, unit: scale.unit_mm, ..Self::NO_COORD }))
    }
    /// The solver begins anew: what led it here counts no more.
    fn place(foot: [Length; 3], scale: Scale) -> Placed<Self> {
        note(|misjudged| *misjudged = Misjudged::default());
        Self::near(foot, scale).map_or(Placed::NotFinite, Placed::Near)
    }
    fn length(coord: Coord<T>, _: Scale) -> Length {
        Length(coord.exact)
    }
    fn mm(length: Length) -> f64 {
        length.0.middle()
    }
    fn turns(angle: Angle<T>) -> f64 {
        angle.exact.middle() / TAU
    }
    fn millidegrees(angle: Angle<T>) -> i32 {
        (angle.exact.middle().to_degrees() * 1000.0) as i32
    }
    fn micrometres(length: Length) -> i32 {
        (length.0.middle() * 1000.0) as i32
    }
    fn length_difference(a: Length, b: Length) -> Length {
        Length(a.0 - b.0)
    }

    fn square(coord: Coord<T>, scale: Scale) -> Square<T> {
        let (bounds, unit) = (&T::BOUNDS.square, scale.unit_mm);
        let cut_off = bounds.linear * unit * coord.size().min(bounds.up_to * unit);
        Square::new(coord.exact.square(), coord.square + cut_off + bounds.units2 * unit * unit)
    }
    fn root(square: Square<T>, scale: Scale) -> Coord<T> {
        let exact = square.exact.root();
        let computed = exact.high + root_error(square.error, exact);
        Self::root_within(square, T::BOUNDS.root.of(computed, scale.unit_mm), scale.unit_mm)
    }
    fn radial(radial_square: Square<T>, offset: Coord<T>, scale: Scale) -> (Coord<T>, Square<T>) {
        let (bounds, unit) = (&T::BOUNDS.radial_square, scale.unit_mm);
        let exact = radial_square.exact.root();
        let from_square = root_error(radial_square.error, exact);
        let most = exact.high + from_square;
        let radial = Self::root_within(radial_square, T::BOUNDS.radial.of(most, unit), unit);
        let along = exact - offset.exact;
        let (c, least) = (offset.size(), (exact.low - from_square).max(4.0 * unit));
        // (R − c)² with R² off: d(R − c)² = (1 − c/R)·dR², or by dR itself where R is next to nothing.
        let passed_on =
            (radial_square.error * (1.0 + c / least)).min((2.0 * (most + c) + from_square) * from_square);
        let rounded = bounds.product * c * most
            + bounds.linear * unit * (most + c)
            + bounds.units2 * unit * unit * (1.0 + c / least);
        let by_offset = offset.error * (2.0 * (along.size() + from_square) + offset.error);
        (radial, Square::new(along.square(), passed_on + rounded + by_offset))
    }
    fn stretch(coord: Coord<T>, ratio: Ratio<T>) -> Product<T> {
        let exact = coord.exact * ratio.exact;
        let most = ratio.exact.size() + ratio.full + ratio.own;
        let rounding = T::BOUNDS.stretch.of(coord.size() * most, coord.unit);
        let error = |of_ratio: f64| coord.exact.size() * of_ratio + coord.error * most + rounding;
        Product {
            exact,
            own: error(ratio.own),
            full: error(ratio.full),
            gap: ratio.gap,
            square: 0.0,
            unit: coord.unit,
            of: PhantomData,
        }
    }
    fn widen(coord: Coord<T>) -> Product<T> {
        let rounding = T::BOUNDS.widen.of(coord.size(), coord.unit);
        let product = plain(coord);
        Product {
            own: product.own + rounding,
            full: product.full + rounding,
            square: product.square + rounding * (2.0 * coord.size() + rounding),
            ..product
        }
    }
    fn turn(from: [Product<T>; 2], to: [Coord<T>; 2]) -> Angle<T> {
        turned(from, to, &T::BOUNDS.turn)
    }
    fn hip_angle(foot: [Coord<T>; 2], offset: Coord<T>, depth: Coord<T>) -> Angle<T> {
        Angle { sort: Sort::Hip, ..turned([plain(offset), -plain(depth)], foot, &T::BOUNDS.hip) }
    }
    fn yaw_angle([x, y]: [Coord<T>; 2], radial: Coord<T>) -> Angle<T> {
        Angle { sort: Sort::Hip, ..turned([plain(radial), plain(Self::NO_COORD)], [y, x], &T::BOUNDS.yaw) }
    }
    fn knee_angle(acute: Angle<T>, end: Angle<T>, _: Ratio<T>, folded: bool) -> Angle<T> {
        if !folded {
            return acute;
        }
        // Half a turn may be one angle less.
        let last = if acute.exact.low < 1e-3 { T::BOUNDS.angle.rad } else { 0.0 };
        let rounding = T::BOUNDS.knee.folded_rad + last;
        Angle {
            exact: end.exact - acute.exact,
            error: acute.error + rounding,
            own: acute.own + rounding,
            own_if_held: acute.own_if_held + rounding,
            ..acute
        }
    }
    fn knee(n: Square<T>, m: Square<T>, unit: f64, scale: Scale) -> Knee<Self> {
        let bounds = &T::BOUNDS.knee;
        let (between, error) = (m.exact - n.exact, m.error + n.error);
        let folded = decide(between.low - error < 0.0, between.high + error >= 0.0);
        let less = if folded { m } else { n };
        let whole = unit * unit;
        // The computed one is the smaller of the two, and neither is negative.
        let exact = less.exact.within(0.0, whole / 2.0 + error);
        let share = exact.over(Interval::point(whole).widened(0.0));
        let sine = share.root();
        let from_square = root_error(less.error, exact.root()) / unit;
        let rounding = bounds.sine.relative * (sine.high + from_square)
            + bounds.sine.units * scale.unit_mm / unit
            + bounds.sine_rest;
        let off = from_square + rounding;
        let most = sine.high + off;
        let gap = less.error + whole * (2.0 * (sine.high + from_square) * rounding + rounding * rounding);
        // The arcsine's slope is 1 / √(1 − s²).
        let angle_by =
            |off: f64| if most * most < 0.75 { 2.0 * off / (1.0 - most * most).sqrt() } else { PI };
        let angle_off = angle_by(off);
        // What the end of the reach itself was rounded by.
        let constant =
            root_error(T::BOUNDS.square_constant * scale.unit_mm * scale.unit_mm, exact.root()) / unit;
        let half_sine = |v: f64| (v * (1.0 - v)).max(0.0).sqrt();
        let half_sines = if share.high <= 0.5 {
            Interval::new(half_sine(share.low), half_sine(share.high))
        } else {
            Interval::new(half_sine(share.low).min(half_sine(share.high)), 0.5)
        };
        let acute = sine.arc_sine();
        Knee {
            acute: Angle {
                exact: acute + acute,
                error: angle_off + bounds.angle_rad,
                along: 0.0,
                across: 0.0,
                displaced: 0.0,
                own: bounds.angle_rad,
                own_if_held: bounds.angle_rad + angle_by(rounding + constant),
                sort: if n.constant { Sort::KneeAtItsEnd } else { Sort::Knee },
                of: PhantomData,
            },
            half_sine: Ratio {
                exact: half_sines.widened(1e-15),
                own: bounds.half_sine,
                // s·√(1 − s²) is no steeper than s up to √¾.
                full: bounds.half_sine + if most * most < 0.75 { off } else { 0.5 },
                gap,
                of: PhantomData,
            },
            folded,
            from_end: Ratio {
                exact: share,
                own: bounds.from_end,
                full: bounds.from_end + off * (2.0 * sine.high + off),
                gap,
                of: PhantomData,
            },
        }
    }

    // Forward kinematics serve only to tell how far off a foot is, which the certificate does not look at.
    fn sin_cos(_: Angle<T>) -> (Ratio<T>, Ratio<T>) {
        let any = Ratio { exact: Interval::new(-1.0, 1.0), own: 0.0, full: 0.0, gap: 0.0, of: PhantomData };
        (any, any)
    }
    fn angle_sum(a: Angle<T>, _: Angle<T>) -> Angle<T> {
        Angle { exact: Interval::CIRCLE, ..a }
    }
    fn angle_difference(a: Angle<T>, _: Angle<T>) -> Angle<T> {
        Angle { exact: Interval::CIRCLE, ..a }
    }
    fn narrow(product: Product<T>) -> Coord<T> {
        Coord::new(product.exact, product.full, product.full, product.unit)
    }

    fn rescale(v: Coord<T>, to: Coord<T>, from: Coord<T>) -> Coord<T> {
        let share = v.exact.over(from.exact).within(-1.0, 1.0);
        let exact = share * to.exact;
        let shortest = from.exact.low - from.error;
        let over = |error: f64| if shortest > 0.0 { (error / shortest).min(2.0) } else { 2.0 };
        // What is wrong with the norm and with the length is alike for all that is rescaled by them.
        let longest = to.size() / to.exact.least_size();
        let alike = over(from.error) + to.error / to.exact.least_size() + T::BOUNDS.rescale_common;
        let alone = (to.size() * over(v.error) + T::BOUNDS.rescale.of(to.size() * share.size(), to.unit))
            * (1.0 + alike.min(1.0));
        let alike = alike * longest;
        let error = (exact.size() * alike).min(2.0 * to.size()) + alone;
        let coord = Coord::new(exact, error, error, to.unit);
        if alike < 1.0 { Coord { alone, alike, ..coord } } else { coord }
    }
    fn halve(coord: Coord<T>, _: u32) -> Coord<T> {
        // Feet that are far beyond reach are not looked at.
        coord
    }
    fn distance(_: [Length; 3], _: [Length; 3]) -> Length {
        ANY_LENGTH
    }

    fn travel(_: Angle<T>, _: Angle<T>, (): ()) -> i32 {
        0
    }
    fn swing_to(_: i32, from: Angle<T>, (): ()) -> Angle<T> {
        from
    }
    fn on_line((): (), _: Angle<T>) -> i32 {
        0
    }
}

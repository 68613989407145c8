//! Promise: whatever is called in whatever order, no frame sends a pulse beyond its range, none more than its slew from the
//! one before, none that was not allowed, and the first ones are those that were stated; and what is wanted is got to.

mod common;

use common::channel::{AnyOutput, Measured};
use common::effort::rounds;
use common::frame::Core;
use common::legs::Sweep;
use ik_core::drive::Drive;
use ik_core::frame::{
    Conduct, FrameError, FrameSafety, FrameState, ServoBounds, StaleRule, Watch, counts_of,
};
use ik_core::{
    Angle, Bend, Channel, Coarse, Counting, Dimensions, Fixed16, Fixed32, Float32, Foot, Joints, Leg, Limb,
    Limits, Mounting, Number, Outcome, Pulse, Servo, ServoSpec, Short32, Side, Timer, YawHip,
};
use ik_host_tests::frame_witness::{Stage, Tally, Witness, run};
use ik_host_tests::numbers::Float64;
use ik_host_tests::{machine, sheet};
use std::panic::{AssertUnwindSafe, catch_unwind, resume_unwind};

/// Ten million frames: of one servo, of a leg's three, of six legs' eighteen.
#[test]
fn ten_million_random_frames_keep_every_promise() {
    fn some<const SERVOS: usize>(sweep: &mut Sweep, stages: usize, tally: &mut Tally) {
        for _ in 0..rounds(stages) {
            let mut stage = Core::<SERVOS>::random(sweep);
            let promise = stage.promise();
            *tally += run(&mut stage, &promise, sweep.bits().into(), 20_000).unwrap();
        }
    }
    let (mut sweep, mut tally) = (Sweep::from_seed(61), Tally::default());
    some::<1>(&mut sweep, 200, &mut tally);
    some::<3>(&mut sweep, 270, &mut tally);
    some::<18>(&mut sweep, 30, &mut tally);
    println!("{tally:?}");
    assert!(tally.frames >= 10_000_000, "{tally:?}");
    // Everything was met, and often.
    for met in [tally.silent, tally.moving, tally.at_the_limit, tally.stale] {
        assert!(met > 200_000, "{tally:?}");
    }
    for met in [tally.first, tally.let_go, tally.restarted] {
        assert!(met > 5_000, "{tally:?}");
    }
}

/// From feet of any bits, NaN and infinity among them, in every number system: through the solver and the channels.
#[test]
fn feet_of_any_bits_keep_every_promise_in_every_number_system() {
    fn check<N: Number>(sweep: &mut Sweep) {
        let timer = Timer::finest(48_000_000, 16, 50.0).expect("a timer");
        let dimensions = Dimensions::yaw_hip(42.5, 71.0, 118.4, Bend::Up).expect("dimensions");
        let limits = Limits::degrees([-50.0, 50.0], [-40.0, 90.0], [15.0, 155.0]).expect("limits");
        let spec = ServoSpec { pulse_us: [1000.0, 2000.0], ..ServoSpec::COMMON };
        let channel = Channel::<N>::from_spec(spec, timer.counting()).expect("a channel");
        let leg = Leg::<YawHip, N>::from_dimensions(dimensions, limits).expect("a leg");
        let mounting = Mounting::new(Foot::from_mm(0.0, 60.0, 0.0), Side::Left);
        let limb = Limb { leg, mounting, servos: [channel; 3] };
        let bounds = ServoBounds::on_channel(
            &channel,
            timer.counting(),
            Pulse::from_us(1234.5),
            Pulse::from_us(sweep.within(0.4, 300.0)),
        )
        .expect("bounds");
        let stale = StaleRule::hold_then_release(3, 11).expect("a rule");
        let mut stage = Core::new(FrameSafety::new([bounds; 3], stale));
        let promise = stage.promise();
        let mut witness = Witness::new(&promise);
        let (mut hold, mut sent, mut not_finite) = (Joints::ZERO, [0; 3], 0);
        let mut base = [0.0, 180.0, -60.0];
        for frame in 0..6_000 {
            if frame % 97 == 1 {
                stage.engage();
                witness.engage();
            }
            let foot = match sweep.bits() % 8 {
                0 => [(); 3].map(|()| f64::from_bits(u64::from(sweep.bits()) << 32)),
                1 => [f64::NAN, f64::INFINITY, sweep.within(-300.0, 300.0)],
                2 => [(); 3].map(|()| sweep.within(-300.0, 300.0)),
                _ => base,
            };
            base = base.map(|mm| mm + sweep.within(-3.0, 3.0));
            let command = limb.command(Foot::from_mm(foot[0], foot[1], foot[2]), hold);
            hold = command.answer.joints;
            let new = counts_of::<N, 3>(&[command]);
            assert_eq!(new.is_none(), command.answer.outcome == Outcome::NotFinite, "{}", N::NAME);
            not_finite += u32::from(new.is_none());
            // Now and then the planner is silent for a while.
            let new = new.filter(|_| frame % 89 < 70);
            let new = new.as_ref().map(|counts| &counts[..]);
            let has_pulses = stage.frame(new, &mut sent);
            witness.frame(new, has_pulses.then_some(&sent)).unwrap();
        }
        // Fixed point saturates: it has no NaN.
        assert!(not_finite > 300 || N::NAME.starts_with("fixed") || N::NAME.starts_with("short"));
    }
    let mut sweep = Sweep::from_seed(62);
    for _ in 0..rounds(3) {
        check::<Float32>(&mut sweep);
        check::<Coarse>(&mut sweep);
        check::<Fixed32>(&mut sweep);
        check::<Short32>(&mut sweep);
        check::<Fixed16>(&mut sweep);
        check::<Float64>(&mut sweep);
    }
}

/// Pulses in microseconds instead of counts: the same stage, in steps of a pulse.
#[test]
fn pulses_keep_every_promise_too() {
    fn check<N: Number>(sweep: &mut Sweep) {
        let servo = Servo::<N>::from_spec(ServoSpec::COMMON).expect("a servo");
        let slew_us = sweep.within(1e-4, 400.0);
        let bounds =
            ServoBounds::on_servo(&servo, Pulse::from_us(1500.0), Pulse::from_us(slew_us)).expect("bounds");
        assert!(f64::from(bounds.slew()) / 65_536.0 <= slew_us + 0.5 / 65_536.0);
        let mut stage =
            Core::new(FrameSafety::new([bounds; 3], StaleRule::hold_for_good(7).expect("a rule")));
        let promise = stage.promise();
        let mut witness = Witness::new(&promise);
        stage.engage();
        witness.engage();
        let mut before = None;
        for _ in 0..4_000 {
            let angle =
                |sweep: &mut Sweep| Angle::<N>::from_degrees(sweep.within(-180.0, 180.0)).expect("an angle");
            let joints = Joints { hip: angle(sweep), thigh: angle(sweep), knee: angle(sweep) };
            let wanted = [servo; 3].send(&joints, false).map(|command| command.pulse.steps());
            let mut sent = [0; 3];
            let has_pulses = stage.frame(Some(&wanted), &mut sent);
            witness.frame(Some(&wanted), has_pulses.then_some(&sent)).unwrap();
            let pulses = has_pulses.then_some(sent.map(|steps| Pulse::from_steps(steps).us()));
            if let (Some(before), Some(pulses)) = (before, pulses) {
                let before: [f64; 3] = before;
                for (before, now) in before.iter().zip(pulses) {
                    assert!(
                        (now - before).abs() <= slew_us + 0.5 / 65_536.0 && (1000.0..=2000.0).contains(&now)
                    );
                }
            }
            before = pulses;
        }
        assert!(before.is_some());
    }
    let mut sweep = Sweep::from_seed(63);
    check::<Float32>(&mut sweep);
    check::<Coarse>(&mut sweep);
    check::<Fixed32>(&mut sweep);
    check::<Short32>(&mut sweep);
    check::<Fixed16>(&mut sweep);
}

/// A caller that panics while it works out its targets, at any place of its frame, and goes on.
#[test]
fn a_caller_that_panics_between_two_frames_finds_the_last_whole_one() {
    let mut sweep = Sweep::from_seed(64);
    for _ in 0..rounds(40) {
        let mut stage = Core::<3>::random(&mut sweep);
        let promise = stage.promise();
        let mut witness = Witness::new(&promise);
        let mut panics = 0;
        for _ in 0..500 {
            let before = (stage.state.last(), stage.state.conduct(), stage.state.is_engaged());
            let (dice, wanted) = (sweep.bits() % 8, [(); 3].map(|()| sweep.bits()));
            // Not by `panic!`, which would print thousands of messages.
            let outcome = catch_unwind(AssertUnwindSafe(|| {
                let targets =
                    move || if dice == 0 { resume_unwind(Box::new("lost its way")) } else { wanted };
                if dice == 1 {
                    stage.engage();
                    resume_unwind(Box::new("just after"));
                }
                let mut sent = [0; 3];
                let has_pulses = stage.frame(Some(&targets()), &mut sent);
                has_pulses.then_some(sent)
            }));
            match outcome {
                Ok(sent) => witness.frame(Some(&wanted), sent.as_ref().map(|sent| &sent[..])).unwrap(),
                Err(_) => {
                    panics += 1;
                    if dice == 1 {
                        witness.engage();
                    } else {
                        let after = (stage.state.last(), stage.state.conduct(), stage.state.is_engaged());
                        assert_eq!(after, before);
                    }
                }
            }
        }
        assert!(panics > 50 && stage.state.conduct() == Conduct::Following);
    }
}

/// A slew in counts is the most whole ones within the slew in microseconds, by whole numbers; a stated pulse the nearest.
#[test]
fn a_slew_is_rounded_down_to_whole_counts() {
    let mut sweep = Sweep::from_seed(65);
    let mut refused = 0;
    for _ in 0..rounds(3_000) {
        let (servo, output) = (Measured::random(&mut sweep), AnyOutput::random(&mut sweep));
        let counting = output.counting();
        let channel = Channel::<Fixed32, 14>::from_curve(&servo.curve().expect("a curve"), counting)
            .expect("a channel");
        let [least, most] = channel.range();
        let [shortest, longest] = servo.sent_us();
        let start = Pulse::from_us(sweep.within(shortest, longest + 1e-9));
        let slew = Pulse::from_us(10f64.powf(sweep.within(-1.0, 3.0)));
        let counts_per_us = counting.counts_per_us();
        let exact = f64::from(slew.steps()) / 65_536.0 * counts_per_us;
        match ServoBounds::on_channel(&channel, counting, start, slew) {
            Ok(bounds) => {
                assert_eq!(bounds.range(), [least, most]);
                let slew = f64::from(bounds.slew());
                assert!(
                    slew <= exact * (1.0 + 1e-12) && slew + 1.0 >= exact * (1.0 - 1e-12),
                    "{slew} {exact}"
                );
                let nearest = (start.us() * counts_per_us).clamp(least.into(), most.into());
                assert!((f64::from(bounds.start()) - nearest).abs() <= 0.5 + 1e-9, "{bounds:?} {nearest}");
            }
            Err(error) => {
                assert!(error == FrameError::Slew && exact < 1.0 + 1e-12, "{error} {exact}");
                refused += 1;
            }
        }
    }
    assert!(refused > 100);
}

const TIMER: Timer = match Timer::finest(48_000_000, 16, 50.0) {
    Ok(timer) => timer,
    Err(error) => panic!("{}", error.message()),
};
const COUNTING: Counting = TIMER.counting();

/// Also while compiling, and in every number system alike.
#[test]
fn what_cannot_be_is_refused_and_says_what_would_be_right() {
    macro_rules! check {
        ($($number:ty)*) => {$({
            const CHANNEL: Channel<$number> = match Channel::<$number>::new(ServoSpec::COMMON, COUNTING) {
                Ok(channel) => channel,
                Err(error) => panic!("{}", error.message()),
            };
            const fn bounds(start_us: f64, slew_us: f64) -> Result<ServoBounds, FrameError> {
                ServoBounds::on_channel(&CHANNEL, COUNTING, Pulse::from_us(start_us), Pulse::from_us(slew_us))
            }
            const GOOD: Result<ServoBounds, FrameError> = bounds(1500.0, 50.0);
            assert_eq!(GOOD, ServoBounds::in_counts([3200, 6400], 4800, 160));
            for slew_us in [0.0, -1.0, f64::NAN, 0.3124, f64::INFINITY, 40_000.0] {
                assert_eq!(bounds(1500.0, slew_us), Err(FrameError::Slew), "{slew_us}");
            }
            for start_us in [0.0, f64::NAN, 999.0, 2001.0, f64::INFINITY, -1500.0] {
                assert_eq!(bounds(start_us, 50.0), Err(FrameError::Start), "{start_us}");
            }
            // By rounding alone beyond the end: the end.
            assert_eq!(bounds(2000.2, 50.0).map(|it| it.start()), Ok(6400));
        })*};
    }
    check!(Float32 Coarse Fixed32 Short32 Fixed16);
    assert_eq!(ServoBounds::in_counts([0, 10], 5, 1), Err(FrameError::Range));
    assert_eq!(ServoBounds::in_counts([11, 10], 11, 1), Err(FrameError::Range));
    assert_eq!(ServoBounds::in_counts([5, 10], 4, 1), Err(FrameError::Start));
    assert_eq!(ServoBounds::in_counts([5, 10], 5, 0), Err(FrameError::Slew));
    let nothing = Servo::<Fixed32>::from_spec(ServoSpec { pulse_us: [0.0, 2000.0], ..ServoSpec::COMMON });
    let bounds =
        ServoBounds::on_servo(&nothing.expect("a servo"), Pulse::from_us(1500.0), Pulse::from_us(9.0));
    assert_eq!(bounds.map(|it| it.range()), Ok([1, 2000 << 16]));
    for (hold_after, release_after) in [(0, 5), (5, 5), (6, 5), (5, u16::MAX)] {
        assert_eq!(StaleRule::hold_then_release(hold_after, release_after), Err(FrameError::Stale));
    }
    assert_eq!(StaleRule::hold_for_good(0), Err(FrameError::Stale));
    assert_eq!(StaleRule::hold_for_good(u16::MAX), Err(FrameError::Stale));
    for (error, right) in [
        (FrameError::Range, "[least, most]"),
        (FrameError::Start, "within the servo's pulse range"),
        (FrameError::Slew, "at least one count"),
        (FrameError::Stale, "1 to 65534 frames"),
    ] {
        assert!(error.to_string().contains(right), "{error}");
    }
}

/// The sheets' slews and first pulses become bounds, with the trim of each leg; frames of random calls keep to them.
#[test]
fn the_demo_robots_servos_have_bounds_from_their_sheets() {
    let mut seen = Vec::new();
    for name in ["culvert-walker", "orchard-walker"] {
        let robot = sheet::demo(name).unwrap_or_else(|error| panic!("{error}"));
        for leg in 0..robot.legs.len() {
            let bounds = machine::servo_bounds(&robot, leg).expect("bounds").map(|it| it.expect("a slew"));
            let safety = FrameSafety::new(bounds, StaleRule::hold_then_release(5, 50).expect("a rule"));
            let mut stage = Core::new(safety);
            let promise = stage.promise();
            assert!(run(&mut stage, &promise, 68 + leg as u64, 5_000).unwrap().moving > 500);
            seen.push(bounds);
        }
    }
    // The culvert walker's left front femur, 1050 us and a trim of 5 us, 80 us a frame, in counts of 4.88 us; and the orchard
    // walker's left rear thigh, 1850 us and 2.5 us, 90 us a frame, in ticks of 0.3125 us.
    assert_eq!(Ok(seen[0][1]), ServoBounds::in_counts([123, 491], 216, 16));
    assert_eq!(Ok(seen[6 + 2][1]), ServoBounds::in_counts([2560, 7040], 5928, 288));
    // A first pulse that its trim would move out of the safe pulses is held there; without a slew there are no bounds.
    let text = sheet::DEMOS[0].text.replacen("start_us = 1500", "start_us = 602", 1);
    let text = text.replacen("trim_us = { hip = -7", "trim_us = { hip = -9", 1).replacen(
        "slew_us_per_frame = 80\n",
        "\n",
        1,
    );
    let robot = sheet::parse("sheet.toml", &text).unwrap_or_else(|complaints| panic!("{complaints}"));
    let [hip, femur, knee] = machine::servo_bounds(&robot, 1).expect("bounds");
    assert_eq!(hip.map(|it| it.start()), Some(123));
    assert!(femur.is_none() && knee.is_some());
}

/// A frame that is not whole is no target.
#[test]
fn legs_that_are_not_as_many_as_the_servos_are_no_target() {
    let timer = Timer::finest(48_000_000, 16, 50.0).expect("a timer");
    let channel = Channel::<Fixed32>::from_spec(ServoSpec::COMMON, timer.counting()).expect("a channel");
    let leg = Leg::<YawHip, Fixed32>::from_dimensions(
        Dimensions::yaw_hip(42.5, 71.0, 118.4, Bend::Up).expect("dimensions"),
        Limits::FREE,
    )
    .expect("a leg");
    let mounting = Mounting::new(Foot::from_mm(0.0, 0.0, 0.0), Side::Left);
    let limb = Limb { leg, mounting, servos: [channel; 3] };
    let command = limb.command(Foot::from_mm(10.0, 120.0, -70.0), Joints::ZERO);
    let other = limb.command(Foot::from_mm(-10.0, 130.0, -60.0), Joints::ZERO);
    let counts = [command.counts(), other.counts()];
    assert_eq!(
        counts_of::<Fixed32, 6>(&[command, other]).as_ref().map(|it| &it[..]),
        Some(counts.as_flattened())
    );
    assert_eq!(counts_of::<Fixed32, 6>(&[command]), None);
    assert_eq!(counts_of::<Fixed32, 3>(&[command, other]), None);
    assert_eq!(counts_of::<Fixed32, 7>(&[command, other]), None);
    assert_eq!(counts_of::<Fixed32, 0>(&[]), Some([]));
}

/// A state of other bounds, as may come of an interface to another language: what is sent is within these all the same.
#[test]
fn a_state_of_other_bounds_never_leaves_these() {
    let servo = |range, start| ServoBounds::in_counts(range, start, 7).expect("bounds");
    let stale = StaleRule::hold_for_good(2).expect("a rule");
    let (near, far) = (
        FrameSafety::new([servo([10, 20], 12)], stale),
        FrameSafety::new([servo([1000, 2000], 1500)], stale),
    );
    let mut state = far.start();
    state.engage();
    for frame in 0..6 {
        let sent = near.frame(&mut state, (frame < 3).then_some(&[1700]));
        assert!(sent.is_none_or(|&[sent]| (10..=20).contains(&sent)), "{sent:?}");
    }
    assert_eq!(far.start_at([5]).last(), [1000]);
}

/// Two stages of the same ranges over one state: a gentle one for standing up, a fast one for walking.
#[test]
fn one_state_may_go_from_a_gentle_stage_to_a_fast_one() {
    let stage = |slew| {
        let servo = ServoBounds::in_counts([3200, 6400], 3840, slew).expect("bounds");
        FrameSafety::new([servo; 3], StaleRule::hold_then_release(3, 9).expect("a rule"))
    };
    let (gentle, fast) = (stage(11), stage(83));
    let mut sweep = Sweep::from_seed(67);
    let (mut state, mut before, mut steps) = (gentle.start(), None, [0; 2]);
    for _ in 0..rounds(20_000) {
        if sweep.bits().is_multiple_of(50) {
            state.engage();
        }
        let is_fast = sweep.bits() % 2;
        let new = (!sweep.bits().is_multiple_of(4)).then(|| [(); 3].map(|()| 3000 + sweep.bits() % 4000));
        let sent = if is_fast == 1 { &fast } else { &gentle }.frame(&mut state, new.as_ref()).copied();
        if let (Some(before), Some(sent)) = (before, sent) {
            let before: [u32; 3] = before;
            let longest = before.iter().zip(sent).map(|(before, sent)| sent.abs_diff(*before)).max();
            assert!(longest <= Some([11, 83][is_fast as usize]), "{before:?} {sent:?}");
            steps[is_fast as usize] += u32::from(longest == Some([11, 83][is_fast as usize]));
        }
        before = sent;
    }
    assert!(steps[0] > 1000 && steps[1] > 1000, "{steps:?}");
}

/// A watch comes back from its word as it was; and any word is one.
#[test]
fn a_watch_fits_a_word() {
    let rule = StaleRule::hold_then_release(3, 40_000).expect("a rule");
    let mut watch = Watch::START;
    let mut sweep = Sweep::from_seed(66);
    for frame in 0..200_000 {
        let there_and_back = |watch: Watch| assert_eq!(Watch::from_bits(watch.to_bits()), watch);
        match sweep.bits() % 3000 {
            _ if frame >= 60_000 => watch = watch.next(&rule, false),
            0 => watch = watch.engaged(),
            1 => watch = watch.released(),
            _ => watch = watch.next(&rule, frame % 5 == 0),
        }
        there_and_back(watch);
        let word = sweep.bits();
        there_and_back(Watch::from_bits(word));
        there_and_back(Watch::from_bits(word & 0x000F_FFFF));
    }
    assert_eq!(watch.frames(), 65_534, "it counts no further");
}

/// A ramp takes as many frames as there are slews in its way, and then it is there.
#[test]
fn a_start_up_ramps_from_the_stated_pulse_to_the_target() {
    let servos = [
        ServoBounds::in_counts([3200, 6400], 3840, 100).expect("bounds"),
        ServoBounds::in_counts([3200, 6400], 6400, 37).expect("bounds"),
    ];
    let safety = FrameSafety::new(servos, StaleRule::hold_for_good(1).expect("a rule"));
    let mut state: FrameState<2> = safety.start();
    let target = Some(&[4800, 4900]);
    assert_eq!((safety.frame(&mut state, target).copied(), state.conduct()), (None, Conduct::Released));
    state.engage();
    assert_eq!(
        (safety.frame(&mut state, target).copied(), state.conduct()),
        (Some([3840, 6400]), Conduct::First)
    );
    let mut frames = 0;
    while state.behind() > 0 {
        safety.frame(&mut state, target).expect("pulses");
        frames += 1;
    }
    // 1500 counts of 37 at a time.
    assert_eq!((frames, state.last()), (41, [4800, 4900]));
    // Released, and on from there.
    state.release();
    assert_eq!(safety.frame(&mut state, Some(&[3200, 3200])), None);
    state.engage();
    assert_eq!(safety.frame(&mut state, Some(&[3200, 3200])), Some(&[4800, 4900]));
    assert_eq!(safety.frame(&mut state, Some(&[3200, 3200])), Some(&[4700, 4863]));
}

/// What the model images sent on the emulated chips, frame by frame, as their golden logs tell: counts of all servos, none
/// for no pulses.
fn sent_by(model: &str, frame_of: impl Fn(&str) -> Vec<u32>) -> Vec<Vec<u32>> {
    let path =
        format!("{}/../examples-embedded/run-on-emulator/golden/{model}.txt", env!("CARGO_MANIFEST_DIR"));
    let log = std::fs::read_to_string(&path).expect(&path);
    log.split("frame ").skip(1).map(frame_of).collect()
}

/// The logs of real runs, looked at without any of the code that made them.
#[test]
fn the_model_images_sent_nothing_that_they_should_not() {
    let check = |model: &str, sent: Vec<Vec<u32>>, servos: usize, range: [u32; 2], slew: u32| {
        let silent: Vec<bool> = sent.iter().map(|counts| counts.iter().all(|counts| *counts == 0)).collect();
        assert!(silent[0] && silent[silent.len() - 1], "{model}: lets go first and last");
        assert_eq!(silent.windows(2).filter(|pair| pair[0] != pair[1]).count(), 2, "{model}: pulses once");
        let pulses: Vec<_> =
            sent.iter().zip(&silent).filter(|(_, silent)| !*silent).map(|(sent, _)| sent).collect();
        let mut longest = 0;
        for pair in pulses.windows(2) {
            assert_eq!(pair[1].len(), servos, "{model}");
            for (before, now) in pair[0].iter().zip(pair[1]) {
                longest = longest.max(now.abs_diff(*before));
                assert!((range[0]..=range[1]).contains(now), "{model}: {now}");
            }
        }
        assert!(longest <= slew && longest > slew / 4, "{model}: {longest} of {slew}");
    };
    // Bytes "38, 01, ..." after the register's, low ones first; 83 us of 4.88 us, 600 to 2400 us.
    let expander = sent_by("six-legs-on-an-expander", |frame| {
        let bytes = frame.rsplit('[').next().expect("a list").trim_end().trim_end_matches(']');
        let bytes: Vec<u32> =
            bytes.split(", ").map(|byte| u32::from_str_radix(byte, 16).expect("a byte")).collect();
        bytes.chunks(2).map(|pair| pair[0] | pair[1] << 8).collect()
    });
    check("six-legs-on-an-expander", expander, 18, [123, 491], 17);
    // Lines "ticks [4826, 5252, 4749]"; 95 us of 0.3125 us, 800 to 2200 us.
    let timer = sent_by("four-legs-in-an-interrupt", |frame| {
        let lists = frame.lines().filter_map(|line| line.strip_prefix("ticks [")?.strip_suffix(']'));
        lists.flat_map(|list| list.split(", ").map(|ticks| ticks.parse::<u32>().expect("ticks"))).collect()
    });
    check("four-legs-in-an-interrupt", timer, 12, [2560, 7040], 304);
}

//! Random calls of a stage, watched by the witness.

use super::{Promise, Seen, Stage, Witness};
use rand::{RngExt, SeedableRng};
use rand_xoshiro::Xoshiro256PlusPlus;
use std::ops::AddAssign;

/// What was met on the way, so that a test can see that it met everything.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
pub struct Tally {
    /// All frames.
    pub frames: u64,
    /// Those without pulses.
    pub silent: u64,
    /// Those with the first pulses after none.
    pub first: u64,
    /// Those in which a pulse changed.
    pub moving: u64,
    /// Those in which a pulse changed by all of its slew.
    pub at_the_limit: u64,
    /// Those with pulses whose target was stale.
    pub stale: u64,
    /// Releases by the stale rule.
    pub let_go: u64,
    /// States that were thrown away while there were pulses.
    pub restarted: u64,
}

impl AddAssign for Tally {
    fn add_assign(&mut self, other: Self) {
        self.frames += other.frames;
        self.silent += other.silent;
        self.first += other.first;
        self.moving += other.moving;
        self.at_the_limit += other.at_the_limit;
        self.stale += other.stale;
        self.let_go += other.let_go;
        self.restarted += other.restarted;
    }
}

/// How the caller behaves for a while.
#[derive(Clone, Copy)]
enum Mood {
    /// A target every frame, wherever.
    Restless,
    /// A target every frame, the same for some time.
    Steady,
    /// A target now and then.
    Late,
    /// None.
    Silent,
    /// Everything, wildly.
    Mad,
}

/// Calls a fresh stage at random for so many frames, and watches it.
///
/// # Errors
/// Says in which frame which promise was broken.
pub fn run(stage: &mut impl Stage, promise: &Promise, seed: u64, frames: u64) -> Result<Tally, String> {
    let mut random = Xoshiro256PlusPlus::seed_from_u64(seed);
    let mut witness = Witness::new(promise);
    let mut tally = Tally::default();
    let (mut wanted, mut sent) = (vec![0; promise.servos.len()], vec![0; promise.servos.len()]);
    let (mut mood, mut left) = (Mood::Restless, 0u32);
    stage.start();
    for frame in 0..frames {
        if left == 0 {
            mood = [Mood::Restless, Mood::Steady, Mood::Late, Mood::Silent, Mood::Mad]
                [random.random_range(0..5)];
            // As long as the stale rule needs, and half as long again.
            let rule = promise.release_after.unwrap_or(promise.hold_after);
            left = random.random_range(1..=rule.saturating_add(rule / 2).saturating_add(4).min(3000));
            targets(&mut random, promise, &mut wanted);
        }
        left -= 1;
        let dice = random.random_range(0..1000u32);
        let often = if matches!(mood, Mood::Mad) { 10 } else { 1 };
        if dice < 2 * often {
            stage.release();
            witness.release();
        } else if dice < 3 * often {
            tally.restarted += u64::from(witness.seen == Seen::Pulses);
            stage.start();
            witness.start();
        }
        // Also right after a release or a start.
        if random.random_range(0..1000) < 40 * often {
            stage.engage();
            witness.engage();
        }
        let is_new = match mood {
            Mood::Restless => true,
            Mood::Steady => true,
            Mood::Late => random.random_range(0..promise.hold_after.saturating_mul(2).max(2)) == 0,
            Mood::Silent => false,
            Mood::Mad => random.random_range(0..3) > 0,
        };
        if is_new && !matches!(mood, Mood::Steady) {
            targets(&mut random, promise, &mut wanted);
        }
        let new = is_new.then_some(&wanted[..]);
        let (seen, was_allowed) = (witness.seen, witness.allowed);
        let moves = Moves::of(&witness);
        let has_pulses = stage.frame(new, &mut sent);
        let now = has_pulses.then_some(&sent[..]);
        witness.frame(new, now).map_err(|broken| {
            format!("frame {frame} of seed {seed}: {broken}; {:?} of {promise:?}", promise.servos.len())
        })?;
        tally.frames += 1;
        match now {
            None => tally.silent += 1,
            Some(_) if seen != Seen::Pulses => tally.first += 1,
            Some(sent) => {
                let (moving, at_the_limit) = moves.seen_in(sent, promise);
                tally.moving += u64::from(moving);
                tally.at_the_limit += u64::from(at_the_limit);
                tally.stale += u64::from(witness.quiet >= u64::from(promise.hold_after));
            }
        }
        tally.let_go += u64::from(seen == Seen::Pulses && was_allowed && !witness.allowed);
    }
    Ok(tally)
}

/// The first servo before a frame: enough to tell what kinds of frames there were.
struct Moves(Option<i64>);

impl Moves {
    fn of(witness: &Witness<'_>) -> Self {
        Self(witness.last.first().copied())
    }

    fn seen_in(&self, sent: &[u32], promise: &Promise) -> (bool, bool) {
        match (self.0, sent.first(), promise.servos.first()) {
            (Some(last), Some(&sent), Some(servo)) => {
                let moved = (i64::from(sent) - last).abs();
                (moved > 0, moved == i64::from(servo.slew))
            }
            _ => (false, false),
        }
    }
}

/// Anywhere: within, at the ends and a count beyond, and what no channel would ever give.
fn targets(random: &mut impl RngExt, promise: &Promise, wanted: &mut [u32]) {
    let dice = random.random::<u64>();
    for (number, (wanted, servo)) in wanted.iter_mut().zip(&promise.servos).enumerate() {
        let [least, most] = servo.range;
        // Three bits of the dice for each of some twenty servos; more begin anew.
        *wanted = match dice >> (3 * (number % 20)) & 7 {
            0 => random.random(),
            1 => [0, 1, u32::MAX, 1 << 31, least, most, least - 1, most.saturating_add(1)]
                [random.random_range(0..8)],
            _ => random.random_range(least..=most),
        };
    }
}

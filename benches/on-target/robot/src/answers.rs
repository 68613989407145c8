//! From a target to its answer, and the digest of many.

use counted::Digest;
use ik_core::channel::Counts;
use ik_core::limb::LimbCommand;
use ik_core::{End, Foot, Hip, Joints, Limb, Outcome};

use crate::{Bits, BuildDrive};

/// What is asked: where a foot is to go, and the last pose.
#[derive(Debug, Clone, Copy)]
pub struct Ask<N: Bits> {
    foot: Foot<N>,
    hold: Joints<N>,
}

/// What is answered.
#[derive(Debug, Clone, Copy)]
pub struct Answer<N: Bits>(LimbCommand<N, Counts>);

/// Words of an answer: joints, how far the foot is off, outcome, pulses held, counts.
pub const WORDS: usize = 9;
/// Answers from one told digest to the next.
pub const BLOCK: u32 = 250;

/// What is asked with a target's words, after some answer.
pub fn ask<N: Bits>([x, y, z]: [u32; 3], last: Option<&Answer<N>>) -> Ask<N> {
    Ask {
        foot: Foot::new(N::length_from(x), N::length_from(y), N::length_from(z)),
        hold: last.map_or(Joints::ZERO, |last| last.0.answer.joints),
    }
}

/// What a firmware does for a leg in a frame: from a foot on the body's frame to three counts. This is what is counted.
#[inline]
pub fn answer<H: Hip, N: Bits, D: BuildDrive<N>>(limb: &Limb<H, N, D>, ask: &Ask<N>) -> Answer<N> {
    Answer(limb.command(ask.foot, ask.hold))
}

impl<N: Bits> Answer<N> {
    /// The answer, down to the last bit.
    pub fn words(&self) -> [u32; WORDS] {
        let [hip, thigh, knee] = self.0.answer.joints.as_array().map(|joint| N::angle_bits(joint.raw()));
        let [a, b, c] = self.0.counts();
        let off_by = N::length_bits(self.0.answer.off_by);
        let outcome = match self.0.answer.outcome {
            Outcome::Reached => 0,
            Outcome::Moved => 1,
            Outcome::NotFinite => 2,
            Outcome::Held(held) => 4 + ends(held.as_array()),
        };
        let pulses = ends(self.0.commands.held.as_array());
        [hip, thigh, knee, off_by, outcome, pulses, a, b, c]
    }
}

/// Three ends in base 3.
fn ends(held: [Option<End>; 3]) -> u32 {
    held.into_iter().fold(0, |sum, end| {
        3 * sum
            + match end {
                None => 0,
                Some(End::Least) => 1,
                Some(End::Most) => 2,
            }
    })
}

/// Adds answers up, and tells the digest of all so far at the end of every block.
#[derive(Debug, Clone)]
pub struct Blocks {
    digest: Digest,
    answers: u32,
}

impl Blocks {
    /// None yet.
    pub const fn new() -> Self {
        Self { digest: Digest::EMPTY, answers: 0 }
    }

    /// Takes an answer; the digest so far if a block is full or this is the last of `all`.
    pub fn take(&mut self, words: [u32; WORDS], all: u32) -> Option<u32> {
        self.digest = self.digest.with(words);
        self.answers += 1;
        (self.answers.is_multiple_of(BLOCK) || self.answers == all).then(|| self.digest.value())
    }
}

impl Default for Blocks {
    fn default() -> Self {
        Self::new()
    }
}

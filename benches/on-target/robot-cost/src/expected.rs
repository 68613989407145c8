//! What an image has to log about a leg, computed here by the same code; and the words that go into its memory.

use ik_core::{Channel, Coarse, Fixed16, Fixed32, Float32, Foot, Parallelogram, RollHip, Short32, YawHip};
use robot::{Bits, Blocks, BuildDrive, BuildHip, Header, TARGETS_AT, WORDS, Writer, answer, ask};

use crate::job::{Hip, Leg};

/// A leg and targets in a number system.
#[derive(Debug, Clone)]
pub struct Expected {
    /// The image that solves them.
    pub image: String,
    /// As the chip gets them: the lengths of each foot on the body's frame.
    targets: Vec<[u32; 3]>,
    answers: Vec<[u32; WORDS]>,
    leg: robot::LegWords,
}

/// Words for a chip's memory.
struct Memory(Vec<u32>);

impl Writer for Memory {
    fn word(&mut self, word: u32) {
        self.0.push(word);
    }
}

/// The leg and targets (leg frame, mm) in the number system of this name.
///
/// # Errors
/// What ik-core refuses, or that there is no such number system.
pub fn expected(leg: &Leg, number: &str, targets: &[[f64; 3]]) -> Result<Expected, String> {
    match number {
        "float32" => in_number::<Float32>(leg, number, targets),
        "coarse" => in_number::<Coarse>(leg, number, targets),
        "fixed32" => in_number::<Fixed32>(leg, number, targets),
        "short32" => in_number::<Short32>(leg, number, targets),
        "fixed16" => in_number::<Fixed16>(leg, number, targets),
        _ => Err(format!("robot-cost knows no number system {number}")),
    }
}

/// The host has room for any servo: how much there is changes no answer.
type Channels<N> = [Channel<N, 14>; 3];

fn in_number<N: Bits>(leg: &Leg, number: &str, targets: &[[f64; 3]]) -> Result<Expected, String> {
    match (leg.hip, leg.parallelogram) {
        (Hip::Roll, false) => solved::<RollHip, N, Channels<N>>(leg, number, targets),
        (Hip::Roll, true) => solved::<RollHip, N, Parallelogram<Channel<N, 14>>>(leg, number, targets),
        (Hip::Yaw, false) => solved::<YawHip, N, Channels<N>>(leg, number, targets),
        (Hip::Yaw, true) => solved::<YawHip, N, Parallelogram<Channel<N, 14>>>(leg, number, targets),
    }
}

fn solved<H: BuildHip, N: Bits, D: BuildDrive<N>>(
    leg: &Leg,
    number: &str,
    targets: &[[f64; 3]],
) -> Result<Expected, String> {
    let words = leg.words();
    let limb = words.limb::<H, N, D>()?;
    let targets: Vec<[u32; 3]> = targets
        .iter()
        .map(|&[x, y, z]| {
            // Targets are given as the leg sees them; a gait would give them on the body's frame.
            let foot = limb.mounting.body_frame(Foot::<N>::from_mm(x, y, z));
            foot.lengths().map(N::length_bits)
        })
        .collect();
    let mut last = None;
    let answers = targets
        .iter()
        .map(|&target| {
            let answered = answer(&limb, &ask(target, last.as_ref()));
            last = Some(answered);
            answered.words()
        })
        .collect();
    Ok(Expected { image: format!("{number}-{}", H::WORD), targets, answers, leg: words })
}

impl Expected {
    /// What is to lie in the chip's memory, so that the answers to the targets `tell` are logged in full.
    pub fn memory(&self, tell: [u32; 2]) -> Vec<u8> {
        let mut memory = Memory(Vec::new());
        Header { targets: self.targets.len() as u32, tell }.write(&mut memory);
        self.leg.write(&mut memory);
        assert!(memory.0.len() <= TARGETS_AT, "a test of the layout holds this");
        memory.0.resize(TARGETS_AT, 0);
        memory.0.extend(self.targets.iter().flatten());
        memory.0.into_iter().flat_map(u32::to_le_bytes).collect()
    }

    /// How many targets there are.
    pub fn targets(&self) -> usize {
        self.targets.len()
    }

    /// The digests that the image has to log.
    pub fn digests(&self) -> Vec<String> {
        let mut blocks = Blocks::new();
        let all = self.answers.len() as u32;
        (0..)
            .zip(&self.answers)
            .filter_map(|(number, answer)| Some(told_digest(number, blocks.take(*answer, all)?)))
            .collect()
    }

    /// The targets that the digest at this place was the first to take in.
    pub fn block(&self, place: usize) -> [u32; 2] {
        let first = place as u32 * robot::BLOCK;
        [first, (first + robot::BLOCK).min(self.targets.len() as u32)]
    }

    /// The answer that the image has to log for a target.
    pub fn told(&self, number: u32) -> String {
        told_answer(number, &self.answers[number as usize])
    }

    /// Makes the expected answer to a target wrong by one bit of one joint.
    pub fn spoil(&mut self, number: u32) {
        if let Some(answer) = self.answers.get_mut(number as usize) {
            answer[2] ^= 1;
        }
    }
}

/// As in `robot-image/src/lib.rs`.
fn told_digest(number: u32, digest: u32) -> String {
    format!("to {number}: {digest:08x}")
}

fn told_answer(number: u32, words: &[u32; WORDS]) -> String {
    format!("answer {number}: {words:?}")
}

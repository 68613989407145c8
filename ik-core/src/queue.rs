//! Foot targets on their way from the main loop to the frame interrupt, without locks.

use crate::foot::Foot;
use crate::number::Number;
use heapless::spsc::{Consumer, Producer, Queue};

/// The feet of one frame.
pub type Feet<N, const LEGS: usize> = [Foot<N>; LEGS];

/// A queue of `SLOTS` − 1 frames' feet between one sender and one receiver.
///
/// ```
/// # #[cfg(feature = "fixed32")] {
/// use ik_core::queue::FootQueue;
/// use ik_core::{Fixed32, Foot};
///
/// let mut queue = FootQueue::<Fixed32, 1, 4>::new();
/// let (mut planner, mut frame) = queue.split();
/// assert_eq!(frame.next(), None); // nothing was ever asked for
/// planner.send([Foot::from_mm(0.0, 31.5, -160.0)]).unwrap();
/// assert!(frame.next().is_some());
/// assert!(frame.next().is_some()); // the queue is empty: the last feet stand
/// assert!(frame.fresh().is_none()); // but they are not new
/// # }
/// ```
#[derive(Debug)]
pub struct FootQueue<N: Number, const LEGS: usize, const SLOTS: usize>(Queue<Feet<N, LEGS>, SLOTS>);

impl<N: Number, const LEGS: usize, const SLOTS: usize> FootQueue<N, LEGS, SLOTS> {
    /// An empty queue; `const`, so that it can be a `static`.
    pub const fn new() -> Self {
        Self(Queue::new())
    }

    /// The two ends: one for the main loop, one for the frame interrupt.
    pub fn split(&mut self) -> (FootSender<'_, N, LEGS>, FootReceiver<'_, N, LEGS>) {
        let (sender, receiver) = self.0.split();
        (FootSender(sender), FootReceiver { receiver, last: None })
    }
}

impl<N: Number, const LEGS: usize, const SLOTS: usize> Default for FootQueue<N, LEGS, SLOTS> {
    fn default() -> Self {
        Self::new()
    }
}

/// The planner's end.
pub struct FootSender<'a, N: Number, const LEGS: usize>(Producer<'a, Feet<N, LEGS>>);

impl<N: Number, const LEGS: usize> FootSender<'_, N, LEGS> {
    /// Queues the feet of a frame.
    ///
    /// # Errors
    /// Gives them back if the queue is full.
    pub fn send(&mut self, feet: Feet<N, LEGS>) -> Result<(), Feet<N, LEGS>> {
        self.0.enqueue(feet)
    }

    /// Whether there is room for another frame.
    pub fn ready(&self) -> bool {
        self.0.ready()
    }
}

/// The frame interrupt's end.
pub struct FootReceiver<'a, N: Number, const LEGS: usize> {
    receiver: Consumer<'a, Feet<N, LEGS>>,
    last: Option<Feet<N, LEGS>>,
}

impl<N: Number, const LEGS: usize> FootReceiver<'_, N, LEGS> {
    /// The feet of this frame: the next in the queue, or the last ones again if it is empty; `None` before the
    /// first.
    #[expect(clippy::should_implement_trait, reason = "it never ends, and the word is the trade's")]
    pub fn next(&mut self) -> Option<Feet<N, LEGS>> {
        if let Some(feet) = self.receiver.dequeue() {
            self.last = Some(feet);
        }
        self.last
    }

    /// The feet of this frame if they are new: the next in the queue, `None` if it is empty. For
    /// [`frame safety`](crate::frame), which knows what to do without new ones.
    pub fn fresh(&mut self) -> Option<Feet<N, LEGS>> {
        let fresh = self.receiver.dequeue();
        self.last = fresh.or(self.last);
        fresh
    }
}

//! One servo on a PWM channel.

use crate::output::{Counting, OutputError};
use crate::servo::Pulse;
use embedded_hal::pwm::SetDutyCycle;

/// A servo on any PWM channel of known period.
///
/// ```
/// # use core::convert::Infallible;
/// use embedded_hal::pwm::SetDutyCycle;
/// use ik_core::Pulse;
/// use ik_core::output::hal::PwmServo;
/// # struct Channel(u16);
/// # impl embedded_hal::pwm::ErrorType for Channel { type Error = Infallible; }
/// # impl SetDutyCycle for Channel {
/// #     fn max_duty_cycle(&self) -> u16 { 64_000 }
/// #     fn set_duty_cycle(&mut self, duty: u16) -> Result<(), Infallible> { self.0 = duty; Ok(()) }
/// # }
///
/// # fn main() -> Result<(), Box<dyn core::error::Error>> {
/// # let channel = Channel(0);
/// // A channel whose timer has a period of 20 ms.
/// let mut servo = PwmServo::new(channel, 20_000_000)?;
/// servo.send(Pulse::from_us(1500.0))?;
/// assert_eq!(servo.sent(), Some(4800));
/// servo.release()?;
/// assert_eq!(servo.sent(), None);
/// # Ok(())
/// # }
/// ```
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
#[cfg_attr(feature = "defmt", derive(defmt::Format))]
pub struct PwmServo<P> {
    pwm: P,
    counting: Counting,
    sent: Option<u16>,
}

impl<P: SetDutyCycle> PwmServo<P> {
    /// A servo on a channel of that period, in nanoseconds. Nothing is sent yet.
    ///
    /// The period is what the timer really makes, not what was asked of it: [`Timer::frame_us`](crate::output::Output::frame_us)
    /// tells.
    ///
    /// # Errors
    /// If the channel's whole duty is below 256, or the period not 2 µs to 1 s.
    pub fn new(pwm: P, period_ns: u32) -> Result<Self, OutputError> {
        let counting = Counting::of_duty(pwm.max_duty_cycle(), period_ns)?;
        Ok(Self { pwm, counting, sent: None })
    }

    /// How the channel counts: what a [`Channel`](crate::Channel) is made for, so that [`send_counts`](Self::send_counts)
    /// can be used.
    pub const fn counting(&self) -> Counting {
        self.counting
    }

    /// Sends a pulse, to the nearest count; held at the whole of the period.
    ///
    /// # Errors
    /// What the channel says; what was sent before is then still what [`sent`](Self::sent) tells.
    pub fn send(&mut self, pulse: Pulse) -> Result<(), P::Error> {
        self.send_counts(self.counting.counts(pulse))
    }

    /// Sends counts, as a [`Channel`](crate::Channel) made for [`counting`](Self::counting) gives them; held at the whole
    /// of the period.
    ///
    /// # Errors
    /// What the channel says; what was sent before is then still what [`sent`](Self::sent) tells.
    pub fn send_counts(&mut self, counts: u32) -> Result<(), P::Error> {
        let duty = counts.min(self.counting.most_counts()) as u16;
        self.pwm.set_duty_cycle(duty)?;
        self.sent = (duty > 0).then_some(duty);
        Ok(())
    }

    /// Sends no pulse any more; most servos then let go of their joint, and the leg may fall.
    ///
    /// # Errors
    /// What the channel says.
    pub fn release(&mut self) -> Result<(), P::Error> {
        self.send_counts(0)
    }

    /// What the channel last took, in counts; `None` if that was nothing, or no pulse.
    pub const fn sent(&self) -> Option<u16> {
        self.sent
    }

    /// The channel.
    pub fn into_inner(self) -> P {
        self.pwm
    }
}

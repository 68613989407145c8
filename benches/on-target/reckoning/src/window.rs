//! Adds up what is executed between two markers.

use std::collections::BTreeMap;

use serde::{Deserialize, Serialize};

use crate::{core::Core, decode::Decoded, kind::Kind};

/// An instruction at its place.
#[derive(Debug, Clone, Copy)]
pub struct Step {
    /// Its address.
    pub address: u64,
    /// What it is.
    pub decoded: Decoded,
}

impl Step {
    fn following(&self) -> u64 {
        self.address + u64::from(self.decoded.length)
    }
}

/// What was executed between an opening and a closing marker, without the markers.
#[derive(Debug, Clone, Default, PartialEq, Eq, Serialize, Deserialize)]
pub struct Window {
    /// Instructions executed. One whose condition failed counts: it takes its cycle.
    pub instructions: u64,
    /// How often the next instruction was not the one that follows in memory.
    pub jumps: u64,
    /// From, to: estimated from published tables, zero wait states, not measured on silicon.
    pub cycles: [u64; 2],
    /// Bytes between the stack pointer at the opening marker and the lowest byte stored below it.
    pub stack: u64,
    /// Instructions by kind.
    pub kinds: BTreeMap<Kind, u64>,
    /// Where the first instruction of unknown kind stands, if there was one.
    pub unknown_at: Option<u64>,
}

/// All windows of a run.
#[derive(Debug)]
pub struct Windows {
    core: Core,
    closed: Vec<Window>,
    open: Option<Open>,
    /// Where the last store outside of a window went. Images store a word at the stack pointer just before they
    /// open one.
    last_store: u64,
}

#[derive(Debug)]
struct Open {
    window: Window,
    stack_pointer: u64,
    lowest_store: u64,
    next_address: u64,
    after_access: bool,
}

impl Windows {
    /// None yet.
    pub fn new(core: Core) -> Self {
        Self { core, closed: Vec::new(), open: None, last_store: u64::MAX }
    }

    /// Those that were opened and closed.
    pub fn closed(&self) -> &[Window] {
        &self.closed
    }

    /// An instruction is about to be executed.
    pub fn execute(&mut self, step: Step) {
        if step.decoded.kind == Kind::OpeningMarker {
            self.open = Some(Open {
                window: Window::default(),
                stack_pointer: self.last_store,
                lowest_store: self.last_store,
                next_address: step.following(),
                after_access: false,
            });
            return;
        }
        let Some(open) = &mut self.open else { return };
        if step.address != open.next_address {
            open.window.jumps += 1;
            open.add(self.core.jump());
        }
        if step.decoded.kind == Kind::ClosingMarker {
            if let Some(mut open) = self.open.take() {
                open.window.stack = open.stack_pointer - open.lowest_store;
                open.window.cycles = self.core.overlapped(open.window.cycles, open.window.instructions);
                self.closed.push(open.window);
            }
            return;
        }
        open.add(self.core.cycles(step.decoded, open.after_access));
        open.window.instructions += 1;
        *open.window.kinds.entry(step.decoded.kind).or_default() += 1;
        if step.decoded.kind == Kind::Unknown {
            open.window.unknown_at.get_or_insert(step.address);
        }
        open.next_address = step.following();
        open.after_access = matches!(step.decoded.kind, Kind::Load | Kind::Store);
    }

    /// A word or less is stored.
    pub fn store(&mut self, address: u64) {
        match &mut self.open {
            Some(open) => open.lowest_store = open.lowest_store.min(address),
            None => self.last_store = address,
        }
    }
}

impl Open {
    fn add(&mut self, [least, most]: [u64; 2]) {
        self.window.cycles[0] += least;
        self.window.cycles[1] += most;
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Runs instructions of two bytes each, at the given addresses.
    fn run(windows: &mut Windows, steps: &[(u64, Kind)]) {
        for &(address, kind) in steps {
            windows.execute(Step { address, decoded: Decoded { kind, words: 0, length: 2 } });
        }
    }

    #[test]
    fn counts_what_lies_between_the_markers_and_nothing_else() {
        let mut windows = Windows::new(Core::M3);
        run(
            &mut windows,
            &[
                (0x10, Kind::Simple),
                (0x12, Kind::OpeningMarker),
                (0x14, Kind::Load),
                (0x16, Kind::Load),
                (0x18, Kind::Branch),
                (0x40, Kind::Multiply),
                (0x42, Kind::ClosingMarker),
                (0x44, Kind::Simple),
            ],
        );
        let [window] = windows.closed() else { panic!("one window") };
        assert_eq!((window.instructions, window.jumps), (4, 1));
        assert_eq!(window.kinds, [(Kind::Load, 2), (Kind::Branch, 1), (Kind::Multiply, 1)].into());
        // Loads 2 and 1 to 2, branch 1, refill 1 to 3, multiply 1.
        assert_eq!(window.cycles, [6, 9]);
        assert_eq!(window.unknown_at, None);
    }

    #[test]
    fn a_jump_to_the_closing_marker_counts() {
        let mut windows = Windows::new(Core::M0);
        run(
            &mut windows,
            &[
                (0x10, Kind::OpeningMarker),
                (0x12, Kind::Exchange),
                (0x80, Kind::Exchange),
                (0x14, Kind::ClosingMarker),
            ],
        );
        let [window] = windows.closed() else { panic!("one window") };
        assert_eq!((window.instructions, window.jumps, window.cycles), (2, 2, [6, 6]));
    }

    #[test]
    fn the_stack_is_the_lowest_store_below_the_last_one_before_the_window() {
        let mut windows = Windows::new(Core::M3);
        windows.store(0x2000_0ff0);
        windows.store(0x2000_1000);
        run(&mut windows, &[(0x10, Kind::OpeningMarker), (0x12, Kind::Store)]);
        for address in [0x2000_0ff8, 0x2000_0fd0, 0x2000_1010] {
            windows.store(address);
        }
        run(&mut windows, &[(0x14, Kind::ClosingMarker)]);
        windows.store(0x2000_0000);
        assert_eq!(windows.closed()[0].stack, 0x30);
    }

    #[test]
    fn a_window_that_stores_nothing_below_takes_no_stack() {
        let mut windows = Windows::new(Core::M3);
        windows.store(0x2000_1000);
        run(&mut windows, &[(0x10, Kind::OpeningMarker)]);
        windows.store(0x2000_2000);
        run(&mut windows, &[(0x12, Kind::ClosingMarker)]);
        assert_eq!(windows.closed()[0].stack, 0);
    }

    #[test]
    fn the_first_unknown_instruction_is_named() {
        let mut windows = Windows::new(Core::M4f);
        run(
            &mut windows,
            &[
                (0x10, Kind::Unknown),
                (0x12, Kind::OpeningMarker),
                (0x14, Kind::Unknown),
                (0x16, Kind::Unknown),
                (0x18, Kind::ClosingMarker),
            ],
        );
        assert_eq!(windows.closed()[0].unknown_at, Some(0x14));
    }

    #[test]
    fn a_window_that_is_never_closed_is_none() {
        let mut windows = Windows::new(Core::M3);
        run(&mut windows, &[(0x10, Kind::OpeningMarker), (0x12, Kind::Simple)]);
        assert!(windows.closed().is_empty());
    }
}

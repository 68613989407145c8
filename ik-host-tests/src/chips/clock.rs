//! The clock of a chip.

use std::collections::BTreeMap;
use std::ops::RangeInclusive;
use std::str::FromStr;

/// A clock that the user names, for one class or for all.
#[derive(Debug, Clone, PartialEq)]
pub struct Clock {
    class: Option<String>,
    hz: f64,
}

/// Of all classes.
#[derive(Debug, Clone, PartialEq, Default)]
pub struct Clocks {
    all: Option<f64>,
    of_class: BTreeMap<String, f64>,
}

const RANGE_HZ: RangeInclusive<f64> = 1e3..=1e10;

impl FromStr for Clock {
    type Err = String;

    fn from_str(text: &str) -> Result<Self, String> {
        let (class, frequency) = match text.split_once('=') {
            Some((class, frequency)) => (Some(class.trim().to_owned()), frequency.trim()),
            None => (None, text.trim()),
        };
        let units = [("MHz", 1e6), ("kHz", 1e3), ("GHz", 1e9), ("Hz", 1.0)];
        let (number, unit) = units
            .iter()
            .find_map(|(name, unit)| Some((frequency.strip_suffix(name)?.trim_end(), *unit)))
            .unwrap_or((frequency, 1.0));
        let hz = number.replace('_', "").parse::<f64>().map_or(f64::NAN, |number| number * unit);
        if RANGE_HZ.contains(&hz) {
            Ok(Self { class, hz })
        } else {
            Err(format!(
                "{frequency:?} is no clock from 1kHz to 10GHz; 64MHz would be, or m3=72MHz for one class"
            ))
        }
    }
}

impl Clocks {
    /// The clocks that were named: what is named for a class goes before what is named for all.
    ///
    /// # Errors
    /// If a class is none of those `known`.
    pub fn of(named: &[Clock], known: &[&str]) -> Result<Self, String> {
        let mut clocks = Self::default();
        for Clock { class, hz } in named {
            match class {
                None => clocks.all = Some(*hz),
                Some(class) if known.contains(&class.as_str()) => {
                    clocks.of_class.insert(class.clone(), *hz);
                }
                Some(class) => {
                    return Err(format!("--clock {class}=...: the classes are {}", known.join(", ")));
                }
            }
        }
        Ok(clocks)
    }

    pub(super) fn hz(&self, class: &str, usual: f64) -> f64 {
        self.of_class.get(class).copied().or(self.all).unwrap_or(usual)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_clock_is_a_frequency_for_one_class_or_all() {
        let hz = |text: &str| text.parse::<Clock>().map(|clock| clock.hz);
        assert_eq!(hz("64MHz"), Ok(64e6));
        assert_eq!(hz("64_000_000"), Ok(64e6));
        assert_eq!(hz("m0=32.768 kHz"), Ok(32_768.0));
        for wrong in ["", "fast", "64 miles", "0", "-1MHz", "NaN", "inf", "1e12"] {
            assert!(hz(wrong).unwrap_err().contains("64MHz would be"), "{wrong}");
        }
        let named = ["64MHz", "m3=72MHz"].map(|text| text.parse().unwrap());
        let clocks = Clocks::of(&named, &["m0", "m3"]).unwrap();
        assert_eq!([clocks.hz("m0", 1.0), clocks.hz("m3", 1.0)], [64e6, 72e6]);
        assert_eq!(Clocks::default().hz("m0", 48e6), 48e6);
        assert!(Clocks::of(&["m9=1MHz".parse().unwrap()], &["m0"]).unwrap_err().contains("m9"));
    }
}

//! Numbers for people.

/// A length or error in mm with three significant digits: `0.0124`, `1.82`, `2.1e-5`.
pub fn millimetres(mm: f64) -> String {
    significant(mm)
}

/// Three significant digits; a power of ten below a thousandth.
pub(super) fn significant(value: f64) -> String {
    let size = value.abs();
    if size == 0.0 {
        "0".into()
    } else if !(1e-3..1e6).contains(&size) {
        format!("{value:.1e}")
    } else {
        let digits = (2 - size.log10().floor() as i32).max(0) as usize;
        format!("{value:.digits$}")
    }
}

/// A foot as x, y, z in mm.
pub(super) fn foot([x, y, z]: [f64; 3]) -> String {
    format!("({x:.3}, {y:.3}, {z:.3})")
}

/// A whole number with its thousands apart.
pub(super) fn count(number: u64) -> String {
    let digits = number.to_string();
    let mut out = String::new();
    for (place, digit) in digits.chars().enumerate() {
        if place > 0 && (digits.len() - place).is_multiple_of(3) {
            out.push(' ');
        }
        out.push(digit);
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_read_well() {
        let shown = [0.0, 2.13e-5, 0.00123, 0.0124, 1.816, 48.5, 123.4, 1e7].map(millimetres);
        assert_eq!(shown, ["0", "2.1e-5", "0.00123", "0.0124", "1.82", "48.5", "123", "1.0e7"]);
        assert_eq!([0, 999, 1000, 12_345_678].map(count), ["0", "999", "1 000", "12 345 678"]);
    }
}

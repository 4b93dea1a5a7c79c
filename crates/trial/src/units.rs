//! Figures for people.

/// A time in the unit that suits it, three digits: `412 ns`, `7.06 ms`.
#[must_use]
pub fn time(nanoseconds: f64) -> String {
    let (value, unit) = match nanoseconds {
        t if t >= 999.5e6 => (t / 1e9, "s"),
        t if t >= 999.5e3 => (t / 1e6, "ms"),
        t if t >= 999.5 => (t / 1e3, "µs"),
        t => (t, "ns"),
    };
    format!("{} {unit}", three_digits(value))
}

/// Bytes in the unit that suits them, powers of 1024: `1.50 MiB`.
#[must_use]
pub fn bytes(count: usize) -> String {
    let count = count as f64;
    let (value, unit) = match count {
        b if b >= 999.5 * 1024.0 * 1024.0 => (b / 1024.0_f64.powi(3), "GiB"),
        b if b >= 999.5 * 1024.0 => (b / 1024.0_f64.powi(2), "MiB"),
        b if b >= 1000.0 => (b / 1024.0, "KiB"),
        b => return format!("{b} B"),
    };
    format!("{} {unit}", three_digits(value))
}

/// A number of at least three digits: `1234`, `12.3`, `0.0123`.
#[must_use]
pub fn three_digits(value: f64) -> String {
    let decimals = match value.abs() {
        v if v >= 99.95 => 0,
        v if v >= 9.995 => 1,
        v if v >= 0.9995 || v == 0.0 => 2,
        v if v >= 0.09995 => 3,
        _ => 4,
    };
    format!("{value:.decimals$}")
}

/// A whole number in groups of three: `1,310,720`.
#[must_use]
pub fn grouped(number: u64) -> String {
    let digits = number.to_string();
    let mut text = String::with_capacity(digits.len() + digits.len() / 3);
    for (i, digit) in digits.chars().enumerate() {
        if i > 0 && (digits.len() - i).is_multiple_of(3) {
            text.push(',');
        }
        text.push(digit);
    }
    text
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn units_change_where_digits_would_be_lost() {
        for (nanoseconds, text) in [
            (0.0, "0.00 ns"),
            (0.5, "0.500 ns"),
            (999.4, "999 ns"),
            (999.6, "1.00 µs"),
            (12_345.0, "12.3 µs"),
            (999_600.0, "1.00 ms"),
            (7.0615e6, "7.06 ms"),
            (9.996e6, "10.0 ms"),
            (61.25e9, "61.2 s"),
            (4.0e12, "4000 s"),
        ] {
            assert_eq!(time(nanoseconds), text);
        }
        for (count, text) in [
            (0, "0 B"),
            (999, "999 B"),
            (1024, "1.00 KiB"),
            (1_572_864, "1.50 MiB"),
            (3 << 30, "3.00 GiB"),
        ] {
            assert_eq!(bytes(count), text);
        }
        for (number, text) in [(0, "0"), (999, "999"), (1000, "1,000"), (1_310_720, "1,310,720")] {
            assert_eq!(grouped(number), text);
        }
    }
}

//! Numbers in fixed columns, without allocation.

const TENS: [f64; 16] = [
    1e0, 1e1, 1e2, 1e3, 1e4, 1e5, 1e6, 1e7, 1e8, 1e9, 1e10, 1e11, 1e12, 1e13, 1e14, 1e15,
];

/// Bytes `from..to` of a line, fewer where the line is shorter.
pub(super) fn field(line: &str, from: usize, to: usize) -> &[u8] {
    let bytes = line.as_bytes();
    let to = to.min(bytes.len());
    bytes.get(from.min(to)..to).unwrap_or_default()
}

fn trimmed(mut field: &[u8]) -> &[u8] {
    while let [b' ', rest @ ..] = field {
        field = rest;
    }
    while let [rest @ .., b' '] = field {
        field = rest;
    }
    field
}

/// A whole number with blanks around it; 0 for blanks alone; `None` for anything else.
pub(super) fn integer(field: &[u8]) -> Option<i32> {
    let digits = trimmed(field);
    if digits.is_empty() {
        return Some(0);
    }
    let (negative, digits) = match digits {
        [b'-', rest @ ..] => (true, rest),
        [b'+', rest @ ..] => (false, rest),
        _ => (false, digits),
    };
    if digits.is_empty() || digits.len() > 9 {
        return None;
    }
    let mut value = 0i32;
    for d in digits {
        if !d.is_ascii_digit() {
            return None;
        }
        value = value * 10 + i32::from(d - b'0');
    }
    Some(if negative { -value } else { value })
}

/// A finite decimal number with blanks around it.
pub(super) fn decimal(field: &[u8]) -> Option<f64> {
    if let Some(value) = field.try_into().ok().and_then(ten_point_four) {
        return Some(value);
    }
    let text = trimmed(field);
    let (negative, digits) = match text {
        [b'-', rest @ ..] => (true, rest),
        [b'+', rest @ ..] => (false, rest),
        _ => (false, text),
    };
    let mut mantissa = 0u64;
    let mut after_point = None;
    for d in digits {
        match d {
            b'0'..=b'9' => {
                mantissa = mantissa.wrapping_mul(10).wrapping_add(u64::from(d - b'0'));
                after_point = after_point.map(|n: usize| n + 1);
            }
            b'.' if after_point.is_none() => after_point = Some(0),
            _ => return general(text),
        }
    }
    // up to 15 digits and a power of ten are both exact, so the quotient is rounded once
    if digits.len() > 16 || !digits.iter().any(u8::is_ascii_digit) {
        return general(text);
    }
    let divisor = TENS.get(after_point.unwrap_or(0))?;
    let value = mantissa as f64 / divisor;
    Some(if negative { -value } else { value })
}

/// A number as coordinates are written: five columns, the point, four decimals. Most of a file is these.
fn ten_point_four(field: &[u8; 10]) -> Option<f64> {
    let digit = |b: u8| Some(b.wrapping_sub(b'0')).filter(|d| *d < 10);
    if field[5] != b'.' {
        return None;
    }
    let mut mantissa = 0u32;
    let mut negative = false;
    let mut started = false;
    for b in &field[..5] {
        match b {
            b' ' if !started => {}
            b'-' if !started => (negative, started) = (true, true),
            _ => {
                started = true;
                mantissa = 10 * mantissa + u32::from(digit(*b)?);
            }
        }
    }
    // a digit stands before the point
    digit(field[4])?;
    for b in &field[6..] {
        mantissa = 10 * mantissa + u32::from(digit(*b)?);
    }
    let value = f64::from(mantissa) / 1e4;
    Some(if negative { -value } else { value })
}

/// Exponents and very long numbers; words like `inf` are no numbers here.
fn general(text: &[u8]) -> Option<f64> {
    let allowed = |b: &u8| matches!(b, b'0'..=b'9' | b'.' | b'-' | b'+' | b'e' | b'E');
    if !text.iter().all(allowed) {
        return None;
    }
    let value: f64 = std::str::from_utf8(text).ok()?.parse().ok()?;
    value.is_finite().then_some(value)
}

/// The words of a line, each with the byte it starts at.
pub(super) fn words(line: &str) -> impl Iterator<Item = (usize, &str)> {
    line.split_ascii_whitespace()
        .map(move |word| (word.as_ptr() as usize - line.as_ptr() as usize, word))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn whole_numbers() {
        let cases: [(&[u8], Option<i32>); 8] = [
            (b"  7", Some(7)),
            (b"100", Some(100)),
            (b"   ", Some(0)),
            (b" -1", Some(-1)),
            (b"7  ", Some(7)),
            (b"1 2", None),
            (b" x ", None),
            (b" - ", None),
        ];
        for (text, value) in cases {
            assert_eq!(integer(text), value, "{text:?}");
        }
    }

    #[test]
    fn decimal_numbers_are_those_of_the_standard_parser() {
        for text in ["    0.0000", "   -0.7165", "-9999.9999", "99999.9999"] {
            let value = decimal(text.as_bytes()).unwrap();
            assert_eq!(
                value.to_bits(),
                text.trim().parse::<f64>().unwrap().to_bits()
            );
        }
        for text in ["   1 .0000", "  - 1.0000", "   --.0000", "    -.0000"] {
            let standard = text.trim().parse::<f64>().ok();
            assert_eq!(decimal(text.as_bytes()), standard, "{text}");
        }
        for text in [
            "0.0000",
            "-0.7165",
            "12.3456",
            "99999.9999",
            "-9999.9999",
            "5",
            "1e-3",
            ".5",
            "5.",
            "0.000000001",
            "123456789.123456789123",
            "+1.25",
        ] {
            let padded = format!("  {text} ");
            let value = decimal(padded.as_bytes()).unwrap();
            assert_eq!(
                value.to_bits(),
                text.parse::<f64>().unwrap().to_bits(),
                "{text}"
            );
        }
        for text in [
            "", "  ", "-", ".", "1 2", "nan", "inf", "1e999", "0x1", "1.2.3",
        ] {
            assert_eq!(decimal(text.as_bytes()), None, "{text}");
        }
    }

    #[test]
    fn words_know_their_place() {
        let list: Vec<_> = words(" a\tbc ").collect();
        assert_eq!(list, [(1, "a"), (3, "bc")]);
    }
}

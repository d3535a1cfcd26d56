//! Figures with a fixed number of decimals, written without a formatter's cost and never as -0.00.

/// Appends `value` with `decimals` decimals (0 to 9), rounded half away from zero.
///
/// Range: magnitudes under 1e9. Not-a-number and larger magnitudes append nothing: a blank cell is honest, a wrong one is not.
pub fn push_fixed(out: &mut Vec<u8>, value: f64, decimals: u8) {
    let scale = 10_u64.pow(u32::from(decimals.min(9)));
    if value.is_nan() || value.abs() >= 1e9 {
        return;
    }
    let scaled = (value.abs() * scale as f64).round() as u64;
    if value < 0.0 && scaled != 0 {
        out.push(b'-');
    }
    push_digits(out, scaled / scale, 1);
    if decimals > 0 {
        out.push(b'.');
        push_digits(out, scaled % scale, usize::from(decimals.min(9)));
    }
}

/// Appends a direction: rounded first and brought into the circle second, so that 359.9996 is 0.000 and never 360.000.
pub fn push_direction(out: &mut Vec<u8>, deg: f64, decimals: u8) {
    let scale = 10_f64.powi(i32::from(decimals));
    let rounded = (deg * scale).round() / scale;
    push_fixed(out, if rounded >= 360.0 { rounded - 360.0 } else { rounded }, decimals);
}

/// Appends `number` with at least `width` digits.
fn push_digits(out: &mut Vec<u8>, mut number: u64, width: usize) {
    let mut digits = [b'0'; 20];
    let mut first = digits.len();
    while number > 0 || digits.len() - first < width {
        first -= 1;
        if let Some(digit) = digits.get_mut(first) {
            *digit = b'0' + (number % 10) as u8;
        }
        number /= 10;
    }
    out.extend_from_slice(digits.get(first..).unwrap_or_default());
}

#[cfg(test)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn fixed(value: f64, decimals: u8) -> String {
        let mut out = Vec::new();
        push_fixed(&mut out, value, decimals);
        String::from_utf8(out).unwrap()
    }

    fn direction(deg: f64, decimals: u8) -> String {
        let mut out = Vec::new();
        push_direction(&mut out, deg, decimals);
        String::from_utf8(out).unwrap()
    }

    #[test]
    fn seams() {
        assert_eq!(fixed(-0.001, 2), "0.00");
        assert_eq!(fixed(-0.5, 2), "-0.50");
        assert_eq!(fixed(0.05, 1), "0.1");
        assert_eq!(fixed(12.0, 0), "12");
        assert_eq!(fixed(f64::NAN, 2), "");
        assert_eq!(direction(359.9996, 3), "0.000");
        assert_eq!(direction(359.9994, 3), "359.999");
    }

    proptest! {
        #[test]
        fn reads_back(value in -400.0_f64..400.0, decimals in 0_u8..=4) {
            let back: f64 = fixed(value, decimals).parse().unwrap();
            prop_assert!((back - value).abs() <= 0.500_001 / 10_f64.powi(i32::from(decimals)));
        }
    }
}

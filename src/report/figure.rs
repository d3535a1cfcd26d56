//! Single figures as they are printed.

/// A signed error by its name: `1.5 E`, `0.3 W`, and `0.0` for nil.
pub(crate) fn east_west(deg: f64, decimals: usize) -> String {
    let figure = format!("{:.decimals$}", deg.abs());
    if figure.bytes().all(|b| matches!(b, b'0' | b'.')) { figure } else { format!("{figure} {}", if deg < 0.0 { "W" } else { "E" }) }
}

/// A signed figure: `+1.50`, `-0.30`, and `0.00` for nil.
pub(crate) fn signed(x: f64, decimals: usize) -> String {
    let figure = format!("{:.decimals$}", x.abs());
    if figure.bytes().all(|b| matches!(b, b'0' | b'.')) { figure } else { format!("{}{figure}", if x < 0.0 { '-' } else { '+' }) }
}

/// For JSON and CSV: four decimals, never -0.
pub(crate) fn round4(x: f64) -> f64 {
    (x * 1e4).round() / 1e4 + 0.0
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nil_has_neither_name_nor_sign() {
        assert_eq!((east_west(-0.04, 1), east_west(-1.25, 1), east_west(0.05, 2)), ("0.0".into(), "1.2 W".into(), "0.05 E".into()));
        assert_eq!((signed(-0.004, 2), signed(1.5, 2), signed(-1.5, 1)), ("0.00".into(), "+1.50".into(), "-1.5".into()));
        assert!(round4(-0.000_01).is_sign_positive());
    }
}

//! The only two places where an angle is brought back into its circle.

/// The same direction in `0 <= x < 360`, degrees.
///
/// `rem_euclid` alone answers 360.0 for the smallest negative numbers; this never does, and never answers -0.
/// Undefined: not-a-number and infinities come back as not-a-number; readers of text refuse them before.
pub fn wrap_360_deg(deg: f64) -> f64 {
    // Nearly all come within a turn of the circle, where the remainder is an addition or nothing.
    let wrapped = if (0.0..360.0).contains(&deg) {
        deg
    } else if (-360.0..0.0).contains(&deg) {
        deg + 360.0
    } else {
        deg.rem_euclid(360.0)
    };
    if wrapped >= 360.0 { 0.0 } else { wrapped + 0.0 }
}

/// The same turn in `-180 < x <= 180`, degrees; never -0.
///
/// Undefined: as [`wrap_360_deg`].
pub fn wrap_180_deg(deg: f64) -> f64 {
    let wrapped = wrap_360_deg(deg);
    if wrapped > 180.0 { wrapped - 360.0 } else { wrapped }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn seams_are_closed() {
        assert_eq!(wrap_360_deg(360.0), 0.0);
        assert_eq!(wrap_360_deg(-1e-20), 0.0);
        assert!(wrap_360_deg(-0.0).is_sign_positive());
        assert_eq!(wrap_360_deg(-90.0), 270.0);
        assert_eq!(wrap_180_deg(180.0), 180.0);
        assert_eq!(wrap_180_deg(-180.0), 180.0);
        assert_eq!(wrap_180_deg(350.0), -10.0);
        assert_eq!(wrap_180_deg(540.0), 180.0);
    }
}

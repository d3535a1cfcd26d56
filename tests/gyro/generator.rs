//! Run-ups of our own making, seeded, each with its truth.

/// A small generator of numbers that are the same on every machine (splitmix64).
pub struct Rng(pub u64);

impl Rng {
    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }

    pub fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * (self.next() >> 11) as f64 / (1_u64 << 53) as f64
    }

    pub fn one_of<T: Copy>(&mut self, of: &[T]) -> T {
        of[(self.next() % of.len() as u64) as usize]
    }

    pub fn normal(&mut self) -> f64 {
        (0..12).map(|_| self.between(0.0, 1.0)).sum::<f64>() - 6.0
    }
}

/// What is put into a run-up beside its swing.
#[derive(Debug, Clone, Copy, Default)]
pub struct With {
    /// One reading is 2 to 12 degrees off.
    pub blunder: bool,
    /// Forty minutes without a reading.
    pub gap: bool,
}

/// A run-up and what it was made from.
pub struct Made {
    pub rows: Vec<(f64, f64)>,
    pub point: f64,
    pub period: f64,
    pub ratio: f64,
    /// Minutes from the first reading after which the swing, without noise, is never more than 0.7 degrees off its settle point.
    pub within_min: f64,
    /// Row of the blunder, from 1.
    pub blunder: Option<usize>,
}

/// Periods 60 to 120 minutes, ratios of half swings 0.2 to 0.6, first swings of 10 to 60 degrees, noise 0.1 to 0.3, readings each 5, 10 or
/// 15 minutes, to 0.1 degrees.
pub fn make(rng: &mut Rng, hours: f64, with: With) -> Made {
    let (point, period, ratio) = (rng.between(-1.5, 1.5), rng.between(60.0, 120.0), rng.between(0.2, 0.6));
    let (size, phase, noise) = (rng.between(10.0, 60.0), rng.between(-3.0, 3.0), rng.between(0.1, 0.3));
    let spacing = rng.one_of(&[5.0, 10.0, 15.0]);
    let k = -2.0 * f64::ln(ratio) / period;
    let off = |t: f64| size * (-k * t).exp() * (std::f64::consts::TAU * t / period + phase).cos();
    let mut rows: Vec<(f64, f64)> = (0..=(hours * 60.0 / spacing) as u32)
        .map(|i| f64::from(i) * spacing)
        .map(|t| (t, ((point + off(t) + noise * rng.normal()) * 10.0).round() / 10.0))
        .collect();
    if with.gap {
        let at = rng.between(20.0, hours * 60.0 - 60.0);
        rows.retain(|(t, _)| *t < at || *t > at + 40.0);
    }
    let blunder = with.blunder.then(|| {
        let at = (rng.next() % rows.len() as u64) as usize;
        rows[at].1 += rng.one_of(&[-1.0, 1.0]) * rng.between(2.0, 12.0);
        at + 1
    });
    let within_min = (0..20_000).map(|i| f64::from(i) / 10.0).filter(|t| off(*t).abs() > 0.7).fold(0.0, f64::max);
    Made { rows, point, period, ratio, within_min, blunder }
}

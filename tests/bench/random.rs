//! Random numbers that come out the same on every machine.

/// The step between two states: 2⁶⁴ over the golden ratio, made odd. Source: Steele, Lea & Flood
/// (2014), Fast splittable pseudorandom number generators.
const STEP: u64 = 0x9E37_79B9_7F4A_7C15;

/// A stream of random numbers: SplitMix64, whose output is a scrambled counter.
///
/// Streams with different seeds are independent for our purposes: each run of a simulation has its
/// own, so that runs may be done in any order.
#[derive(Clone, Debug)]
pub struct Random {
    state: u64,
    /// The second of a pair of normal numbers, kept for the next call.
    spare: Option<f64>,
}

impl Random {
    /// The stream of one run: `what` tells simulations apart, `run` the runs of one.
    pub fn of(what: u64, run: u64) -> Random {
        let start = scrambled(scrambled(what.wrapping_mul(STEP)) ^ run.wrapping_mul(STEP));
        Random { state: start, spare: None }
    }

    fn bits(&mut self) -> u64 {
        self.state = self.state.wrapping_add(STEP);
        scrambled(self.state)
    }

    /// Evenly between 0 (included) and 1 (not).
    pub fn unit(&mut self) -> f64 {
        (self.bits() >> 11) as f64 / (1u64 << 53) as f64
    }

    /// A standard normal number.
    ///
    /// # Formula
    /// ```text
    /// √(−2 ln u)·cos 2πv     √(−2 ln u)·sin 2πv
    /// ```
    /// for two even numbers u and v: Box & Muller (1958), Ann. Math. Stat. 29:610–611.
    pub fn normal(&mut self) -> f64 {
        if let Some(spare) = self.spare.take() {
            return spare;
        }
        let radius = (-2.0 * (1.0 - self.unit()).ln()).sqrt();
        let (sin, cos) = (std::f64::consts::TAU * self.unit()).sin_cos();
        self.spare = Some(radius * sin);
        radius * cos
    }
}

/// The finalizer of SplitMix64.
fn scrambled(mut x: u64) -> u64 {
    x = (x ^ (x >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
    x = (x ^ (x >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
    x ^ (x >> 31)
}

/// Source: the first outputs for seed 1234567 in the public reference implementation of SplitMix64
/// [from memory; two of them].
#[test]
fn the_stream_is_splitmix64() {
    let mut stream = Random { state: 1_234_567, spare: None };
    assert_eq!(stream.bits(), 6_457_827_717_110_365_317);
    assert_eq!(stream.bits(), 3_203_168_211_198_807_973);
}

/// Source: moments of the normal distribution, four standard errors allowed.
#[test]
fn normal_numbers_have_normal_moments() {
    const COUNT: u32 = 200_000;
    let (mut one, mut two, mut four, mut neighbours) = (0.0, 0.0, 0.0, 0.0);
    for run in 0..COUNT / 20 {
        let mut stream = Random::of(3, u64::from(run));
        let mut last = 0.0;
        for _ in 0..20 {
            let x = stream.normal();
            one += x;
            two += x * x;
            four += x * x * x * x;
            neighbours += x * last;
            last = x;
        }
    }
    let n = f64::from(COUNT);
    let allowed = |variance: f64| 4.0 * (variance / n).sqrt();
    assert!((one / n).abs() < allowed(1.0));
    assert!((two / n - 1.0).abs() < allowed(2.0));
    assert!((four / n - 3.0).abs() < allowed(96.0));
    assert!((neighbours / n).abs() < allowed(1.0));
}

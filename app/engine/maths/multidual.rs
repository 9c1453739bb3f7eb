//! Numbers with nilpotent parts: polynomials in a few symbols whose squares are zero. With them the expected value of a
//! product such as `X exp(Y)` is one coefficient of an exponential.

/// `sum over sets s of c_s e_s`, with `e_i e_i = 0`; at most four symbols. The coefficient of a set of symbols stands
/// where the set's bits say: `1`, `e_0`, `e_1`, `e_0 e_1`, `e_2`, ...
///
/// Source: hyper-dual numbers of Fike and Alonso, AIAA 2011-886 (from memory), with any number of symbols.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Multidual {
    symbols: u32,
    coefficients: [f64; 16],
}

impl Multidual {
    /// Zero, in this many symbols (0 to 4).
    pub fn zero(symbols: u32) -> Self {
        Self { symbols, coefficients: [0.0; 16] }
    }

    /// Adds `amount` to the coefficient of a set of symbols.
    pub fn add(&mut self, set: usize, amount: f64) {
        self.coefficients[set] += amount;
    }

    /// Coefficient of a set of symbols.
    pub fn at(&self, set: usize) -> f64 {
        self.coefficients[set]
    }

    /// Coefficient of the set of all symbols.
    pub fn top(&self) -> f64 {
        self.coefficients[self.sets() - 1]
    }

    /// `factor x self`.
    pub fn scaled(mut self, factor: f64) -> Self {
        self.coefficients.iter_mut().for_each(|c| *c *= factor);
        self
    }

    /// `exp(self)`.
    pub fn exp(&self) -> Self {
        let mut whole = self.exp_m1();
        whole.coefficients[0] = self.coefficients[0].exp();
        whole
    }

    /// `exp(self) - 1`, all digits kept for a small real part.
    pub fn exp_m1(&self) -> Self {
        if self.symbols == 0 {
            let mut real = *self;
            real.coefficients[0] = self.coefficients[0].exp_m1();
            return real;
        }
        let mut nilpotent = *self;
        nilpotent.coefficients[0] = 0.0;
        // exp of the nilpotent part, by Horner; powers above the number of symbols vanish.
        let mut sum = Self::zero(self.symbols);
        sum.coefficients[0] = 1.0;
        for power in (1..=self.symbols).rev() {
            sum = sum.times(&nilpotent);
            sum.coefficients.iter_mut().for_each(|c| *c /= f64::from(power));
            sum.coefficients[0] += 1.0;
        }
        let scale = self.coefficients[0].exp();
        sum.coefficients.iter_mut().for_each(|c| *c *= scale);
        sum.coefficients[0] = self.coefficients[0].exp_m1();
        sum
    }

    fn times(&self, other: &Self) -> Self {
        let mut product = Self::zero(self.symbols);
        for set in 0..self.sets() {
            let mut part = set;
            // Every part of the set, with the rest from the other factor.
            loop {
                product.coefficients[set] += self.coefficients[part] * other.coefficients[set ^ part];
                if part == 0 {
                    break;
                }
                part = (part - 1) & set;
            }
        }
        product
    }

    fn sets(&self) -> usize {
        1 << self.symbols
    }
}

//! Pseudorandom numbers that are the same on every machine.

/// A stream of numbers that its seed determines: the generator splitmix64 \[Steele2014\].
///
/// \[Steele2014\] G. L. Steele, D. Lea, C. H. Flood, "Fast splittable pseudorandom number generators",
/// OOPSLA 2014 (quoted from memory).
#[derive(Clone, Debug)]
pub(crate) struct Draw(u64);

impl Draw {
    pub(crate) fn seeded(seed: u64) -> Self {
        Self(seed)
    }

    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        z ^ (z >> 31)
    }

    /// A number below a bound.
    pub(crate) fn below(&mut self, bound: u64) -> u64 {
        let scaled = (u128::from(self.next()) * u128::from(bound)) >> 64;
        u64::try_from(scaled).expect("invariant: it is below the bound")
    }
}

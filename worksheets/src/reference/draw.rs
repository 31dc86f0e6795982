//! Numbers drawn by a fixed rule from the content of a sheet, so that a run repeats itself.

use crate::model::Model;

/// A stream of numbers: SplitMix64 [Steele2014].
#[derive(Clone, Debug)]
pub(super) struct Draw(u64);

impl Draw {
    /// The stream that belongs to the content of a model.
    pub(super) fn of(model: &Model) -> Self {
        let names = model
            .quantities()
            .iter()
            .flat_map(|declared| declared.name().as_str().bytes());
        let seed = names.fold(0x6775_6467_656f_6e31, |seed: u64, byte| {
            seed.rotate_left(7) ^ u64::from(byte)
        });
        let components = model.position_components();
        Self(components.iter().fold(seed, |seed, component| {
            seed.rotate_left(11) ^ component.content_hash()
        }))
    }

    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        z ^ (z >> 31)
    }

    /// A number from an interval in steps of a hundredth of its length.
    ///
    /// Two decimals are enough to be in no special place, and are shown exactly.
    pub(super) fn hundredths(&mut self, least: i64, most: i64) -> i64 {
        let width = u64::try_from(most - least + 1).unwrap_or(1);
        least + i64::try_from(self.next() % width).unwrap_or(0)
    }

    /// A number between these two.
    pub(super) fn between(&mut self, least: f64, most: f64) -> f64 {
        // 53 bits are what a floating-point number holds, so the quotient is exact.
        #[allow(clippy::cast_precision_loss, reason = "53 bits fit")]
        let share = (self.next() >> 11) as f64 / (1u64 << 53) as f64;
        least + share * (most - least)
    }
}

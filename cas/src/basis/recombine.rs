//! Sums and differences of angles in place of the angles, where that makes expressions shorter.
//!
//! The horizontal place of the third link of a chain with relative angles is the sine of a sum of three
//! angles: eight terms in sines and cosines of the single angles, one in those of the sum. An arm whose
//! second and third axes are parallel has such a sum too, but hidden in products.
//! Any replacement of an angle by its sum with another, or its difference, can be undone, so that
//! nothing that could be expressed is lost.

use std::collections::BTreeSet;

use super::{Basis, Failure, Leaf};
use crate::canonical::Canonical;
use crate::effort::Meter;
use crate::expr::{Expr, Function};

/// The base angle of the first place is replaced by its sum with that of the second, or its difference.
#[derive(Clone, Copy, Debug)]
struct Step {
    replaced: usize,
    other: usize,
    sign: i64,
}

/// The most replacements that are tried out on whole expressions.
const MOST_TRIALS: usize = 400;

impl Basis {
    /// Replaces angles by sums and differences while that makes these expressions shorter.
    ///
    /// Only angles that are the same multiple of the same monomial in both are replaced.
    pub(crate) fn recombine(&mut self, shortened: &[Expr], meter: &Meter) -> Result<(), Failure> {
        let mut small = Self::of(shortened, meter)?;
        let theirs = small.angles.clone();
        let steps = small.steps(shortened, meter)?;
        let place = |values: &[Expr], value: Expr| values.iter().position(|known| *known == value);
        let own: Vec<Expr> = self.angles.iter().map(|angle| angle.value).collect();
        for step in steps {
            let found = [step.replaced, step.other].map(|angle| place(&own, theirs[angle].value));
            if let [Some(replaced), Some(other)] = found {
                self.take(Step {
                    replaced,
                    other,
                    ..step
                });
            }
        }
        Ok(())
    }

    /// The replacements that make the expressions shorter, each of which is taken here too.
    fn steps(&mut self, expressions: &[Expr], meter: &Meter) -> Result<Vec<Step>, Failure> {
        let mut taken = Vec::new();
        // First the sums that are written as such: they may be too long to be multiplied out.
        while let Some(step) = self.shortening_arguments() {
            self.take(step);
            taken.push(step);
        }
        let mut trials = MOST_TRIALS;
        let mut best = self.terms(expressions, meter)?;
        while let Some((step, terms)) = self.shortening_terms(expressions, best, &mut trials, meter)? {
            self.take(step);
            taken.push(step);
            best = terms;
        }
        Ok(taken)
    }

    /// The replacement after which the arguments of sines and cosines are the shortest, if any helps.
    fn shortening_arguments(&self) -> Option<Step> {
        let arguments: BTreeSet<Vec<(usize, i64)>> = self
            .leaves
            .values()
            .filter_map(|leaf| match leaf {
                Leaf::Turn { angles, .. } => Some(angles.clone()),
                _ => None,
            })
            .collect();
        let length = |step: Option<Step>| -> u128 {
            let lengths = arguments.iter().map(|counts| match step {
                Some(step) => expanded(&changed(counts, step)),
                None => expanded(counts),
            });
            lengths.fold(0, u128::saturating_add)
        };
        let pairs: BTreeSet<(usize, usize)> = arguments.iter().flat_map(|counts| pairs(counts)).collect();
        let steps = pairs.into_iter().flat_map(directions);
        let best = steps.min_by_key(|step| length(Some(*step)))?;
        (length(Some(best)) < length(None)).then_some(best)
    }

    /// The replacement after which the expressions have the fewest terms, if any has fewer than now.
    fn shortening_terms(
        &self,
        expressions: &[Expr],
        now: usize,
        trials: &mut usize,
        meter: &Meter,
    ) -> Result<Option<(Step, usize)>, Failure> {
        let form = Canonical::in_basis(self.clone(), expressions, meter)?;
        let mut together = BTreeSet::new();
        for fraction in &form.fractions {
            let terms = form.ring.terms(&fraction.numerator);
            let monomials: BTreeSet<Vec<u32>> = terms.map(|(exponents, _)| exponents).collect();
            for monomial in &monomials {
                let angles = self.angles.iter().enumerate();
                let present = angles.filter(|(_, angle)| is_once(monomial, angle.cosine));
                let present: Vec<(usize, i64)> = present.map(|(place, _)| (place, 1)).collect();
                // Only where both halves of an addition theorem stand is there something to gain.
                together.extend(pairs(&present).into_iter().filter(|(a, b)| {
                    let mut other = monomial.clone();
                    for angle in [*a, *b] {
                        let cosine = self.angles[angle].cosine;
                        other.swap(cosine, cosine + 1);
                    }
                    monomials.contains(&other)
                }));
            }
        }
        let mut best: Option<(Step, usize)> = None;
        for step in together.into_iter().flat_map(directions) {
            if *trials == 0 {
                break;
            }
            *trials -= 1;
            let mut candidate = self.clone();
            candidate.take(step);
            let terms = candidate.terms(expressions, meter)?;
            if terms < best.map_or(now, |(_, terms)| terms) {
                best = Some((step, terms));
            }
        }
        Ok(best)
    }

    fn terms(&self, expressions: &[Expr], meter: &Meter) -> Result<usize, Failure> {
        let form = Canonical::in_basis(self.clone(), expressions, meter)?;
        Ok(form
            .fractions
            .iter()
            .map(|fraction| fraction.numerator.len())
            .sum())
    }

    fn take(&mut self, step: Step) {
        let other = self.angles[step.other].value;
        let angle = &mut self.angles[step.replaced];
        angle.value += Expr::from(step.sign) * other;
        let place = angle.cosine;
        self.variables[place] = Expr::elementary(Function::Cosine, angle.value);
        self.variables[place + 1] = Expr::elementary(Function::Sine, angle.value);
        // Each is changed by itself, so the order in which they come says nothing.
        self.leaves.values_mut().for_each(|leaf| {
            if let Leaf::Turn { angles, .. } = leaf {
                *angles = changed(angles, step);
            }
        });
    }
}

/// Whether the cosine at this place and the sine behind it have the degree one together.
fn is_once(monomial: &[u32], cosine: usize) -> bool {
    monomial[cosine] + monomial[cosine + 1] == 1
}

/// How many terms the sine of a combination of angles has once it is multiplied out, roughly.
fn expanded(counts: &[(usize, i64)]) -> u128 {
    let lengths = counts
        .iter()
        .map(|(_, count)| u128::from(count.unsigned_abs()) + 1);
    lengths.fold(1, u128::saturating_mul)
}

/// The same combination of angles in terms of those after a replacement.
fn changed(counts: &[(usize, i64)], step: Step) -> Vec<(usize, i64)> {
    let count = |place| {
        counts
            .iter()
            .find(|(known, _)| *known == place)
            .map_or(0, |(_, count)| *count)
    };
    let other = count(step.other) - step.sign * count(step.replaced);
    let mut changed: Vec<(usize, i64)> = counts
        .iter()
        .copied()
        .filter(|(place, _)| *place != step.other)
        .collect();
    if other != 0 {
        changed.push((step.other, other));
        changed.sort_unstable();
    }
    changed
}

/// The pairs of different angles in a combination.
fn pairs(counts: &[(usize, i64)]) -> Vec<(usize, usize)> {
    let later = |place: usize| {
        counts[place + 1..]
            .iter()
            .map(move |(other, _)| (counts[place].0, *other))
    };
    (0..counts.len()).flat_map(later).collect()
}

/// The replacements that concern two angles.
fn directions((a, b): (usize, usize)) -> [Step; 4] {
    [(b, a, 1), (a, b, 1), (b, a, -1), (a, b, -1)].map(|(replaced, other, sign)| Step {
        replaced,
        other,
        sign,
    })
}

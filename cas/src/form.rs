//! Canonical forms that are made once and then differentiated: the fast way to long results.
//!
//! Differentiating an expression and bringing the derivative into canonical form multiplies out again
//! what was multiplied out before. Here an expression is brought into canonical form once, over a
//! basis of angles that is chosen to keep it short, and its derivatives are taken in that form.

use crate::basis::{Basis, Failure, Root};
use crate::calculus::{CalculusError, Rates, derivative, total_derivative};
use crate::canonical::Canonical;
use crate::effort::{Limit, Meter};
use crate::expr::{Expr, Symbol};
use crate::fraction::{self, Fraction};
use crate::number::Rational;
use crate::ring::Polynomial;

/// What canonical forms are made in: variables, base angles, and the work that may be done.
///
/// # Example
/// ```
/// use cas::{Effort, Expr, Symbol, effort::Meter, form::Forms, sin};
/// let [a, b] = ["a", "b"].map(|name| Symbol::new(name).expect("a valid name"));
/// let height = sin(Expr::from(a)) + sin(Expr::from(a) + Expr::from(b));
/// let effort = Effort::default();
/// let meter = Meter::new(&effort);
/// let mut forms = Forms::new(&[height], &[height], &meter)?;
/// let form = forms.form(height)?;
/// assert_eq!(forms.terms(&form), 2);
/// let slope = forms.derivative(&form, b)?;
/// assert_eq!(forms.expr(&slope), cas::cos(Expr::from(a) + Expr::from(b)));
/// # Ok::<(), cas::form::FormError>(())
/// ```
pub struct Forms<'m> {
    canonical: Canonical<'m>,
}

/// An expression in canonical form.
///
/// Without terms it is zero. With terms it is not zero as a function, as long as all its functions are
/// undetermined ones, or sines, cosines and tangents of linear combinations of symbols.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Form(Fraction);

/// Why there is no form.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[non_exhaustive]
pub enum FormError {
    /// A part has no value, or is made of other parts than the basis.
    #[error("`{0}` has no value, or is not among the expressions that the forms were made for")]
    Outside(Expr),
    /// The work allowed does not suffice.
    #[error(transparent)]
    Limit(#[from] Limit),
    /// There is no derivative.
    #[error(transparent)]
    Calculus(#[from] CalculusError),
}

impl FormError {
    /// How to go on.
    #[must_use]
    pub fn hint(&self) -> String {
        match self {
            Self::Outside(_) => "add the expression to those that the forms are made for".to_owned(),
            Self::Limit(limit) => limit.hint().to_owned(),
            Self::Calculus(error) => error.hint().to_owned(),
        }
    }
}

impl From<Failure> for FormError {
    fn from(failure: Failure) -> Self {
        match failure {
            Failure::Undefined(part) => Self::Outside(part),
            Failure::Limit(limit) => Self::Limit(limit),
        }
    }
}

/// The derivative of each variable that changes, by its place.
type Derivation = Vec<(usize, Fraction)>;

impl<'m> Forms<'m> {
    /// Forms of expressions that are made of the parts of `parts`: their symbols, and their functions
    /// at the same arguments. Angles are replaced by sums and differences where that shortens
    /// `shortened`, such as position maps.
    ///
    /// # Errors
    /// [`FormError::Outside`] where a part has no value anywhere, [`FormError::Limit`].
    pub fn new(parts: &[Expr], shortened: &[Expr], meter: &'m Meter<'m>) -> Result<Self, FormError> {
        let mut basis = Basis::of(parts, meter)?;
        basis.recombine(shortened, meter)?;
        Ok(Self {
            canonical: Canonical::in_basis(basis, &[], meter)?,
        })
    }

    /// The angles whose sines and cosines the forms are written in.
    #[must_use]
    pub fn angles(&self) -> Vec<Expr> {
        self.canonical
            .basis
            .angles
            .iter()
            .map(|angle| angle.value)
            .collect()
    }

    /// The form of an expression.
    ///
    /// # Errors
    /// [`FormError::Outside`], [`FormError::Limit`].
    pub fn form(&mut self, expr: Expr) -> Result<Form, FormError> {
        Ok(Form(self.canonical.converted(&[expr])?.swap_remove(0)))
    }

    /// The difference of two forms.
    ///
    /// # Errors
    /// [`FormError::Limit`].
    pub fn difference(&self, left: &Form, right: &Form) -> Result<Form, FormError> {
        let ring = &self.canonical.ring;
        let minus = Fraction {
            numerator: ring.scaled(&right.0.numerator, &(-1).into())?,
            denominator: right.0.denominator.clone(),
        };
        Ok(Form(fraction::sum(ring, &[&left.0, &minus])?))
    }

    /// The partial derivative by a symbol.
    ///
    /// # Errors
    /// [`FormError::Outside`] where the derivative of a function is not among the parts of the basis,
    /// [`FormError::Limit`].
    pub fn derivative(&mut self, form: &Form, by: Symbol) -> Result<Form, FormError> {
        let derivation = self.derivation(form, |expr| derivative(expr, by))?;
        Ok(self.derived(form, &derivation)?)
    }

    /// The derivative along given rates, all of which have to be parts of the basis.
    ///
    /// # Errors
    /// As [`derivative`](Self::derivative); [`FormError::Calculus`] where a symbol has no rate.
    pub fn total_derivative(&mut self, form: &Form, rates: &Rates) -> Result<Form, FormError> {
        let derivation = self.derivation(form, |expr| total_derivative(expr, rates))?;
        Ok(self.derived(form, &derivation)?)
    }

    /// The number of terms of the numerator.
    #[must_use]
    pub fn terms(&self, form: &Form) -> usize {
        form.0.numerator.len()
    }

    /// The form as an expression, multiplied out.
    #[must_use]
    pub fn expr(&self, form: &Form) -> Expr {
        self.canonical.expr(&form.0)
    }

    /// The derivatives of all variables that occur in a form, by one rule for expressions.
    fn derivation(
        &mut self,
        of: &Form,
        rule: impl Fn(Expr) -> Result<Expr, CalculusError>,
    ) -> Result<Derivation, FormError> {
        let present = self.present(of)?;
        let angles: Vec<(usize, Expr)> = {
            let angles = self.canonical.basis.angles.iter();
            let occurs = |place: usize| present[place] || present[place + 1];
            let angles = angles.filter(|angle| occurs(angle.cosine));
            angles.map(|angle| (angle.cosine, angle.value)).collect()
        };
        let mut derivation = Derivation::new();
        let alone: Vec<usize> = (0..present.len())
            .filter(|place| present[*place] && self.stands_alone(*place))
            .collect();
        for place in alone {
            let rate = rule(self.canonical.basis.variables[place])?;
            if !rate.is_zero() {
                derivation.push((place, self.form(rate)?.0));
            }
        }
        for (place, value) in angles {
            let rate = self.form(rule(value)?)?.0;
            if rate.is_zero() {
                continue;
            }
            let ring = &self.canonical.ring;
            let minus = ring.scaled(&ring.variable(place + 1), &(-1).into())?;
            for (place, slope) in [(place, minus), (place + 1, ring.variable(place))] {
                derivation.push((place, fraction::product(ring, &Fraction::whole(slope), &rate)?));
            }
        }
        for root in self.canonical.basis.roots.clone() {
            if present[root.place] {
                let rate = self.of_root(&root, &derivation)?;
                derivation.push((root.place, rate));
            }
        }
        Ok(derivation)
    }

    /// The variables of a form and of what stands under its roots, by their places.
    fn present(&mut self, form: &Form) -> Result<Vec<bool>, FormError> {
        let mut present = self.occurring(form);
        // What stands under a root has only roots before it.
        for root in self.canonical.basis.roots.clone().iter().rev() {
            if present[root.place] {
                let under = self.form(root.radicand)?;
                let more = self.occurring(&under);
                present.iter_mut().zip(more).for_each(|(all, more)| *all |= more);
            }
        }
        Ok(present)
    }

    fn occurring(&self, form: &Form) -> Vec<bool> {
        let ring = &self.canonical.ring;
        let mut present = ring.present(&form.0.numerator);
        for (factor, _) in &form.0.denominator {
            let more = ring.present(factor);
            present.iter_mut().zip(more).for_each(|(all, more)| *all |= more);
        }
        present
    }

    /// Whether a variable is neither the cosine or sine of a base angle nor a root.
    fn stands_alone(&self, place: usize) -> bool {
        let basis = &self.canonical.basis;
        let mut angles = basis.angles.iter();
        !angles.any(|angle| place == angle.cosine || place == angle.cosine + 1)
            && !basis.roots.iter().any(|root| root.place == place)
    }

    /// From `r^q = P` the derivative `r P' / (q P)`.
    fn of_root(&mut self, root: &Root, derivation: &Derivation) -> Result<Fraction, FormError> {
        let under = self.form(root.radicand)?;
        let rate = self.derived(&under, derivation)?.0;
        let ring = &self.canonical.ring;
        let share = Rational::new(1, i64::from(root.degree)).expect("invariant: a degree is above zero");
        let scaled = Fraction::whole(ring.scaled(&ring.variable(root.place), &share)?);
        let below = fraction::inverse(ring, &under.0, self.canonical.basis.variables.len())?;
        let below = below.ok_or(FormError::Outside(root.radicand))?;
        let above = fraction::product(ring, &rate, &scaled)?;
        Ok(fraction::product(ring, &above, &below)?)
    }

    /// The derivative of a form, given those of the variables.
    fn derived(&self, form: &Form, derivation: &Derivation) -> Result<Form, Limit> {
        let ring = &self.canonical.ring;
        let above = self.of_polynomial(&form.0.numerator, derivation)?;
        let mut parts = vec![Fraction {
            numerator: above.numerator,
            denominator: form.0.denominator.clone(),
        }];
        if !above.denominator.is_empty() {
            let below = Fraction {
                numerator: ring.constant(Rational::ONE),
                denominator: above.denominator,
            };
            parts[0] = fraction::product(ring, &parts[0], &below)?;
        }
        for (factor, exponent) in &form.0.denominator {
            // (N / F^e)' = N' / F^e - e N F' / F^(e+1)
            let rate = self.of_polynomial(factor, derivation)?;
            let mut whole = form.0.clone();
            for (known, own) in &mut whole.denominator {
                *own += u32::from(known == factor);
            }
            whole.numerator = ring.scaled(&whole.numerator, &(-i64::from(*exponent)).into())?;
            parts.push(fraction::product(ring, &whole, &rate)?);
        }
        Ok(Form(fraction::sum(ring, &parts.iter().collect::<Vec<_>>())?))
    }

    fn of_polynomial(&self, polynomial: &Polynomial, derivation: &Derivation) -> Result<Fraction, Limit> {
        let ring = &self.canonical.ring;
        if let [(place, rate)] = derivation.as_slice() {
            let slope = Fraction::whole(ring.slope(polynomial, *place)?);
            return fraction::product(ring, &slope, rate);
        }
        let (whole, broken): (Vec<_>, Vec<_>) = derivation
            .iter()
            .partition(|(_, rate)| rate.denominator.is_empty());
        let polynomials = whole.iter().map(|(place, rate)| (*place, &rate.numerator));
        let mut sum = Fraction::whole(ring.derived(polynomial, polynomials)?);
        for (place, rate) in broken {
            let slope = Fraction::whole(ring.slope(polynomial, *place)?);
            sum = fraction::sum(ring, &[&sum, &fraction::product(ring, &slope, rate)?])?;
        }
        Ok(sum)
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::decide::compare;
    use crate::effort::Effort;
    use crate::expr::{Name, cos, exp, ln, sin, sqrt};

    #[test]
    fn derivatives_are_those_of_the_expression() {
        let [a, b, x] = ["a", "b", "x"].map(|name| Symbol::new(name).expect("a valid name"));
        let rates = Rates::primed(&[a, b, x], 2);
        let [p, q, z] = [a, b, x].map(Expr::from);
        let unknown = Expr::unknown(Name::new("U").expect("a valid name"), &[z]);
        for expr in [
            sin(p) * cos(p + q) * z.power(3),
            (z + sin(p - q)) / (1 + z.squared() * cos(q)),
            sqrt(1 + z.squared()) * cos(2 * p + q / 2) + sqrt(z),
            exp(z * p) * ln(z) / z,
            unknown * sin(z),
        ] {
            let partial = derivative(expr, x).expect("a derivative");
            let along = total_derivative(expr, &rates).expect("a derivative");
            let (effort, parts) = (Effort::default(), [expr, partial, along]);
            let meter = Meter::new(&effort);
            let mut forms = Forms::new(&parts, &[sin(p + q)], &meter).expect("forms");
            let form = forms.form(expr).expect("a form");
            for (found, expected) in [
                (forms.derivative(&form, x), partial),
                (forms.total_derivative(&form, &rates), along),
            ] {
                let found = forms.expr(&found.expect("a derivative"));
                assert!(compare(found, expected, &effort).is_proved(), "{expr}: {found}");
            }
        }
    }

    #[test]
    fn angles_are_summed_where_that_is_shorter() {
        let [a, b, c] = ["a", "b", "c"].map(|name| Expr::symbol(name).expect("a valid name"));
        let (effort, chain) = (Effort::default(), sin(a) + sin(a + b) + sin(a + b + c));
        let meter = Meter::new(&effort);
        let forms = Forms::new(&[chain], &[chain], &meter).expect("forms");
        let mut angles = forms.angles();
        angles.sort_unstable();
        let mut expected = [a, a + b, a + b + c];
        expected.sort_unstable();
        assert_eq!(angles, expected);
        // The sum that is hidden in products.
        let hidden = sin(a) * cos(b) + cos(a) * sin(b) + sin(c);
        let forms = Forms::new(&[hidden], &[hidden], &meter).expect("forms");
        assert!(forms.angles().contains(&(a + b)), "{:?}", forms.angles());
    }
}

//! Evaluates stated expressions on floating-point and dual numbers, by one walk through each expression.
//!
//! It is deliberately not the evaluation of the crate `cas`: the reference shares no evaluation
//! code with what it judges.

use std::collections::{BTreeMap, HashMap};

use cas::{Expr, Function, Kind, Rational, Symbol, postorder};
use num_dual::DualNum;
use num_rational::BigRational;
use num_traits::ToPrimitive;

use super::ReferenceError;

/// What the walk does at one node; operands are places of earlier nodes.
#[derive(Clone, Debug)]
enum Operation {
    Number(f64),
    Variable(usize),
    Sum(Box<[usize]>),
    Product(Box<[usize]>),
    IntegerPower(usize, i32),
    Root(usize),
    RealPower(usize, f64),
    Elementary(Function, usize),
}

/// Several expressions prepared for evaluation at many points.
#[derive(Clone, Debug)]
pub(super) struct Evaluation {
    operations: Vec<Operation>,
    results: Vec<usize>,
}

impl Evaluation {
    /// Prepares expressions in the given variables; every other symbol needs a value in `constants`.
    pub(super) fn new(
        expressions: &[Expr],
        variables: &[Symbol],
        constants: &BTreeMap<Symbol, f64>,
    ) -> Result<Self, ReferenceError> {
        let mut places: HashMap<Expr, usize> = HashMap::new();
        let mut operations = Vec::new();
        for node in postorder(expressions) {
            let of = |part: &Expr| places[part];
            let operation = match node.kind() {
                Kind::Number(value) => Operation::Number(nearest_float(value)),
                Kind::Pi => Operation::Number(std::f64::consts::PI),
                Kind::Symbol(symbol) => match variables.iter().position(|known| known == symbol) {
                    Some(place) => Operation::Variable(place),
                    None => Operation::Number(
                        *constants
                            .get(symbol)
                            .ok_or(ReferenceError::NoValue { symbol: *symbol })?,
                    ),
                },
                Kind::Sum(terms) => Operation::Sum(terms.iter().map(of).collect()),
                Kind::Product(factors) => Operation::Product(factors.iter().map(of).collect()),
                Kind::Power(base, exponent) => power(of(base), exponent),
                Kind::Elementary(function, argument) => Operation::Elementary(*function, of(argument)),
                Kind::Unknown(application) => {
                    return Err(ReferenceError::NoStandIn {
                        name: application.name(),
                    });
                }
                other => {
                    return Err(ReferenceError::NotEvaluated {
                        kind: format!("{other:?}"),
                    });
                }
            };
            places.insert(node, operations.len());
            operations.push(operation);
        }
        let results = expressions.iter().map(|expression| places[expression]).collect();
        Ok(Self { operations, results })
    }

    /// The values of the expressions where the variables have these values.
    pub(super) fn at<D: DualNum<Primitive = f64> + Copy>(&self, variables: &[D]) -> Vec<D> {
        let mut values: Vec<D> = Vec::with_capacity(self.operations.len());
        for operation in &self.operations {
            let value = match operation {
                Operation::Number(value) => D::from(*value),
                Operation::Variable(place) => variables[*place],
                Operation::Sum(terms) => terms.iter().fold(D::from(0.0), |sum, term| sum + values[*term]),
                Operation::Product(factors) => factors
                    .iter()
                    .fold(D::from(1.0), |product, factor| product * values[*factor]),
                Operation::IntegerPower(base, exponent) => values[*base].powi(*exponent),
                Operation::Root(base) => values[*base].sqrt(),
                Operation::RealPower(base, exponent) => values[*base].powf(*exponent),
                Operation::Elementary(function, argument) => elementary(*function, values[*argument]),
            };
            values.push(value);
        }
        self.results.iter().map(|place| values[*place]).collect()
    }
}

fn power(base: usize, exponent: &Rational) -> Operation {
    match exponent.as_small() {
        Some((1, 2)) => Operation::Root(base),
        Some((numerator, 1)) if i32::try_from(numerator).is_ok() => Operation::IntegerPower(
            base,
            i32::try_from(numerator).expect("invariant: checked in the line above"),
        ),
        _ => Operation::RealPower(base, nearest_float(exponent)),
    }
}

fn elementary<D: DualNum<Primitive = f64> + Copy>(function: Function, argument: D) -> D {
    match function {
        Function::Sine => argument.sin(),
        Function::Cosine => argument.cos(),
        Function::Tangent => argument.tan(),
        Function::Exponential => argument.exp(),
        Function::Logarithm => argument.ln(),
        // A function that this walk does not know gives no number, and no number never agrees.
        _ => D::from(f64::NAN),
    }
}

/// The floating-point number nearest to an exact one; not a number where it is out of range.
pub(super) fn nearest_float(value: &Rational) -> f64 {
    BigRational::new(value.numerator(), value.denominator())
        .to_f64()
        .unwrap_or(f64::NAN)
}

#[cfg(test)]
mod tests {
    use super::*;
    use cas::{cos, exact, exp, ln, sin, sqrt, tan};
    use num_dual::{Dual2_64, Dual64};

    fn symbol(name: &str) -> Symbol {
        Symbol::new(name).expect("a valid name")
    }

    #[test]
    fn every_kind_of_node_has_its_value() {
        let x = symbol("x");
        let e = Expr::from(x);
        let cases = [
            (exact("9.81").expect("a number") * e, 9.81 * 0.7),
            (
                sin(e) + cos(2 * e) - tan(e),
                0.7f64.sin() + 1.4f64.cos() - 0.7f64.tan(),
            ),
            (exp(e) * ln(e), 0.7f64.exp() * 0.7f64.ln()),
            (sqrt(e) / e.power(3), 0.7f64.sqrt() / 0.343),
            (
                e.power(Rational::new(2, 3).expect("a number")),
                0.7f64.powf(2.0 / 3.0),
            ),
            (cas::pi() * e, std::f64::consts::PI * 0.7),
        ];
        for (expression, expected) in cases {
            let prepared = Evaluation::new(&[expression], &[x], &BTreeMap::new()).expect("evaluates");
            assert!((prepared.at(&[0.7])[0] - expected).abs() < 1e-14);
        }
    }

    #[test]
    fn dual_numbers_carry_both_derivatives() {
        let x = symbol("x");
        let expression = Expr::from(x).power(3) * sin(x);
        let prepared = Evaluation::new(&[expression], &[x], &BTreeMap::new()).expect("evaluates");
        let at = 0.6f64;
        let first = prepared.at(&[Dual64::new(at, 1.0)])[0].eps;
        assert!((first - (3.0 * at * at * at.sin() + at.powi(3) * at.cos())).abs() < 1e-14);
        let second = prepared.at(&[Dual2_64::new(at, 1.0, 0.0)])[0].v2;
        let expected = 6.0 * at * at.sin() + 6.0 * at * at * at.cos() - at.powi(3) * at.sin();
        assert!((second - expected).abs() < 1e-13);
    }

    #[test]
    fn a_symbol_without_value_is_named() {
        let expression = Expr::from(symbol("x")) + Expr::from(symbol("k"));
        let error =
            Evaluation::new(&[expression], &[symbol("x")], &BTreeMap::new()).expect_err("k has no value");
        assert!(error.to_string().contains("`k`"), "{error}");
    }
}

//! The basis in which expressions become polynomials: variables, base angles and roots.
//!
//! Arguments of sine, cosine and tangent are read as linear forms over Q in monomials, such as
//! `2 phi + omega t / 2 + pi / 2`. For each monomial the base angle is the greatest common divisor of
//! its coefficients times the monomial, so that every argument is an integer combination of base
//! angles plus quarter turns, and sines and cosines of base angles suffice.
//!
//! Everything else that is no field operation - undetermined functions, exponentials, logarithms -
//! becomes a variable whose key has its arguments in canonical form. Two spellings of one argument
//! therefore give one variable; an equality proved over such variables holds for what they stand for.

mod recombine;
mod resolve;

use std::collections::{BTreeMap, BTreeSet, HashMap};

use num_integer::Integer;

use crate::decide::Condition;
use crate::effort::{Limit, Meter};
use crate::expr::{Expr, Function, Kind, pi, postorder_within};
use crate::number::Rational;
use resolve::{Found, Resolver};

/// Why an expression has no canonical form.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum Failure {
    /// This part has no value anywhere.
    Undefined(Expr),
    /// The work allowed does not suffice.
    Limit(Limit),
}

impl From<Limit> for Failure {
    fn from(limit: Limit) -> Self {
        Self::Limit(limit)
    }
}

/// What stands for a node that is no field operation.
#[derive(Clone, Debug, PartialEq)]
pub(crate) enum Leaf {
    /// A number.
    Number(Rational),
    /// The variable of this place.
    Variable(usize),
    /// A sine, cosine or tangent of an integer combination of base angles plus quarter turns.
    Turn {
        function: Function,
        angles: Vec<(usize, i64)>,
        quarters: u8,
    },
    /// A power of the root that is the variable of this place.
    Root { place: usize, power: i64 },
}

/// A base angle: its sine is the variable after its cosine.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Angle {
    /// The angle itself: the unit times the direction.
    pub(crate) value: Expr,
    /// The monomial of which it is a multiple.
    pub(crate) direction: Expr,
    pub(crate) unit: Rational,
    /// The place of the cosine.
    pub(crate) cosine: usize,
}

/// A root of a polynomial.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Root {
    pub(crate) place: usize,
    pub(crate) degree: u32,
    pub(crate) radicand: Expr,
}

/// Variables, base angles and roots, and what stands for each node.
#[derive(Clone, Debug)]
pub(crate) struct Basis {
    /// What each variable stands for.
    pub(crate) variables: Vec<Expr>,
    pub(crate) angles: Vec<Angle>,
    pub(crate) roots: Vec<Root>,
    leaves: HashMap<Expr, Leaf>,
    /// Whether a difference that is not zero in this basis is not zero as a function.
    pub(crate) complete: bool,
    /// Where the arguments of functions and the roots have values.
    pub(crate) conditions: Vec<Condition>,
}

impl Basis {
    /// The basis for these expressions.
    pub(crate) fn of(roots: &[Expr], meter: &Meter) -> Result<Self, Failure> {
        let mut resolver = Resolver::new(meter);
        resolver.resolve(roots)?;
        Ok(Self::from_found(roots, &resolver))
    }

    /// What stands for a node, `None` for field operations.
    pub(crate) fn leaf(&self, node: Expr) -> Option<&Leaf> {
        self.leaves.get(&node)
    }

    /// The nodes from parts to wholes, not looking into leaves.
    pub(crate) fn nodes(&self, roots: &[Expr]) -> Vec<Expr> {
        postorder_within(roots, |node| !self.leaves.contains_key(&node))
    }

    fn from_found(roots: &[Expr], resolver: &Resolver) -> Self {
        // What lies under a root has to be expressed in the basis too.
        let (mut reached, mut starts) = (Vec::new(), roots.to_vec());
        let mut seen = BTreeSet::new();
        while !starts.is_empty() {
            let nodes = postorder_within(&starts, |node| !resolver.found.contains_key(&node));
            starts.clear();
            for node in nodes {
                if seen.insert(node)
                    && let Some(found) = resolver.found.get(&node)
                {
                    if let Found::Root { radicand, .. } = found {
                        starts.push(*radicand);
                    }
                    reached.push((node, found));
                }
            }
        }
        let mut builder = Builder::default();
        for (_, found) in &reached {
            builder.collect(found);
        }
        let mut basis = builder.laid_out();
        basis.conditions.clone_from(&resolver.conditions);
        for (node, found) in reached {
            let leaf = basis.leaf_for(found);
            basis.leaves.insert(node, leaf);
        }
        basis
    }

    fn place(&self, variable: Expr) -> usize {
        let place = self.variables.iter().position(|known| *known == variable);
        place.expect("invariant: every variable was collected")
    }

    fn leaf_for(&self, found: &Found) -> Leaf {
        match found {
            Found::Number(value) => Leaf::Number(value.clone()),
            Found::Variable { key, .. } => Leaf::Variable(self.place(*key)),
            Found::Root { key, power, .. } => Leaf::Root {
                place: self.place(*key),
                power: *power,
            },
            Found::Turn {
                function,
                parts,
                quarters,
                ..
            } => {
                let counted = |(direction, coefficient): (&Expr, &Rational)| {
                    let place = self.angles.iter().position(|angle| angle.direction == *direction);
                    let place = place.expect("invariant: every direction was collected");
                    let count = coefficient.divided_by(&self.angles[place].unit);
                    let count = count.and_then(|count| count.as_integer());
                    (
                        place,
                        count.expect("invariant: the base angle divides its arguments"),
                    )
                };
                Leaf::Turn {
                    function: *function,
                    angles: parts.iter().map(counted).collect(),
                    quarters: *quarters,
                }
            }
        }
    }
}

/// What was found, before it has places.
#[derive(Default)]
struct Builder {
    symbols: BTreeSet<crate::expr::Symbol>,
    others: BTreeSet<Expr>,
    /// The greatest common divisor of the coefficients of each direction.
    directions: BTreeMap<Expr, Rational>,
    roots: Vec<(Expr, u32, Option<Expr>)>,
    incomplete: bool,
}

impl Builder {
    fn collect(&mut self, found: &Found) {
        match found {
            Found::Number(_) => {}
            Found::Variable { key, opaque } => {
                self.incomplete |= opaque;
                match key.kind() {
                    Kind::Symbol(symbol) => drop(self.symbols.insert(*symbol)),
                    _ => drop(self.others.insert(*key)),
                }
            }
            Found::Turn { parts, opaque, .. } => {
                self.incomplete |= opaque;
                for (direction, coefficient) in parts {
                    // A multiple of pi that is no quarter turn has relations that are not used here, and a
                    // number as an angle may be related to pi.
                    self.incomplete |= *direction == pi() || *direction == Expr::one();
                    let known = self.directions.entry(*direction).or_insert(Rational::ZERO);
                    *known = common_divisor(known, coefficient);
                }
            }
            Found::Root {
                key,
                degree,
                radicand,
                relation,
                ..
            } => {
                self.incomplete = true;
                if !self.roots.iter().any(|(known, ..)| known == key) {
                    self.roots.push((*key, *degree, relation.then_some(*radicand)));
                }
            }
        }
    }

    fn laid_out(self) -> Basis {
        let mut variables: Vec<Expr> = self.symbols.into_iter().map(Expr::from).collect();
        variables.extend(self.others);
        let mut angles = Vec::new();
        // By names, so that a difference of angles begins with the name that comes first.
        let mut directions: Vec<(Expr, Rational)> = self.directions.into_iter().collect();
        directions.sort_by_cached_key(|(direction, _)| (direction.symbols().into_iter().next(), *direction));
        for (direction, unit) in directions {
            let value = Expr::number(unit.clone()) * direction;
            angles.push(Angle {
                value,
                direction,
                unit,
                cosine: variables.len(),
            });
            variables.push(Expr::elementary(Function::Cosine, value));
            variables.push(Expr::elementary(Function::Sine, value));
        }
        let mut roots = Vec::new();
        for (key, degree, radicand) in self.roots {
            if let Some(radicand) = radicand {
                roots.push(Root {
                    place: variables.len(),
                    degree,
                    radicand,
                });
            }
            variables.push(key);
        }
        Basis {
            variables,
            angles,
            roots,
            leaves: HashMap::new(),
            complete: !self.incomplete,
            conditions: Vec::new(),
        }
    }
}

/// The greatest rational of which both are integer multiples.
fn common_divisor(a: &Rational, b: &Rational) -> Rational {
    if a.is_zero() {
        return b.absolute();
    }
    let numerator = (a.numerator() * b.denominator()).gcd(&(b.numerator() * a.denominator()));
    Rational::quotient(numerator, a.denominator() * b.denominator())
        .expect("invariant: denominators are not zero")
}

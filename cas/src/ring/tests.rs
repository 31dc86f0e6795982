//! The laws of the ring and its relations.

use super::*;
use crate::effort::Effort;

/// The ring of x, y and the cosine and sine of one angle.
fn with_ring(check: impl Fn(&Ring, [Polynomial; 4])) {
    let effort = Effort::default();
    let meter = Meter::new(&effort);
    let mut ring = Ring::new(4, &meter);
    ring.relate_sine(3, 2);
    let variables = [0, 1, 2, 3].map(|place| ring.variable(place));
    check(&ring, variables);
}

#[test]
fn products_and_sums_follow_the_laws() {
    with_ring(|ring, [x, y, c, s]| {
        let a = ring.sum(&[&x, &s]).unwrap();
        let b = ring.sum(&[&y, &c]).unwrap();
        let d = ring.sum(&[&x, &y, &s]).unwrap();
        let left = ring.product(&ring.product(&a, &b).unwrap(), &d).unwrap();
        let right = ring.product(&a, &ring.product(&b, &d).unwrap()).unwrap();
        assert_eq!(left, right);
        let apart = ring.sum(&[&ring.product(&a, &b).unwrap(), &ring.product(&a, &d).unwrap()]);
        let joined = ring.product(&a, &ring.sum(&[&b, &d]).unwrap());
        assert_eq!(apart, joined);
    });
}

#[test]
fn the_circle_is_one() {
    with_ring(|ring, [_, _, c, s]| {
        let squares = [&c, &s].map(|v| ring.product(v, v).unwrap());
        let sum = ring.sum(&[&squares[0], &squares[1]]).unwrap();
        assert_eq!(sum.as_constant(), Some(Rational::ONE));
        let sixth = ring.power(&s, 6).unwrap();
        let cube = ring.sum(&[
            &ring.constant(Rational::ONE),
            &ring.scaled(&squares[0], &(-1).into()).unwrap(),
        ]);
        assert_eq!(sixth, ring.power(&cube.unwrap(), 3).unwrap());
    });
}

#[test]
fn roots_obey_their_relation() {
    let effort = Effort::default();
    let meter = Meter::new(&effort);
    let mut ring = Ring::new(2, &meter);
    let x = ring.variable(0);
    let radicand = ring.sum(&[&x, &ring.constant(Rational::ONE)]).unwrap();
    ring.relate_root(1, 2, radicand.clone());
    let r = ring.variable(1);
    assert_eq!(ring.power(&r, 4).unwrap(), ring.power(&radicand, 2).unwrap());
}

#[test]
fn division_finds_quotients_and_leaves_what_is_none() {
    with_ring(|ring, [x, y, ..]| {
        let sum = ring.sum(&[&x, &y]).unwrap();
        let square = ring.product(&sum, &sum).unwrap();
        assert_eq!(ring.exact_quotient(&square, &sum).unwrap(), Some(sum.clone()));
        assert_eq!(ring.exact_quotient(&x, &y).unwrap(), None);
        assert_eq!(ring.exact_quotient(&x, &sum).unwrap(), None);
        assert_eq!(
            ring.exact_quotient(&Polynomial::default(), &sum).unwrap(),
            Some(Polynomial::default())
        );
    });
}

#[test]
fn exponents_beyond_the_limit_are_refused() {
    with_ring(|ring, [x, ..]| {
        assert!(ring.power(&x, 127).is_ok());
        assert_eq!(ring.power(&x, 128), Err(Limit::Exponent(127)));
    });
}

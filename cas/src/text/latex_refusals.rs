//! LaTeX that is refused: the place of the fault, and what is said about it.

use super::{ReadError, Scope, read_latex, read_latex_equations};
use crate::expr::Name;

/// A text, the place of its fault, a part of the message, a part of the hint.
type Refusal = (&'static str, usize, &'static str, &'static str);

fn check<T: std::fmt::Debug>(refusals: &[Refusal], read: impl Fn(&str) -> Result<T, ReadError>) {
    for (source, place, message, hint) in refusals {
        let error = match read(source) {
            Ok(found) => panic!("{source} was read as {found:?}"),
            Err(error) => error,
        };
        let said = (error.to_string(), error.hint());
        assert_eq!(error.place, *place, "{source}: {said:?}");
        assert!(said.0.contains(message), "{source}: {}", said.0);
        assert!(said.1.contains(hint), "{source}: {}", said.1);
    }
}

#[test]
fn what_can_be_read_in_two_ways_is_refused() {
    let refusals: &[Refusal] = &[
        (
            r"m\sin^{-1}x",
            8,
            "negative power of a function",
            "name the angle",
        ),
        (r"\sin\theta^2", 5, "the power belongs", "\\sin^{2}"),
        (r"\sin(\theta)^2", 13, "the power belongs", "\\sin^{2}"),
        (
            r"\sin\omega(t-a)",
            11,
            "where the argument of the function ends",
            "brackets",
        ),
        (
            r"\cos\theta/2",
            11,
            "where the argument of the function ends",
            "brackets",
        ),
        (
            r"\sin\theta\frac{a}{b}",
            11,
            "where the argument of the function ends",
            "brackets",
        ),
        (r"\sin\cos x", 5, "directly behind a function", "brackets"),
        (r"a/bc", 4, "stands below the line", "\\frac"),
        (
            r"x(t)",
            2,
            "a product or a value of a function",
            "leave out `(t)`",
        ),
        (
            r"\dot\theta(0)",
            11,
            "a product or a value of a function",
            "declare the function",
        ),
        (r"x2", 2, "a number stands directly behind a factor", "^{2}"),
        (r"x^12", 3, "which digits belong to the power", "braces"),
        (r"x_12", 3, "which digits belong to the index", "braces"),
        (r"x^2^3", 4, "two powers", "braces"),
        (r"\sqrt12", 6, "which digits belong to the root", "braces"),
        (r"(a+b)^{(2)}", 8, "means derivatives", "without brackets"),
        (r"\dot{ml}", 6, "over one name", "over each name"),
        (
            r"F(x,y)",
            4,
            "a comma separates arguments",
            "declare the function",
        ),
        (r"a = b", 3, "an equation was given", "one side"),
    ];
    check(refusals, |source| read_latex(source, &Scope::open()));
}

#[test]
fn what_has_no_meaning_is_refused_with_advice() {
    let refusals: &[Refusal] = &[
        (
            r"k + \vec{F}",
            5,
            "the command `\\vec` is not read",
            "component by component",
        ),
        (r"\log x", 1, "the command `\\log` is not read", "\\ln"),
        (r"\int x", 1, "the command `\\int` is not read", "integral"),
        (r"m \foo x", 3, "the command `\\foo` is not read", "leave it out"),
        (
            r"a \leq b",
            3,
            "the command `\\leq` is not read",
            "equations with `=`",
        ),
        (r"30^\circ", 4, "the command `\\circ` is not read", "radians"),
        (r"\bar x", 1, "the command `\\bar` is not read", "index"),
        (r"2|x|", 2, "absolute value", "\\sqrt{x^2}"),
        (
            r"\frac{\partial V}{\partial x}",
            1,
            "this derivative cannot be read",
            "write the derivative out",
        ),
        (
            r"\frac{d}{dt}\frac{\partial T}{\partial\dot q}",
            1,
            "this derivative cannot be read",
            "write the derivative out",
        ),
        (
            r"\frac{d(mv)}{dt}",
            1,
            "this derivative cannot be read",
            "write the derivative out",
        ),
        (
            r"\frac{dV}{dx}",
            1,
            "this derivative cannot be read",
            "write the derivative out",
        ),
        (
            r"\frac{d^2x}{dt}",
            1,
            "this derivative cannot be read",
            "write the derivative out",
        ),
        (
            r"\frac{m\,dv}{dt}",
            1,
            "this derivative cannot be read",
            "write the derivative out",
        ),
        (
            r"x \operatorname{arctan} y",
            3,
            "the command `\\arctan` is not read",
            "name the angle",
        ),
        (
            r"(a+b)'",
            6,
            "this derivative cannot be read",
            "write the derivative out",
        ),
        (
            r"Q_x^{\mathrm{drive}}",
            6,
            "a word stands where a power would",
            "index",
        ),
        (r"x^n", 3, "the exponent `n` is not a number", "\\exp"),
        (
            r"2^{\theta+1}",
            4,
            "the exponent `theta + 1` is not a number",
            "\\exp",
        ),
        (
            r"\begin{pmatrix}a\end{pmatrix}",
            1,
            "the environment `pmatrix` is not read",
            "entry by entry",
        ),
        (
            r"x \text{ for small } y",
            3,
            "words between formulas",
            "leave the words out",
        ),
        (r"a § b", 3, "the character `§` is not read", "without words"),
        (r"9,81", 2, "`,` was found", "one formula"),
        (r"1.2.3", 1, "`1.2.3` is no number", "write"),
    ];
    check(refusals, |source| read_latex(source, &Scope::open()));
}

#[test]
fn what_is_not_finished_is_refused() {
    let refusals: &[Refusal] = &[
        (
            "",
            1,
            "a number, a name or a bracket is expected, but the text ends",
            "one formula",
        ),
        (r"\frac{a}", 9, "below the line is expected", "one formula"),
        (
            r"m(a+b",
            6,
            "a closing bracket `)` is expected, but the text ends",
            "one formula",
        ),
        (
            r"(a+b]",
            5,
            "a closing bracket `)` is expected, but `]` was found",
            "one formula",
        ),
        (
            r"\frac{a}{b",
            11,
            "a closing brace `}` is expected",
            "one formula",
        ),
        (r"a}", 2, "an opening brace", "one formula"),
        (r"a+", 3, "but the text ends", "one formula"),
        (r"a+*b", 3, "but `*` was found", "one formula"),
        (
            r"\sin + x",
            6,
            "the argument of the function is expected, but `+` was found",
            "one formula",
        ),
        (
            r"x_{}",
            4,
            "an index of letters or digits is expected",
            "one formula",
        ),
        (
            r"\mathrm{max",
            1,
            "`\\mathrm` needs a pair of braces",
            "\\mathrm{...}",
        ),
        (r"$x", 3, "the end of what begins", "one formula"),
        (r"x$ y $", 2, "more than one formula", "one formula"),
        (
            r"\begin{align}x\end{equation}",
            15,
            "the beginning of it before this end",
            "one formula",
        ),
    ];
    check(refusals, |source| read_latex(source, &Scope::open()));
}

#[test]
fn names_that_are_not_declared_are_pointed_at() {
    let name = |text: &str| Name::new(text).expect("a valid name");
    let symbols = ["m", "l", "theta", "rope", "x", "phi1", "phi_1"].map(name);
    let scope = Scope::of(symbols, [(name("U"), 1), (name("m"), 1)]);
    let refusals: &[Refusal] = &[
        (r"mlg", 3, "`g` is not declared", "declare it first"),
        (
            r"m\ddot{\theta} + \ddot\vartheta_1",
            18,
            "`theta_1` is not declared",
            "did you mean `theta`?",
        ),
        (r"m + rpoe", 5, "`rpoe` is not declared", "did you mean `rope`?"),
        (
            r"\mathrm{rop}",
            1,
            "`rop` is not declared",
            "did you mean `rope`?",
        ),
        (r"x_1", 1, "`x_1` is not declared", "declare it first"),
        (r"l U", 3, "`U` takes 1 arguments, not 0", "U(x_1)"),
        (r"U(x,l)", 1, "`U` takes 1 arguments, not 2", "write"),
        (r"U^2(x)", 1, "a power stands between", "behind the arguments"),
        (
            r"x\,m(x+l)",
            5,
            "declared as a symbol and as a function",
            "\\cdot",
        ),
        (
            r"U^{(1,1)}(x)",
            1,
            "by which argument",
            "one order for each argument",
        ),
    ];
    check(refusals, |source| read_latex(source, &scope));
    let twins = Scope::of(["phi1_2", "phi_1_2", "phi"].map(name), []);
    assert!(
        read_latex(r"\varphi_{1,2}", &twins).is_ok(),
        "the plain spelling is the first choice"
    );
    let other = Scope::of(["q_a1", "qa_1", "q_a_1", "d"].map(name), []);
    check(
        &[(r"\frac{dq}{dt}", 1, "because `d` is declared", "dots or primes")],
        |source| read_latex(source, &other),
    );
}

#[test]
fn equations_that_are_not_clear_are_refused() {
    let refusals: &[Refusal] = &[
        (
            "= a",
            1,
            "the left side of the equation is expected",
            "one formula",
        ),
        ("a =", 4, "but the text ends", "one formula"),
        (
            "a &= b & c &= d",
            8,
            "several formulas in one line",
            "a line of its own",
        ),
        (
            "a = b & -c = d",
            7,
            "several formulas in one line",
            "a line of its own",
        ),
        (
            "a &= b & (c) &= d",
            8,
            "several formulas in one line",
            "a line of its own",
        ),
        (
            "a &= b & -c &= d",
            8,
            "several formulas in one line",
            "a line of its own",
        ),
        (
            "m\\ddot x \\\\ - kx = 0",
            13,
            "goes on with the one before",
            "on one line",
        ),
        ("a = b \\quad c = d", 13, "a wide space", "a line of its own"),
        (
            "a = b \\text{ and } c = d",
            7,
            "words between formulas",
            "one formula on each line",
        ),
        (
            "a = b \\quad \\text{and} \\quad c = d",
            13,
            "words between formulas",
            "one formula on each line",
        ),
        ("a = b, c = d", 6, "but `,` was found", "one formula"),
        (
            "a = 2 \\\\ b = \\foo",
            14,
            "the command `\\foo` is not read",
            "leave it out",
        ),
    ];
    check(refusals, |source| read_latex_equations(source, &Scope::open()));
}

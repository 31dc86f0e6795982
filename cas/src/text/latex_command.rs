//! The commands of LaTeX that formulas use: functions, spacing, sizes, environments, and advice on others.

use crate::expr::{Expr, Function};

/// A function with a command of its own.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Called {
    /// An elementary function.
    Plain(Function),
    /// Half the difference of two exponentials.
    HyperbolicSine,
    /// Half the sum of two exponentials.
    HyperbolicCosine,
    /// The quotient of the two.
    HyperbolicTangent,
    /// The cosine over the sine.
    Cotangent,
    /// One over the cosine.
    Secant,
    /// One over the sine.
    Cosecant,
}

impl Called {
    /// The function of an argument, written with the elementary functions.
    pub(super) fn of(self, argument: Expr) -> Expr {
        let of = |function| Expr::elementary(function, argument);
        let exponentials = || {
            let above = of(Function::Exponential);
            let opposite = Expr::product_of([Expr::from(-1), argument]);
            (above, Expr::elementary(Function::Exponential, opposite))
        };
        let minus = |expr| Expr::product_of([Expr::from(-1), expr]);
        match self {
            Self::Plain(function) => of(function),
            Self::HyperbolicSine => {
                let (rising, falling) = exponentials();
                Expr::sum_of([rising, minus(falling)]) / 2
            }
            Self::HyperbolicCosine => {
                let (rising, falling) = exponentials();
                Expr::sum_of([rising, falling]) / 2
            }
            Self::HyperbolicTangent => {
                let (rising, falling) = exponentials();
                Expr::sum_of([rising, minus(falling)]) / Expr::sum_of([rising, falling])
            }
            Self::Cotangent => of(Function::Cosine) / of(Function::Sine),
            Self::Secant => of(Function::Cosine).power(-1),
            Self::Cosecant => of(Function::Sine).power(-1),
        }
    }
}

/// The function of this command.
pub(super) fn function(command: &str) -> Option<Called> {
    Some(match command {
        "sinh" => Called::HyperbolicSine,
        "cosh" => Called::HyperbolicCosine,
        "tanh" => Called::HyperbolicTangent,
        "cot" => Called::Cotangent,
        "sec" => Called::Secant,
        "csc" => Called::Cosecant,
        _ => Called::Plain(
            Function::ALL
                .into_iter()
                .find(|function| function.name() == command)?,
        ),
    })
}

/// Whether an environment only arranges formulas.
pub(super) fn is_environment(name: &str) -> bool {
    const KNOWN: [&str; 15] = [
        "equation",
        "align",
        "aligned",
        "alignat",
        "alignedat",
        "xalignat",
        "gather",
        "gathered",
        "split",
        "multline",
        "eqnarray",
        "flalign",
        "displaymath",
        "math",
        "subequations",
    ];
    KNOWN.contains(&name)
}

/// Whether a word joins formulas and names nothing.
pub(super) fn is_conjunction(word: &str) -> bool {
    matches!(
        word,
        "and"
            | "or"
            | "if"
            | "for"
            | "with"
            | "where"
            | "when"
            | "since"
            | "because"
            | "so"
            | "hence"
            | "thus"
    )
}

/// Whether a command sets the size of the bracket that follows.
pub(super) fn is_size(command: &str) -> bool {
    if matches!(command, "left" | "right") {
        return true;
    }
    let size = command.strip_suffix(['l', 'r', 'm']).unwrap_or(command);
    matches!(size, "big" | "Big" | "bigg" | "Bigg")
}

/// Whether a command sets parts apart. The negative space draws them together and is ignored.
pub(super) fn is_space(command: &str) -> bool {
    matches!(
        command,
        "," | ";"
            | ":"
            | ">"
            | " "
            | "\n"
            | "\t"
            | "\r"
            | "quad"
            | "qquad"
            | "thinspace"
            | "medspace"
            | "thickspace"
            | "enspace"
            | "enskip"
            | "space"
    )
}

/// Whether a command changes nothing that is read.
pub(super) fn is_ignored(command: &str) -> bool {
    matches!(
        command,
        "!" | "negthinspace"
            | "displaystyle"
            | "textstyle"
            | "scriptstyle"
            | "nonumber"
            | "notag"
            | "limits"
            | "nolimits"
            | "allowbreak"
            | "hfill"
            | "strut"
            | "mathstrut"
            | "/"
    )
}

/// What to write instead of a command that is not read.
pub(super) fn advice(command: &str) -> &'static str {
    match command {
        "log" => "write `\\ln` for the natural logarithm; another base is a quotient of two of them",
        "arcsin" | "arccos" | "arctan" | "asin" | "acos" | "atan" | "arg" => {
            "inverse angle functions are not known: name the angle and state its sine, cosine or tangent"
        }
        "int" | "iint" | "oint" => "write the integral out, or name it and use the name",
        "sum" | "prod" => "write the terms out one by one",
        "lim" | "max" | "min" | "sup" | "inf" => "write the value out, or name it and use the name",
        "vec" | "mathbf" | "boldsymbol" | "bm" | "bold" | "overrightarrow" | "underline" => {
            "vectors and matrices are read component by component: write one equation for each"
        }
        "hat" | "bar" | "tilde" | "overline" | "widehat" | "widetilde" | "acute" | "check" | "breve"
        | "mathcal" | "mathbb" | "mathsf" | "mathfrak" | "mathtt" => {
            "letters are told apart by an index here: write `x_{0}` in place of a mark over the letter"
        }
        "abs" | "Vert" | "lVert" | "rVert" | "|" | "norm" => {
            "the absolute value is not known: write `\\sqrt{x^2}`, or state each sign as a case of its own"
        }
        "rm" | "it" | "bf" | "sf" | "cal" => "write a word in upright letters as `\\mathrm{word}`",
        "circ" | "degree" => "angles are in radians: write `\\frac{\\pi}{180}` times the number of degrees",
        "sgn" | "sign" => "state each sign as a case of its own",
        "le" | "leq" | "ge" | "geq" | "lt" | "gt" | "neq" | "ne" | "approx" | "equiv" | "sim" | "simeq"
        | "ll" | "gg" | "to" | "rightarrow" | "Rightarrow" | "implies" | "iff" | "propto" | "coloneqq" => {
            "only equations with `=` are read: write one equation on each line"
        }
        "pm" | "mp" => "write each sign as an equation of its own",
        "nabla" | "grad" | "operatorname*" => "write the derivatives out, component by component",
        "dots" | "ldots" | "cdots" => "write out what the dots leave out",
        "div" => "write a quotient with `\\frac{a}{b}`",
        "imath" | "jmath" | "Re" | "Im" => "every quantity is real: write the real part out",
        "binom" | "choose" | "over" | "substack" | "stackrel" | "overset" | "underset" | "underbrace"
        | "overbrace" | "cancel" | "color" | "boxed" | "mbox" => {
            "leave the command out and write the formula alone"
        }
        _ => {
            "leave it out, or write the part with `\\frac`, `\\sqrt`, `\\dot`, `\\sin`, powers, indices and Greek letters"
        }
    }
}

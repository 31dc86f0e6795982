//! The nodes of expressions, their interning table, equality and order.

use std::cmp::Ordering;
use std::collections::{HashMap, HashSet};
use std::hash::{BuildHasherDefault, Hash, Hasher};
use std::sync::{Mutex, OnceLock, PoisonError};

use super::symbol::{Name, Symbol};
use crate::number::Rational;

/// An exact expression. See the [module documentation](crate::expr).
///
/// ```
/// use cas::{Expr, Symbol, cos};
/// let [m, l, phi] = ["m", "l", "phi"].map(|n| Expr::from(Symbol::new(n).expect("a valid name")));
/// assert_eq!(m * l * cos(phi), cos(phi) * l * m);
/// ```
#[derive(Clone, Copy)]
pub struct Expr(&'static Node);

/// What an expression is made of.
#[derive(Clone, Debug, PartialEq)]
#[non_exhaustive]
pub enum Kind {
    /// An exact number.
    Number(Rational),
    /// The ratio of a circle's circumference to its diameter.
    Pi,
    /// A variable.
    Symbol(Symbol),
    /// A sum of at least two terms.
    Sum(Box<[Expr]>),
    /// A product of at least two factors; a numeric factor stands first.
    Product(Box<[Expr]>),
    /// A base to a rational exponent other than zero and one.
    Power(Expr, Rational),
    /// An elementary function of one argument.
    Elementary(Function, Expr),
    /// An undetermined function, or a partial derivative of one, at its arguments.
    Unknown(Application),
}

/// The elementary functions of one argument.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[non_exhaustive]
pub enum Function {
    /// The sine of an angle in radians.
    Sine,
    /// The cosine of an angle in radians.
    Cosine,
    /// The tangent of an angle in radians.
    Tangent,
    /// The exponential function.
    Exponential,
    /// The natural logarithm.
    Logarithm,
}

impl Function {
    /// Every elementary function.
    pub const ALL: [Self; 5] = [
        Self::Sine,
        Self::Cosine,
        Self::Tangent,
        Self::Exponential,
        Self::Logarithm,
    ];

    /// The name in plain notation.
    #[must_use]
    pub fn name(self) -> &'static str {
        match self {
            Self::Sine => "sin",
            Self::Cosine => "cos",
            Self::Tangent => "tan",
            Self::Exponential => "exp",
            Self::Logarithm => "ln",
        }
    }
}

/// An undetermined function at its arguments, differentiated `orders[i]` times by argument `i`.
#[derive(Clone, Debug, PartialEq)]
pub struct Application {
    pub(super) name: Name,
    pub(super) orders: Box<[u32]>,
    pub(super) arguments: Box<[Expr]>,
}

impl Application {
    /// The function's name.
    #[must_use]
    pub fn name(&self) -> Name {
        self.name
    }

    /// How often it is differentiated by each argument.
    #[must_use]
    pub fn orders(&self) -> &[u32] {
        &self.orders
    }

    /// Its arguments.
    #[must_use]
    pub fn arguments(&self) -> &[Expr] {
        &self.arguments
    }

    /// The partial derivative by the argument of this index, once more.
    #[must_use]
    pub fn differentiated(&self, argument: usize) -> Expr {
        let mut orders = self.orders.clone();
        orders[argument] += 1;
        Expr::interned(Kind::Unknown(Self {
            name: self.name,
            orders,
            arguments: self.arguments.clone(),
        }))
    }
}

struct Node {
    kind: Kind,
    hash: u64,
    total: bool,
    undefined: bool,
}

impl Expr {
    /// What the expression is made of.
    #[must_use]
    pub fn kind(self) -> &'static Kind {
        &self.0.kind
    }

    /// The parts of the expression: terms, factors, base or arguments.
    #[must_use]
    pub fn children(self) -> &'static [Expr] {
        match self.kind() {
            Kind::Number(_) | Kind::Pi | Kind::Symbol(_) => &[],
            Kind::Sum(parts) | Kind::Product(parts) => parts,
            Kind::Power(part, _) | Kind::Elementary(_, part) => std::slice::from_ref(part),
            Kind::Unknown(application) => &application.arguments,
        }
    }

    /// Whether the expression has a real value at every point: no division, root, logarithm or
    /// tangent whose argument varies. `false` means that it may lack one somewhere.
    #[must_use]
    pub fn is_total(self) -> bool {
        self.0.total
    }

    /// Whether a part has no real value anywhere, such as `1/0` or the root of a negative number.
    #[must_use]
    pub fn is_undefined(self) -> bool {
        self.0.undefined
    }

    /// A hash of the content: the same in every process.
    #[must_use]
    pub fn content_hash(self) -> u64 {
        self.0.hash
    }

    /// An address that is equal for equal expressions of one interning table; a key for caches that
    /// never decides an answer.
    pub(crate) fn address(self) -> usize {
        std::ptr::from_ref(self.0).addr()
    }

    /// The only way to a node.
    pub(super) fn interned(kind: Kind) -> Self {
        static TABLE: OnceLock<Vec<Shard>> = OnceLock::new();
        let hash = content_hash(&kind);
        let shards = TABLE.get_or_init(|| (0..16).map(|_| Shard::default()).collect());
        let shard = &shards[usize::try_from(hash >> 60).expect("invariant: four bits fit")];
        let mut shard = shard.lock().unwrap_or_else(PoisonError::into_inner);
        let bucket = shard.entry(hash).or_default();
        if let Some(node) = bucket.iter().find(|node| node.kind == kind) {
            return Self(node);
        }
        let (total, undefined) = domain(&kind);
        let node: &'static Node = Box::leak(Box::new(Node {
            kind,
            hash,
            total,
            undefined,
        }));
        bucket.push(node);
        Self(node)
    }
}

/// Nodes by content hash; the hash is already mixed, so the map need not mix it again.
type Shard = Mutex<HashMap<u64, Vec<&'static Node>, BuildHasherDefault<Mixed>>>;

/// A hasher for keys that are content hashes.
#[derive(Default)]
struct Mixed(u64);

impl Hasher for Mixed {
    fn finish(&self) -> u64 {
        self.0
    }

    fn write(&mut self, bytes: &[u8]) {
        self.0 = bytes
            .iter()
            .fold(self.0, |hash, byte| mixed(hash, u64::from(*byte)));
    }

    fn write_u64(&mut self, value: u64) {
        self.0 = value;
    }
}

fn domain(kind: &Kind) -> (bool, bool) {
    let all = |parts: &[Expr]| {
        (
            parts.iter().all(|e| e.is_total()),
            parts.iter().any(|e| e.is_undefined()),
        )
    };
    match kind {
        Kind::Number(_) | Kind::Pi | Kind::Symbol(_) => (true, false),
        Kind::Sum(parts) | Kind::Product(parts) => all(parts),
        Kind::Unknown(application) => all(&application.arguments),
        Kind::Power(base, exponent) => {
            let number = base.as_number();
            let undefined = number.is_some_and(|n| {
                (n.is_zero() && exponent.is_negative()) || (n.is_negative() && !exponent.is_integer())
            });
            let safe = (exponent.is_integer() && exponent.is_positive()) || number.is_some();
            (
                base.is_total() && safe && !undefined,
                base.is_undefined() || undefined,
            )
        }
        Kind::Elementary(function, argument) => {
            let number = argument.as_number();
            let (safe, undefined) = match function {
                Function::Sine | Function::Cosine | Function::Exponential => (true, false),
                // The tangent of a rational number is defined: its argument is no multiple of pi / 2 but zero.
                Function::Tangent => (number.is_some(), false),
                Function::Logarithm => (
                    number.is_some_and(Rational::is_positive),
                    number.is_some_and(|n| !n.is_positive()),
                ),
            };
            (argument.is_total() && safe, argument.is_undefined() || undefined)
        }
    }
}

fn mixed(hash: u64, value: u64) -> u64 {
    // The finalizer of splitmix64 over a running value: cheap, and the same on every machine.
    let mut z = (hash.rotate_left(23) ^ value).wrapping_add(0x9e37_79b9_7f4a_7c15);
    z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    z ^ (z >> 31)
}

fn hash_text(hash: u64, text: &str) -> u64 {
    text.bytes()
        .fold(mixed(hash, text.len() as u64), |h, b| mixed(h, u64::from(b)))
}

fn hash_number(hash: u64, number: &Rational) -> u64 {
    match number.as_small() {
        Some((n, d)) => mixed(mixed(hash, n.cast_unsigned()), d.cast_unsigned()),
        None => hash_text(hash, &number.to_string()),
    }
}

fn content_hash(kind: &Kind) -> u64 {
    let parts = |tag, parts: &[Expr]| {
        parts
            .iter()
            .fold(mixed(tag, parts.len() as u64), |h, e| mixed(h, e.0.hash))
    };
    match kind {
        Kind::Number(n) => hash_number(1, n),
        Kind::Pi => mixed(2, 0),
        Kind::Symbol(s) => mixed(hash_text(3, s.name().as_str()), u64::from(s.primes())),
        Kind::Sum(terms) => parts(4, terms),
        Kind::Product(factors) => parts(5, factors),
        Kind::Power(base, exponent) => hash_number(mixed(6, base.0.hash), exponent),
        Kind::Elementary(function, argument) => mixed(mixed(7, *function as u64), argument.0.hash),
        Kind::Unknown(a) => {
            let named = hash_text(parts(8, &a.arguments), a.name.as_str());
            a.orders
                .iter()
                .fold(named, |h, order| mixed(h, u64::from(*order)))
        }
    }
}

/// Order of two nodes without looking below their children.
fn shallow_order(a: &Kind, b: &Kind) -> Ordering {
    let rank = |kind: &Kind| match kind {
        Kind::Number(_) => 0,
        Kind::Pi => 1,
        Kind::Symbol(_) => 2,
        Kind::Sum(_) => 3,
        Kind::Product(_) => 4,
        Kind::Power(..) => 5,
        Kind::Elementary(..) => 6,
        Kind::Unknown(_) => 7,
    };
    let same = match (a, b) {
        (Kind::Number(x), Kind::Number(y)) | (Kind::Power(_, x), Kind::Power(_, y)) => x.cmp(y),
        (Kind::Symbol(x), Kind::Symbol(y)) => x.cmp(y),
        (Kind::Sum(x), Kind::Sum(y)) | (Kind::Product(x), Kind::Product(y)) => x.len().cmp(&y.len()),
        (Kind::Elementary(x, _), Kind::Elementary(y, _)) => x.cmp(y),
        (Kind::Unknown(x), Kind::Unknown(y)) => (x.name, &x.orders).cmp(&(y.name, &y.orders)),
        _ => Ordering::Equal,
    };
    rank(a).cmp(&rank(b)).then(same)
}

/// Order of two nodes of equal hash but different address: equal content from two tables, or a
/// collision. An explicit stack and a set of pairs seen keep it linear in shared graphs.
fn deep_order(a: Expr, b: Expr) -> Ordering {
    let (mut stack, mut seen) = (vec![(a, b)], HashSet::new());
    while let Some((a, b)) = stack.pop() {
        if a.address() == b.address() || !seen.insert((a.address(), b.address())) {
            continue;
        }
        let order =
            a.0.hash
                .cmp(&b.0.hash)
                .then_with(|| shallow_order(a.kind(), b.kind()));
        if order.is_ne() {
            return order;
        }
        stack.extend(a.children().iter().copied().zip(b.children().iter().copied()));
    }
    Ordering::Equal
}

impl PartialEq for Expr {
    fn eq(&self, other: &Self) -> bool {
        std::ptr::eq(self.0, other.0) || (self.0.hash == other.0.hash && deep_order(*self, *other).is_eq())
    }
}

impl Eq for Expr {}

impl Hash for Expr {
    fn hash<H: Hasher>(&self, state: &mut H) {
        state.write_u64(self.0.hash);
    }
}

impl Ord for Expr {
    fn cmp(&self, other: &Self) -> Ordering {
        if std::ptr::eq(self.0, other.0) {
            return Ordering::Equal;
        }
        self.0
            .hash
            .cmp(&other.0.hash)
            .then_with(|| deep_order(*self, *other))
    }
}

impl PartialOrd for Expr {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        Some(self.cmp(other))
    }
}

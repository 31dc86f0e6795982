//! How names, symbols, expressions and conditions are written in a record: in plain notation.

use cas::text::{Arrangement, Scope, plain, read};
use cas::{Expr, Name, Symbol};
use serde::de::Error;
use serde::{Deserialize, Deserializer, Serializer};

use crate::model::Condition;

/// A name as its text.
pub(super) mod name {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(name: &Name, to: S) -> Result<S::Ok, S::Error> {
        to.serialize_str(name.as_str())
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(from: D) -> Result<Name, D::Error> {
        read_name(&String::deserialize(from)?).map_err(D::Error::custom)
    }
}

/// A name, or null.
pub(super) mod optional_name {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(name: &Option<Name>, to: S) -> Result<S::Ok, S::Error> {
        match name {
            Some(name) => to.serialize_some(name.as_str()),
            None => to.serialize_none(),
        }
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(
        from: D,
    ) -> Result<Option<Name>, D::Error> {
        Option::<String>::deserialize(from)?
            .map(|text| read_name(&text).map_err(D::Error::custom))
            .transpose()
    }
}

/// A symbol as its name with its primes.
pub(super) mod symbol {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(symbol: &Symbol, to: S) -> Result<S::Ok, S::Error> {
        to.collect_str(symbol)
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(from: D) -> Result<Symbol, D::Error> {
        let text = String::deserialize(from)?;
        let name = text.trim_end_matches('\'');
        let primes = u8::try_from(text.len() - name.len())
            .map_err(|_| D::Error::custom(format!("`{name}` has more than 255 primes")))?;
        let name = read_name(name).map_err(D::Error::custom)?;
        Ok(Symbol::from(name).with_primes(primes))
    }
}

/// An expression in plain notation.
pub(super) mod expr {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(expr: &Expr, to: S) -> Result<S::Ok, S::Error> {
        to.serialize_str(&text_of(*expr))
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(from: D) -> Result<Expr, D::Error> {
        read_expr(&String::deserialize(from)?).map_err(D::Error::custom)
    }
}

/// Rows of expressions in plain notation.
pub(super) mod rows {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(rows: &[Vec<Expr>], to: S) -> Result<S::Ok, S::Error> {
        to.collect_seq(
            rows.iter()
                .map(|row| row.iter().copied().map(text_of).collect::<Vec<_>>()),
        )
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(
        from: D,
    ) -> Result<Vec<Vec<Expr>>, D::Error> {
        Vec::<Vec<String>>::deserialize(from)?
            .iter()
            .map(|row| row.iter().map(|text| read_expr(text)).collect())
            .collect::<Result<_, _>>()
            .map_err(D::Error::custom)
    }
}

/// Conditions, each as an expression, a sign and zero.
pub(super) mod conditions {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(
        conditions: &[Condition],
        to: S,
    ) -> Result<S::Ok, S::Error> {
        to.collect_seq(conditions.iter().map(|condition| condition_text(*condition)))
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(
        from: D,
    ) -> Result<Vec<Condition>, D::Error> {
        Vec::<String>::deserialize(from)?
            .iter()
            .map(|text| read_condition(text))
            .collect::<Result<_, _>>()
            .map_err(D::Error::custom)
    }
}

/// An expression in plain notation, in the order of content.
pub(super) fn text_of(expr: Expr) -> String {
    plain(expr, &Arrangement::default())
}

/// A condition in plain notation.
pub(super) fn condition_text(condition: Condition) -> String {
    let sign = match condition {
        Condition::NotZero(_) => "!=",
        Condition::NotNegative(_) => ">=",
        Condition::Positive(_) => ">",
    };
    format!("{} {sign} 0", text_of(condition.expr()))
}

fn read_name(text: &str) -> Result<Name, String> {
    Name::new(text).map_err(|error| format!("{error}; {}", error.hint()))
}

fn read_expr(text: &str) -> Result<Expr, String> {
    read(text, &Scope::open()).map_err(|error| format!("{error}\n{}", error.hint()))
}

fn read_condition(text: &str) -> Result<Condition, String> {
    // The longer sign first: `>` is a part of `>=`.
    type Kind = fn(Expr) -> Condition;
    let signs: [(&str, Kind); 3] = [
        (" != 0", Condition::NotZero),
        (" >= 0", Condition::NotNegative),
        (" > 0", Condition::Positive),
    ];
    for (sign, kind) in signs {
        if let Some(expr) = text.strip_suffix(sign) {
            return read_expr(expr).map(kind);
        }
    }
    Err(format!(
        "`{text}` is no condition; write an expression and then `!= 0`, `>= 0` or `> 0`"
    ))
}

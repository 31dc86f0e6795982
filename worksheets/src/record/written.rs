//! How names, symbols, expressions and conditions are written in a record: in plain notation.

use cas::text::{Arrangement, Scope, plain, read};
use cas::{Expr, Name, Symbol};
use serde::de::Error;
use serde::{Deserialize, Deserializer, Serialize, Serializer};

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
        Written(*expr).serialize(to)
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(from: D) -> Result<Expr, D::Error> {
        Written::deserialize(from).map(|written| written.0)
    }
}

/// Three components in plain notation.
pub(super) mod components {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(vector: &[Expr; 3], to: S) -> Result<S::Ok, S::Error> {
        to.collect_seq(vector.iter().map(|component| Written(*component)))
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(from: D) -> Result<[Expr; 3], D::Error> {
        let [x, y, z] = <[Written; 3]>::deserialize(from)?;
        Ok([x.0, y.0, z.0])
    }
}

/// Rows of expressions in plain notation.
pub(super) mod rows {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(rows: &[Vec<Expr>], to: S) -> Result<S::Ok, S::Error> {
        let row = |row: &Vec<Expr>| row.iter().copied().map(Written).collect::<Vec<_>>();
        to.collect_seq(rows.iter().map(row))
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(
        from: D,
    ) -> Result<Vec<Vec<Expr>>, D::Error> {
        let rows = Vec::<Vec<Written>>::deserialize(from)?;
        let row = |row: Vec<Written>| row.into_iter().map(|written| written.0).collect();
        Ok(rows.into_iter().map(row).collect())
    }
}

/// Conditions, each as an expression, a sign and zero.
pub(super) mod conditions {
    use super::*;

    pub(in super::super) fn serialize<S: Serializer>(
        conditions: &[Condition],
        to: S,
    ) -> Result<S::Ok, S::Error> {
        to.collect_seq(conditions.iter().copied().map(WrittenCondition))
    }

    pub(in super::super) fn deserialize<'de, D: Deserializer<'de>>(
        from: D,
    ) -> Result<Vec<Condition>, D::Error> {
        let conditions = Vec::<WrittenCondition>::deserialize(from)?;
        Ok(conditions.into_iter().map(|written| written.0).collect())
    }
}

/// An expression that is stored as text.
struct Written(Expr);

impl Serialize for Written {
    fn serialize<S: Serializer>(&self, to: S) -> Result<S::Ok, S::Error> {
        let text = readable_text(self.0).map_err(serde::ser::Error::custom)?;
        to.serialize_str(&text)
    }
}

impl<'de> Deserialize<'de> for Written {
    fn deserialize<D: Deserializer<'de>>(from: D) -> Result<Self, D::Error> {
        let text = String::deserialize(from)?;
        read_expr(&text).map(Self).map_err(D::Error::custom)
    }
}

/// A condition that is stored as text.
struct WrittenCondition(Condition);

impl Serialize for WrittenCondition {
    fn serialize<S: Serializer>(&self, to: S) -> Result<S::Ok, S::Error> {
        readable_text(self.0.expr()).map_err(serde::ser::Error::custom)?;
        to.serialize_str(&condition_text(self.0))
    }
}

impl<'de> Deserialize<'de> for WrittenCondition {
    fn deserialize<D: Deserializer<'de>>(from: D) -> Result<Self, D::Error> {
        let text = String::deserialize(from)?;
        read_condition(&text).map(Self).map_err(D::Error::custom)
    }
}

/// The text of an expression, after it was seen that it reads back as the same.
fn readable_text(expr: Expr) -> Result<String, String> {
    let text = text_of(expr);
    match read(&text, &Scope::open()) {
        Ok(read) if read == expr => Ok(text),
        Ok(_) => Err("the text of the expression does not read back as the same".to_owned()),
        Err(error) => Err(format!(
            "the text of the expression does not read back: {}",
            error.what
        )),
    }
}

/// JSON that stands where it should not, short enough for a message.
pub(super) fn shortened(value: &serde_json::Value) -> String {
    let text = value.to_string();
    match text.char_indices().nth(40) {
        Some((place, _)) => format!("{}...", &text[..place]),
        None => text,
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

//! Conditions brought in order: none twice, and none that another implies.

use super::condition::Condition;

/// The conditions without repetitions; `x >= 0` and `x != 0` together become `x > 0`.
///
/// ```
/// use cas::{Condition, Expr, decide::tidied};
/// let x = Expr::symbol("x")?;
/// let both = vec![Condition::NotNegative(x), Condition::NotZero(x)];
/// assert_eq!(tidied(both), [Condition::Positive(x)]);
/// # Ok::<(), cas::NameError>(())
/// ```
#[must_use]
pub fn tidied(conditions: Vec<Condition>) -> Vec<Condition> {
    let mut tidy: Vec<Condition> = Vec::new();
    for condition in conditions {
        let expr = condition.expr();
        match tidy.iter_mut().find(|known| known.expr() == expr) {
            Some(known) if *known == condition => {}
            // Any two different conditions on one expression say that it is above zero.
            Some(known) => *known = Condition::Positive(expr),
            None => tidy.push(condition),
        }
    }
    tidy
}

//! MathML from TeX by the crate `katex`, on one thread of its own with a deep stack.
//!
//! The script engine measures its stack from where it is first used, and fails on nested fractions
//! from a shallow one; it cannot be interrupted, so a size guard stands before it.

use std::sync::mpsc::{Receiver, Sender, channel};
use std::sync::{Mutex, OnceLock, PoisonError};

/// TeX longer than this is left as TeX: its cost grows faster than its length, and the front end
/// that has a typesetter of its own can still show it.
const MOST_BYTES: usize = 4_000;

/// Deeper nesting of braces than this is left as TeX.
const MOST_DEPTH: usize = 40;

/// Stack of the typesetting thread.
const STACK_BYTES: usize = 64 << 20;

struct Order {
    tex: String,
    display: bool,
    answer: Sender<Option<String>>,
}

/// The MathML of a formula; `None` where it is too large, or no TeX that the typesetter accepts.
pub(super) fn mathml(tex: &str, display: bool) -> Option<String> {
    if !is_modest(tex) {
        return None;
    }
    let (answer, received) = channel();
    let order = Order {
        tex: tex.to_owned(),
        display,
        answer,
    };
    let sent = {
        let desk = desk()?;
        let desk = desk.lock().unwrap_or_else(PoisonError::into_inner);
        desk.send(order).is_ok()
    };
    if sent {
        received.recv().ok().flatten()
    } else {
        None
    }
}

/// Whether a formula is small enough to be typeset here.
pub(super) fn is_modest(tex: &str) -> bool {
    let mut depth = 0_usize;
    let mut deepest = 0;
    for byte in tex.bytes() {
        match byte {
            b'{' => depth += 1,
            b'}' => depth = depth.saturating_sub(1),
            _ => {}
        }
        deepest = deepest.max(depth);
    }
    tex.len() <= MOST_BYTES && deepest <= MOST_DEPTH
}

/// Where orders are taken; one thread per process serves them.
fn desk() -> Option<&'static Mutex<Sender<Order>>> {
    static DESK: OnceLock<Option<Mutex<Sender<Order>>>> = OnceLock::new();
    DESK.get_or_init(|| {
        let (desk, orders) = channel();
        let thread = std::thread::Builder::new()
            .name("typesetting".to_owned())
            .stack_size(STACK_BYTES);
        thread.spawn(move || serve(&orders)).ok()?;
        Some(Mutex::new(desk))
    })
    .as_ref()
}

fn serve(orders: &Receiver<Order>) {
    for order in orders {
        let options = katex::Opts::builder()
            .display_mode(order.display)
            .output_type(katex::OutputType::Mathml)
            .throw_on_error(true)
            .trust(false)
            .build();
        let typeset = options
            .ok()
            .and_then(|options| katex::render_with_opts(&order.tex, options).ok());
        // Nobody waits for the answer any more when the asking thread has ended.
        drop(order.answer.send(typeset.and_then(|html| bare(&html))));
    }
}

/// The `math` element without what the typesetter wraps around it.
///
/// Dots over letters lose their mark as accents: without a mathematics font a browser lays an
/// accent over its letter, where a single dot cannot be seen, and a rate must not read as a position.
fn bare(html: &str) -> Option<String> {
    let from = html.find("<math")?;
    let to = html.rfind("</math>")? + "</math>".len();
    let math = html.get(from..to)?;
    Some(math.replace("<mover accent=\"true\">", "<mover>"))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn formulas_become_mathml() {
        let made = mathml("\\ddot{x} = \\frac{F}{m}", true).expect("accepted");
        assert!(made.starts_with("<math") && made.ends_with("</math>"), "{made}");
        assert!(made.contains("<mfrac>") && made.contains("application/x-tex"));
        assert!(
            made.contains("<mover><mi>x</mi>"),
            "the dots stand above the letter"
        );
    }

    #[test]
    fn twenty_nested_fractions_are_typeset() {
        let nested = (0..20).fold("x".to_owned(), |inner, _| format!("\\frac{{1}}{{1+{inner}}}"));
        assert!(mathml(&nested, true).is_some());
    }

    #[test]
    fn wrong_and_oversized_tex_is_declined() {
        assert_eq!(mathml("\\nonsense{", true), None);
        assert_eq!(mathml(&"x+".repeat(MOST_BYTES), true), None);
        assert_eq!(
            mathml(&format!("{}x{}", "{".repeat(100), "}".repeat(100)), true),
            None
        );
    }
}

//! What arranges formulas on a page and is no part of them: environments, columns, broken lines.

use std::collections::VecDeque;

use super::fault::ReadFault;
use super::latex_token::{Mark, Placed, Token};

/// The tokens of the formulas alone. What is left of the layout are the ends of lines that end a
/// formula; braces know their partners.
pub(super) fn without_layout(tokens: Vec<Token>, end: usize) -> Result<Vec<Token>, Placed> {
    let tokens = without_environments(tokens, end)?;
    let tokens = without_columns(tokens)?;
    let mut tokens = without_breaks(tokens)?;
    pair_braces(&mut tokens, end)?;
    Ok(tokens)
}

fn latex(expected: &'static str, found: Option<&str>) -> ReadFault {
    ReadFault::Latex {
        expected,
        found: found.map(str::to_owned),
    }
}

/// The full stop or comma of the sentence around a formula, or an empty line.
fn ends_sentence(mark: &Mark) -> bool {
    matches!(mark, Mark::Point | Mark::Comma | Mark::Break)
}

/// Takes away the marks of formulas and environments around the whole.
fn without_environments(mut tokens: Vec<Token>, end: usize) -> Result<Vec<Token>, Placed> {
    let opening = tokens
        .iter()
        .take_while(|token| matches!(token.mark, Mark::Begin(_)))
        .count();
    // The end of the outermost comes last.
    let mut open: VecDeque<Token> = tokens.drain(..opening).collect();
    loop {
        let ending = tokens
            .iter()
            .rposition(|token| !ends_sentence(&token.mark))
            .filter(|at| matches!(tokens[*at].mark, Mark::End(_)));
        let Some(at) = ending else { break };
        // A comma behind the environment belongs to the sentence, as one within it does.
        tokens.truncate(at + 1);
        let Some(Token {
            mark: Mark::End(name),
            place,
            ..
        }) = tokens.pop()
        else {
            break;
        };
        match open.pop_front() {
            Some(Token {
                mark: Mark::Begin(begun),
                ..
            }) if begun == name => {}
            _ => {
                let begin = tokens.iter().find(|token| matches!(token.mark, Mark::Begin(_)));
                return Err(match begin {
                    Some(token) => (between(&name), token.place),
                    None => (latex("the beginning of it before this end", Some(&name)), place),
                });
            }
        }
    }
    if let Some(Token {
        mark: Mark::Begin(begun),
        ..
    }) = open.pop_front()
    {
        // What is not closed at the end may be closed in the middle.
        let stray = tokens.iter().find(|token| matches!(token.mark, Mark::End(_)));
        return Err(stray.map_or_else(
            || (latex("the end of what begins the formula", None), end),
            |token| (between(&begun), token.place),
        ));
    }
    match tokens.iter().find_map(|token| match &token.mark {
        Mark::Begin(name) | Mark::End(name) => Some((name, token.place)),
        _ => None,
    }) {
        Some((name, place)) => Err((between(name), place)),
        None => Ok(tokens),
    }
}

fn between(name: &str) -> ReadFault {
    if name.starts_with(['$', '\\']) {
        ReadFault::Unclear {
            what: "there is more than one formula",
            instead: "give one formula or one environment at a time, without words between",
        }
    } else {
        ReadFault::Environment {
            name: name.to_owned(),
        }
    }
}

/// Takes away the signs of alignment, which stand at the beginning of a line or beside an operator.
fn without_columns(tokens: Vec<Token>) -> Result<Vec<Token>, Placed> {
    let mut kept: Vec<Token> = Vec::with_capacity(tokens.len());
    // Whether the line has a sign of equality, and the column after it that begins with another sign.
    let (mut equals, mut divided) = (false, None);
    let mut waiting = None;
    let several = |place| {
        let fault = ReadFault::Unclear {
            what: "there are several formulas in one line",
            instead: "write each equation on a line of its own, with `\\\\` between them",
        };
        (fault, place)
    };
    for token in tokens {
        if token.mark == Mark::Column {
            // An empty pair of braces sets the spacing of the operator in the next column.
            if let [.., open, close] = kept.as_slice()
                && (&open.mark, &close.mark) == (&Mark::OpenGroup, &Mark::CloseGroup)
            {
                kept.truncate(kept.len() - 2);
            }
            let before = kept.last().is_none_or(|last| is_operator(&last.mark));
            // Of signs side by side the first counts.
            if waiting.is_none() && !before {
                waiting = Some(token.place);
            }
            continue;
        }
        if let Some(place) = waiting.take() {
            if !is_operator(&token.mark) {
                return Err(several(place));
            }
            if equals && token.mark != Mark::Equals {
                divided = divided.or(Some(place));
            }
        }
        match (&token.mark, divided) {
            (Mark::Break, _) => (equals, divided) = (false, None),
            // What may be a broken line is a second equation.
            (Mark::Equals, Some(place)) => return Err(several(place)),
            (Mark::Equals, None) => equals = true,
            _ => {}
        }
        kept.push(token);
    }
    Ok(kept)
}

fn is_operator(mark: &Mark) -> bool {
    matches!(
        mark,
        Mark::Equals | Mark::Plus | Mark::Minus | Mark::Times | Mark::Slash | Mark::Break
    )
}

/// Takes away the ends of lines that break a formula, and the punctuation at the end of one.
fn without_breaks(tokens: Vec<Token>) -> Result<Vec<Token>, Placed> {
    let mut kept: Vec<Token> = Vec::with_capacity(tokens.len());
    let mut depth = 0_usize;
    // Whether the line that is being read, and the formula before it, have a sign of equality.
    let (mut line_equals, mut formula_equals) = (false, false);
    let mut tokens = tokens.into_iter().peekable();
    let mut line = Vec::new();
    loop {
        let token = tokens.next();
        match token.as_ref().map(|token| &token.mark) {
            Some(Mark::Open(_) | Mark::OpenGroup) => depth += 1,
            Some(Mark::Close(_) | Mark::CloseGroup) => depth = depth.saturating_sub(1),
            Some(Mark::Equals) => line_equals = true,
            Some(Mark::Break) if depth > 0 => continue,
            Some(Mark::Break) | None => {
                let is_last = token.is_none();
                let first = line
                    .first()
                    .map(|token: &Token| (token.mark.clone(), token.place));
                if let Some((first, place)) = first {
                    let before = !kept.is_empty();
                    let unfinished = kept.len() > 1 && is_operator(&kept[kept.len() - 2].mark);
                    if before && (unfinished || goes_on(&first, line_equals, formula_equals, place)?) {
                        kept.pop();
                        formula_equals |= line_equals;
                    } else {
                        formula_equals = line_equals;
                    }
                    kept.append(&mut line);
                    line_equals = false;
                    kept.extend(token);
                }
                if is_last {
                    break;
                }
                continue;
            }
            Some(_) => {}
        }
        line.extend(token);
    }
    Ok(without_punctuation(kept))
}

/// Whether a line goes on with the formula of the line before.
fn goes_on(first: &Mark, equals: bool, equals_before: bool, place: usize) -> Result<bool, Placed> {
    match first {
        Mark::Plus | Mark::Times => Ok(true),
        Mark::Minus if !equals => Ok(true),
        // The left side may have been broken, or this may be an equation of its own.
        Mark::Minus if !equals_before => Err((
            ReadFault::Unclear {
                what: "it is not clear whether this line goes on with the one before",
                instead: "write the left side on one line",
            },
            place,
        )),
        _ => Ok(false),
    }
}

fn without_punctuation(tokens: Vec<Token>) -> Vec<Token> {
    let mut kept: Vec<Token> = Vec::with_capacity(tokens.len());
    for token in tokens {
        if token.mark == Mark::Break {
            drop_punctuation(&mut kept);
        }
        kept.push(token);
    }
    while kept.last().is_some_and(|last| last.mark == Mark::Break) {
        kept.pop();
    }
    drop_punctuation(&mut kept);
    kept
}

fn drop_punctuation(tokens: &mut Vec<Token>) {
    if tokens
        .last()
        .is_some_and(|last| matches!(last.mark, Mark::Point | Mark::Comma))
    {
        tokens.pop();
    }
}

fn pair_braces(tokens: &mut [Token], end: usize) -> Result<(), Placed> {
    let mut open = Vec::new();
    for at in 0..tokens.len() {
        match tokens[at].mark {
            Mark::OpenGroup => open.push(at),
            Mark::CloseGroup => {
                let partner = open.pop().ok_or_else(|| {
                    (
                        latex("an opening brace before this one", Some("}")),
                        tokens[at].place,
                    )
                })?;
                tokens[at].partner = partner;
                tokens[partner].partner = at;
            }
            _ => {}
        }
    }
    match open.pop() {
        Some(_) => Err((latex("a closing brace `}`", None), end)),
        None => Ok(()),
    }
}

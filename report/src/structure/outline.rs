//! A first look at a SMILES: its size, where each atom stands, in which order ring bonds are written.
//!
//! The SMILES crate behind [`super::smiles`] recurses, so that nesting and length must be bounded before it sees the string. The same
//! pass notes what the crate does not hand out: the place of every atom (for errors) and of every ring-closure digit (the order of the
//! neighbours of a stereocentre depends on it).

use std::ops::Range;

use super::capacity::MAX_ATOMS;
use super::error::StructureError;

/// Longest SMILES in bytes: 16 for each atom of the largest structure.
pub(super) const MAX_LENGTH: usize = 16 * MAX_ATOMS;

/// Deepest nesting of parentheses: far beyond a written structure, far below what overflows a thread's stack.
pub(super) const MAX_DEPTH: usize = 64;

/// One end of a ring bond.
struct RingEnd {
    atom: usize,
    label: u32,
    bond: Option<u8>,
    partner: Option<usize>,
}

/// Where the atoms and the ring bonds of a SMILES stand.
#[derive(Default)]
pub(super) struct Outline {
    atoms: Vec<Range<usize>>,
    ring_ends: Vec<RingEnd>,
}

impl Outline {
    /// Reads the outline of a trimmed SMILES; rejects what is too large or not one molecule.
    pub(super) fn of(smiles: &str) -> Result<Self, StructureError> {
        if smiles.is_empty() {
            return Err(StructureError::Empty);
        }
        if smiles.len() > MAX_LENGTH {
            return Err(StructureError::TooLong {
                length: smiles.len(),
                limit: MAX_LENGTH,
            });
        }
        if let Some((start, alien)) = smiles.char_indices().find(|(_, c)| !c.is_ascii_graphic()) {
            return Err(StructureError::Syntax {
                message: alien_character(alien),
                span: start..start + alien.len_utf8(),
            });
        }
        let mut outline = Self::default();
        let mut branches = Vec::new();
        let mut current = None;
        let mut bond = None;
        let mut at = 0;
        while let Some(&byte) = smiles.as_bytes().get(at) {
            let end = token_end(smiles, at)?;
            let span = at..end;
            match byte {
                b'(' => {
                    branches.push(current);
                    if branches.len() > MAX_DEPTH {
                        return Err(StructureError::TooDeep {
                            span,
                            limit: MAX_DEPTH,
                        });
                    }
                }
                b')' => current = branches.pop().unwrap_or(current),
                b'0'..=b'9' | b'%' => {
                    let label = label(smiles, &span)?;
                    if let Some(atom) = current {
                        outline.ring_end(atom, label, bond.take(), span)?;
                    }
                }
                b'-' | b'=' | b'#' | b':' | b'/' | b'\\' => bond = Some(byte),
                b'$' => return Err(StructureError::QuadrupleBond { span }),
                b'.' => return Err(StructureError::Fragments { span: Some(span) }),
                b'>' => return Err(StructureError::Reaction { span }),
                b'*' => return Err(placeholder(smiles, span)),
                _ => {
                    if outline.atoms.len() == MAX_ATOMS {
                        return Err(StructureError::TooManyAtoms { span: Some(span) });
                    }
                    current = Some(outline.atoms.len());
                    bond = None;
                    outline.atoms.push(span);
                }
            }
            at = end;
        }
        if let Some(open) = outline.ring_ends.iter().find(|end| end.partner.is_none()) {
            return Err(StructureError::Syntax {
                message: format!(
                    "ring bond {} is opened here but never closed: repeat the digit at the other end of the bond",
                    open.label
                ),
                span: outline.atoms[open.atom].clone(),
            });
        }
        Ok(outline)
    }

    /// Where an atom is written.
    pub(super) fn atom(&self, atom: usize) -> Option<Range<usize>> {
        self.atoms.get(atom).cloned()
    }

    /// The atom whose text contains a byte.
    pub(super) fn containing(&self, byte: usize) -> Option<Range<usize>> {
        self.atoms.iter().find(|span| span.contains(&byte)).cloned()
    }

    /// The atoms at the other ends of an atom's ring-closure digits, in the order of the digits.
    pub(super) fn ring_partners(&self, atom: usize) -> impl Iterator<Item = usize> {
        self.ring_ends
            .iter()
            .filter(move |end| end.atom == atom)
            .filter_map(|end| end.partner)
    }

    fn ring_end(
        &mut self,
        atom: usize,
        label: u32,
        bond: Option<u8>,
        span: Range<usize>,
    ) -> Result<(), StructureError> {
        let mut partner = None;
        if let Some(open) = self
            .ring_ends
            .iter_mut()
            .find(|end| end.partner.is_none() && end.label == label)
        {
            if let (Some(a), Some(b)) = (open.bond, bond)
                && a != b
                && [a, b].iter().any(|c| !matches!(c, b'/' | b'\\'))
            {
                return Err(StructureError::Syntax {
                    message: format!(
                        "ring bond {label} is '{}' at one end and '{}' at the other: write the same bond at both ends, or at one only",
                        char::from(a),
                        char::from(b)
                    ),
                    span,
                });
            }
            open.partner = Some(atom);
            partner = Some(open.atom);
        }
        self.ring_ends.push(RingEnd {
            atom,
            label,
            bond,
            partner,
        });
        Ok(())
    }
}

/// Where the token that begins at `start` ends.
fn token_end(smiles: &str, start: usize) -> Result<usize, StructureError> {
    let rest = &smiles[start..];
    let first = rest.chars().next().unwrap_or_default();
    let length = match first {
        '[' => rest
            .find(']')
            .map(|close| close + 1)
            .ok_or_else(|| StructureError::Syntax {
                message: "the bracket is never closed: add ']' after the atom".into(),
                span: start..smiles.len(),
            })?,
        '%' if rest[1..].starts_with('(') => rest.find(')').map_or(1, |close| close + 1),
        '%' => {
            1 + rest[1..]
                .bytes()
                .take(2)
                .take_while(u8::is_ascii_digit)
                .count()
        }
        'C' if rest.starts_with("Cl") => 2,
        'B' if rest.starts_with("Br") => 2,
        _ => 1,
    };
    Ok(start + length)
}

fn alien_character(c: char) -> String {
    if c.is_whitespace() {
        "white space inside the SMILES: give the string alone, the name elsewhere".into()
    } else {
        format!(
            "{c:?} does not belong in a SMILES: only ASCII letters, digits and - = # : / \\ ( ) [ ] % @ + do"
        )
    }
}

/// The number of a ring-closure token `3`, `%12`, `%(123)`.
fn label(smiles: &str, span: &Range<usize>) -> Result<u32, StructureError> {
    let token = &smiles[span.clone()];
    let digits = match token.strip_prefix('%') {
        None => Some(token),
        Some(number) if number.starts_with('(') => number
            .strip_prefix('(')
            .and_then(|number| number.strip_suffix(')')),
        Some(number) => Some(number).filter(|number| number.len() == 2),
    };
    digits
        .filter(|digits| digits.bytes().all(|byte| byte.is_ascii_digit()))
        .and_then(|digits| digits.parse().ok())
        .ok_or_else(|| StructureError::Syntax {
            message: "a two-digit number is missing after %: write the ring bond as %10 to %99"
                .into(),
            span: span.clone(),
        })
}

fn placeholder(smiles: &str, span: Range<usize>) -> StructureError {
    StructureError::Placeholder {
        symbol: smiles[span.clone()].to_owned(),
        span: Some(span),
        atom: None,
    }
}

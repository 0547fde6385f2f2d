//! The V2000 connection table: counts line, atom block, bond block, property block.
//!
//! Fields are read by their columns; where these do not parse, by blanks. Charges: a `M  CHG` or `M  RAD` line supersedes
//! every charge of the atom block. Bond types 1 to 3 are orders, 4 (aromatic) is 1.5; query types are refused, since a
//! query is no molecule.

use super::ctfile::{Fault, expected};
use super::lines::{Line, decimal, integer, quoted};
use super::record::{Record, bonded_twice};
use super::xyz::LARGEST_COORDINATE_A;
use crate::molecule::Bond;
use crate::tables::element_by_text;

/// Reads a connection table that begins with its counts line; returns the number of lines that belong to it.
pub(super) fn read(lines: &[Line], record: &mut Record) -> Result<usize, Fault> {
    let (atoms, bonds, chiral) = counts(lines.first())?;
    record.stereo.chiral = chiral;
    if atoms == 0 {
        let line = lines.first().map_or(0, |line| line.number);
        return Err((line, "the record has no atoms".to_owned()));
    }
    let end = lines.first().map_or(0, |line| line.number) + lines.len() as u64;
    let mut charges = Vec::new();
    let mut at = 1;
    for number in 1..=atoms {
        let line = lines.get(at).ok_or_else(|| (end, expected(&format!("atom {number} of {atoms}"), None)))?;
        let charge = atom(line, number, atoms, record)?;
        charges.push(charge);
        at += 1;
    }
    let mut stated = Vec::new();
    for number in 1..=bonds {
        let line = lines.get(at).ok_or_else(|| (end, expected(&format!("bond {number} of {bonds}"), None)))?;
        stated.push(bond(line, number, bonds, atoms, record)?);
        at += 1;
    }
    repeated(&stated, lines, 1 + atoms)?;
    at += properties(lines.get(at..).unwrap_or(&[]), atoms, &mut charges, record)?;
    let charged = charges.iter().any(|&charge| charge != 0);
    // Several atoms, no bond, no charge: the file gives atoms only, and the bonds are found from the coordinates.
    if atoms == 1 || bonds > 0 || charged {
        record.formal_charge = Some(charges);
        record.bonds = Some(stated);
    }
    Ok(at)
}

/// Numbers of atoms and bonds, and the chiral flag.
fn counts(line: Option<&Line>) -> Result<(usize, usize, bool), Fault> {
    let Some(line) = line else { return Err((0, expected("the counts line", None))) };
    let text = &line.text;
    let by_columns = || Some((field(text, 0, 3)?, field(text, 3, 6)?));
    let by_blanks = || {
        let mut words = text.split_whitespace();
        Some((integer(words.next()?)?, integer(words.next()?)?))
    };
    let size = |n: i64| usize::try_from(n).ok().filter(|&n| n <= 1_000_000);
    match by_columns().or_else(by_blanks) {
        Some((atoms, bonds)) => match (size(atoms), size(bonds)) {
            (Some(atoms), Some(bonds)) => Ok((atoms, bonds, field(text, 12, 15) == Some(1))),
            _ => Err((
                line.number,
                format!("the counts are {atoms} atoms and {bonds} bonds; expected 0 to 999 (free format: 1000000)"),
            )),
        },
        None => Err((line.number, expected("a counts line (number of atoms, number of bonds)", Some(line)))),
    }
}

/// A whole number in columns; blank columns are 0.
fn field(text: &str, from: usize, to: usize) -> Option<i64> {
    let field = text.get(from..to.min(text.len()))?.trim();
    if field.is_empty() { (from < text.len()).then_some(0) } else { integer(field) }
}

/// Reads an atom; returns its charge.
fn atom(line: &Line, number: usize, atoms: usize, record: &mut Record) -> Result<i32, Fault> {
    let text = &line.text;
    let fail = |what: String| (line.number, format!("atom {number} of {atoms}: {what}"));
    let x = |from: usize| text.get(from..from + 10).and_then(decimal);
    let by_columns = || {
        let symbol = text.get(31..text.len().min(34))?.trim();
        let clean = !symbol.is_empty() && !symbol.contains(' ') && text.get(30..31) == Some(" ");
        clean.then_some(([x(0)?, x(10)?, x(20)?], symbol))
    };
    let by_blanks = || {
        let mut words = text.split_whitespace();
        let xyz = [decimal(words.next()?)?, decimal(words.next()?)?, decimal(words.next()?)?];
        Some((xyz, words.next()?))
    };
    let columns = by_columns();
    let fixed = columns.is_some();
    let Some((xyz, symbol)) = columns.or_else(by_blanks) else {
        return Err(fail(expected("three coordinates and an element", Some(line))));
    };
    if xyz.iter().any(|x| x.abs() > LARGEST_COORDINATE_A) {
        return Err(fail("a coordinate is beyond 1e9 Å".to_owned()));
    }
    let z = element_by_text(symbol).map_err(|_| fail(format!("there is no element {}", quoted(symbol))))?;
    let words: Vec<i64> = text.split_whitespace().skip(4).map_while(integer).collect();
    let code = |word: usize, from: usize, to: usize| {
        let value = if fixed { field(text, from, to) } else { words.get(word).copied() };
        value.and_then(|value| i32::try_from(value).ok()).unwrap_or(0)
    };
    let index = u32::try_from(number - 1).unwrap_or(u32::MAX);
    let mass_difference = code(0, 34, 36);
    let charge_code = code(1, 36, 39);
    let parity = code(2, 39, 42);
    let valence = code(5, 48, 51);
    if mass_difference != 0 {
        // Kept relative: the specification counts from an average mass that it does not print.
        record.mass_differences.push((index, mass_difference));
    }
    if parity != 0 {
        record.stereo.parities.push((index, parity));
    }
    match valence {
        0 => {}
        15 => record.valences.push((index, 0)),
        n => record.valences.push((index, n)),
    }
    record.atomic_number.push(z);
    record.xyz.push(xyz);
    match charge_code {
        0 => Ok(0),
        1..=3 | 5..=7 => Ok(4 - charge_code),
        4 => {
            record.radicals.push((index, 2));
            Ok(0)
        }
        other => Err(fail(format!("the charge code is {other}; expected 0 to 7"))),
    }
}

/// Reads a bond.
fn bond(line: &Line, number: usize, bonds: usize, atoms: usize, record: &mut Record) -> Result<Bond, Fault> {
    let text = &line.text;
    let fail = |what: String| (line.number, format!("bond {number} of {bonds}: {what}"));
    let by_columns =
        || Some([field(text, 0, 3)?, field(text, 3, 6)?, field(text, 6, 9)?, field(text, 9, 12).unwrap_or(0)]);
    let by_blanks = || {
        let mut words = text.split_whitespace();
        let three = [integer(words.next()?)?, integer(words.next()?)?, integer(words.next()?)?];
        Some([three[0], three[1], three[2], words.next().and_then(integer).unwrap_or(0)])
    };
    let sensible = |fields: &[i64; 4]| fields[0] > 0 && fields[1] > 0;
    let fields = by_columns().filter(sensible).or_else(by_blanks);
    let Some([a, b, kind, stereo]) = fields else {
        return Err(fail(expected("two atoms and a bond type", Some(line))));
    };
    let index =
        |n: i64| usize::try_from(n).ok().filter(|n| (1..=atoms).contains(n)).and_then(|n| u32::try_from(n - 1).ok());
    let (Some(a0), Some(b0)) = (index(a), index(b)) else {
        return Err(fail(format!("it joins atoms {a} and {b}; expected 1 to {atoms}")));
    };
    if a0 == b0 {
        return Err(fail(format!("it joins atom {a} with itself")));
    }
    let order = match kind {
        1 => 1.0,
        2 => 2.0,
        3 => 3.0,
        4 => 1.5,
        5..=8 => return Err(fail(format!("its type {kind} is for queries; expected 1 to 4"))),
        _ => return Err(fail(format!("its type is {kind}; expected 1 to 4"))),
    };
    if stereo != 0 {
        let bond = u32::try_from(number - 1).unwrap_or(u32::MAX);
        record.stereo.wedges.push((bond, i32::try_from(stereo).unwrap_or(0)));
    }
    Ok(Bond { a: a0, b: b0, order })
}

/// Refuses a pair of atoms that is bonded twice.
fn repeated(bonds: &[Bond], lines: &[Line], first: usize) -> Result<(), Fault> {
    if let Some(bond) = bonded_twice(bonds) {
        let line = lines.get(first + bond).map_or(0, |line| line.number);
        let (a, b) = bonds.get(bond).map_or((0, 0), |bond| (bond.a.min(bond.b), bond.a.max(bond.b)));
        return Err((line, format!("atoms {} and {} are bonded twice", a + 1, b + 1)));
    }
    Ok(())
}

/// Reads the property block; returns the number of its lines, `M  END` included.
fn properties(lines: &[Line], atoms: usize, charges: &mut [i32], record: &mut Record) -> Result<usize, Fault> {
    let mut superseded = false;
    let mut at = 0;
    while let Some(line) = lines.get(at) {
        let text = line.text.trim_end();
        // A file without M  END: the data items begin.
        if text.starts_with('>') {
            return Ok(at);
        }
        at += 1;
        let Some(kind) = text.get(..6) else {
            if text.starts_with("M END") {
                return Ok(at);
            }
            continue;
        };
        match kind {
            "M  END" => return Ok(at),
            "M  CHG" | "M  RAD" | "M  ISO" => {
                let pairs = pairs(line, kind, atoms)?;
                if kind == "M  ISO" {
                    record.mass_differences.clear();
                    record.isotopes.extend(pairs);
                    continue;
                }
                if !superseded {
                    charges.fill(0);
                    record.radicals.clear();
                    superseded = true;
                }
                for (atom, value) in pairs {
                    if kind == "M  RAD" {
                        radical(line, value)?;
                        if value != 0 {
                            record.radicals.push((atom, value));
                        }
                    } else if let Some(charge) = charges.get_mut(atom as usize) {
                        *charge = charge_of(line, value)?;
                    }
                }
            }
            // The number of lines that follow and are not meant for general readers.
            "S  SKP" => {
                let skipped = text.get(6..).and_then(integer).and_then(|n| usize::try_from(n).ok());
                let Some(skipped) = skipped else {
                    return Err((line.number, expected("the number of lines to skip", Some(line))));
                };
                at = at.saturating_add(skipped).min(lines.len());
            }
            _ if kind.starts_with("A  ") => at += 1,
            _ if kind.starts_with("G  ") => at += 1,
            _ => {}
        }
    }
    Ok(at)
}

/// (atom, value) pairs of a property line: a count, then that many pairs.
fn pairs(line: &Line, kind: &str, atoms: usize) -> Result<Vec<(u32, i32)>, Fault> {
    let fail = |what: String| (line.number, format!("{}: {what}", kind.replace("  ", " ")));
    let words: Option<Vec<i64>> = line.text.get(6..).unwrap_or("").split_whitespace().map(integer).collect();
    let Some(words) = words else { return Err(fail(expected("whole numbers", Some(line)))) };
    let (count, rest) = words.split_first().map_or((0, &[][..]), |(&count, rest)| (count, rest));
    if usize::try_from(count).ok().and_then(|count| count.checked_mul(2)) != Some(rest.len()) {
        return Err(fail(format!("{count} pairs are stated, {} numbers follow", rest.len())));
    }
    let mut pairs = Vec::new();
    for pair in rest.chunks_exact(2) {
        let [atom, value] = pair else { continue };
        let index =
            usize::try_from(*atom).ok().filter(|n| (1..=atoms).contains(n)).and_then(|n| u32::try_from(n - 1).ok());
        match (index, i32::try_from(*value)) {
            (Some(index), Ok(value)) => pairs.push((index, value)),
            (None, _) => return Err(fail(format!("there is no atom {atom}; expected 1 to {atoms}"))),
            _ => return Err(fail(format!("the value {value} is too large"))),
        }
    }
    Ok(pairs)
}

fn charge_of(line: &Line, value: i32) -> Result<i32, Fault> {
    if (-15..=15).contains(&value) {
        return Ok(value);
    }
    Err((line.number, format!("M CHG: the charge is {value}; expected -15 to 15")))
}

fn radical(line: &Line, value: i32) -> Result<(), Fault> {
    if (0..=3).contains(&value) {
        return Ok(());
    }
    Err((line.number, format!("M RAD: the code is {value}; expected 0 to 3")))
}

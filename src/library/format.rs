//! Which format a file is in, told by its first bytes and never by its name.

use super::lines::{decimal, integer};
use super::record::Problem;
use super::xyz::{atom_line, count_of};
use crate::selectors::{FORMAT_BY_CONTENT, FORMAT_CML, FORMAT_CTFILE, FORMAT_XYZ, Selector};
use crate::status::Code;

/// How many bytes are looked at.
pub const HEAD: usize = 1 << 16;

/// What is read here, for messages.
const KNOWN: &str = "expected an XYZ file, a molfile, an SD file or CML";

/// The format of a file from its first bytes (up to [`HEAD`] of them, unpacked): `FORMAT_XYZ`, `FORMAT_CTFILE` or
/// `FORMAT_CML`. A format that the caller names is believed, unless the bytes are no text at all.
///
/// # Errors
/// `BadFormat` with words that name what the file is, where that can be told.
pub fn format_of(file: &str, head: &[u8], named: Selector) -> Result<Selector, Problem> {
    let bad = |what: &str| Err(Problem::new(Code::BadFormat, format!("{file}: {what}")));
    if let Some(what) = packed(head) {
        return bad(&format!("the file is {what}, which is not read; unpack it first"));
    }
    if head.starts_with(b"\xFF\xFE") || head.starts_with(b"\xFE\xFF") {
        return bad("the file is UTF-16 text; expected UTF-8 or Latin-1");
    }
    if head.contains(&0) {
        return bad(&format!("the file is binary; {KNOWN}"));
    }
    known_format(file, named)?;
    if named != FORMAT_BY_CONTENT {
        return Ok(named);
    }
    let text = String::from_utf8_lossy(head.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(head));
    let lines = lines_of(&text);
    if lines.iter().all(|line| line.trim().is_empty()) {
        return bad("the file is empty");
    }
    if is_ctfile(&lines) {
        return Ok(FORMAT_CTFILE);
    }
    match marked_up(&text) {
        Some(true) => return Ok(FORMAT_CML),
        Some(false) => return bad(&format!("the file is XML or HTML and not CML; {KNOWN}")),
        None => {}
    }
    if is_xyz(&lines) {
        return Ok(FORMAT_XYZ);
    }
    if has_ctfile_marks(&lines) {
        return Ok(FORMAT_CTFILE);
    }
    if is_broken_xyz(&lines) {
        return Ok(FORMAT_XYZ);
    }
    bad(&format!("the content is in no format that is read here; {KNOWN}"))
}

/// Whether a format is one that a caller may name; `file` is what the message speaks of.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector`.
pub(super) fn known_format(file: &str, named: Selector) -> Result<(), Problem> {
    if [FORMAT_BY_CONTENT, FORMAT_XYZ, FORMAT_CTFILE, FORMAT_CML].contains(&named) {
        return Ok(());
    }
    let code = named.of_group("format").map_or_else(|failure| failure.code, |_| Code::Internal);
    Err(Problem::new(code, format!("{file}: no format has the number {}", named.0)))
}

fn packed(head: &[u8]) -> Option<&'static str> {
    const MAGIC: &[(&[u8], &str)] = &[
        (b"\x1F\x8B", "gzip-compressed a second time"),
        (b"PK\x03\x04", "a zip archive"),
        (b"BZh", "bzip2-compressed"),
        (b"\xFD7zXZ\x00", "xz-compressed"),
        (b"\x28\xB5\x2F\xFD", "zstd-compressed"),
    ];
    MAGIC.iter().find(|(magic, _)| head.starts_with(magic)).map(|(_, what)| *what)
}

/// Whether a file that begins like XML is CML; `None` for one that does not.
fn marked_up(text: &str) -> Option<bool> {
    let start = text.trim_start();
    if !start.starts_with('<') {
        return None;
    }
    if ["<cml", ":cml", "/cml", "xml-cml", "<molecule", ":molecule"].iter().any(|mark| text.contains(mark)) {
        return Some(true);
    }
    (start.starts_with("<?") || start.starts_with("<!") || start.ends_with('>')).then_some(false)
}

/// Lines with any newline.
fn lines_of(text: &str) -> Vec<&str> {
    let mut lines = Vec::new();
    let mut rest = text;
    while let Some(at) = rest.find(['\n', '\r']) {
        let (line, tail) = rest.split_at(at);
        lines.push(line);
        rest = tail.strip_prefix("\r\n").or_else(|| tail.get(1..)).unwrap_or("");
    }
    lines.push(rest);
    lines
}

fn has_version(line: &str) -> bool {
    line.contains("V2000") || line.contains("V3000")
}

/// The fourth line is a counts line: it carries a version, or two counts and then an atom by columns.
fn is_ctfile(lines: &[&str]) -> bool {
    let Some(counts) = lines.get(3) else { return false };
    if has_version(counts) && counts.get(..6).is_some_and(|c| c.bytes().all(|b| b == b' ' || b.is_ascii_digit())) {
        return true;
    }
    let field = |from: usize, to: usize| counts.get(from..to).and_then(integer).is_some_and(|n| n >= 0);
    let atom = |line: &&str| {
        let symbol = line.get(31..34).map(str::trim).unwrap_or("");
        let letters = !symbol.is_empty() && symbol.bytes().all(|byte| byte.is_ascii_alphabetic());
        letters && [(0, 10), (10, 20), (20, 30)].iter().all(|&(a, b)| line.get(a..b).and_then(decimal).is_some())
    };
    field(0, 3) && field(3, 6) && lines.get(4).is_some_and(atom)
}

/// A count, a comment and an atom in the first lines that are not blank, or a frame further on after a broken one.
fn is_xyz(lines: &[&str]) -> bool {
    lines.windows(3).any(|w| match w {
        [count, _, atom] => count_of(count).is_some_and(|n| n > 0) && atom_line(atom).is_ok(),
        _ => false,
    })
}

/// A count on the first line and, behind its comment, a line of a word and three numbers, however badly written; the first
/// such line, if it begins as an atom does, may have something else among them. Other text that begins with a number is
/// not taken for a frame.
fn is_broken_xyz(lines: &[&str]) -> bool {
    let mut lines = lines.iter().skip_while(|line| line.trim().is_empty());
    if lines.next().and_then(|line| count_of(line)).is_none_or(|count| count < 0) {
        return false;
    }
    let short = |word: &str| word.trim_end_matches(|c: char| c.is_ascii_digit()).len() <= 2;
    lines.skip(1).enumerate().any(|(i, line)| {
        let fields: Vec<&str> = line.split_whitespace().take(4).collect();
        let [word, x, y, z] = fields[..] else { return false };
        if meant_as_number(word) || !word.contains(char::is_alphabetic) {
            return false;
        }
        match [x, y, z].into_iter().filter(|field| meant_as_number(field)).count() {
            3 => true,
            2 => i == 0 && short(word),
            _ => false,
        }
    })
}

/// A number, or what stands for one: with a decimal comma, not a number at all, or too wide for its columns.
fn meant_as_number(field: &str) -> bool {
    let plain = field.replace(',', ".");
    let name = field.trim_start_matches(['+', '-']).to_ascii_lowercase();
    decimal(&plain).is_some()
        || ["nan", "inf", "infinity"].contains(&name.as_str())
        || field.bytes().all(|byte| byte == b'*')
}

/// A counts line somewhere, or the end of a record: the first record is broken, the next ones may not be.
fn has_ctfile_marks(lines: &[&str]) -> bool {
    let counts = |line: &str| {
        let digits = |counts: &str| counts.bytes().all(|byte| byte == b' ' || byte.is_ascii_digit());
        (line.ends_with("V2000") || line.ends_with("V3000")) && line.get(..6).is_some_and(digits)
    };
    let marked = |line: &&str| {
        let line = line.trim_end();
        line == "$$$$" || line == "M  END" || counts(line)
    };
    lines.iter().any(marked)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn told(head: &[u8]) -> Result<Selector, Problem> {
        format_of("f", head, FORMAT_BY_CONTENT)
    }

    #[test]
    fn formats_are_told_by_content() {
        assert_eq!(told(b"1\n\nHe 0 0 0\n"), Ok(FORMAT_XYZ));
        assert_eq!(told(b"\xEF\xBB\xBF\n1\r\rHe 0 0 0"), Ok(FORMAT_XYZ));
        assert_eq!(told(b"rubbish\n1\nV2000\nHe 0 0 0\n"), Ok(FORMAT_XYZ));
        assert_eq!(told(b"2\n\n\n  1  0  0  0  0  0  0  0  0  0999 V2000\n"), Ok(FORMAT_CTFILE));
        assert_eq!(told(b"\n\n\n  1  0\n    0.0000    0.0000    0.0000 He  0  0\n"), Ok(FORMAT_CTFILE));
        assert_eq!(told(b"t\nno counts line\n$$$$\n"), Ok(FORMAT_CTFILE));
        // Frames whose first atom cannot be read; a record of an SD file whose title is a number.
        for atom in ["C 0,0 0 0", "X 0 0 0", "C nan 0 0", "C **** **** 1.0", "C zero 0 0"] {
            assert_eq!(told(format!("2\ncomment\n{atom}\n").as_bytes()), Ok(FORMAT_XYZ), "{atom}");
        }
        assert_eq!(told(b"0\n\nC 0 0 0\n"), Ok(FORMAT_XYZ));
        assert_eq!(told(b"17\n\n\nno counts\n    0.0000    0.0000    0.0000 C   0  0\n$$$$\n"), Ok(FORMAT_CTFILE));
        assert_eq!(told(b"<?xml version=\"1.0\"?><cml/>"), Ok(FORMAT_CML));
        assert_eq!(told(b"\xEF\xBB\xBF\n<c:molecule id=\"m1\">"), Ok(FORMAT_CML));
        assert_eq!(told(b"<molecule>\n\n\n  1  0  0     0  0            999 V3000\n"), Ok(FORMAT_CTFILE));
    }

    #[test]
    fn what_is_not_read_is_named() {
        for (head, words) in [
            (&b"\x1F\x8B\x08rest"[..], "gzip-compressed a second time"),
            (b"PK\x03\x04rest", "a zip archive"),
            (b"<?xml version=\"1.0\"?><svg/>", "not CML"),
            (b"<!DOCTYPE html><p>x</p>", "HTML"),
            (b"\xFF\xFE1\x00", "UTF-16"),
            (b"\x7FELF\x00\x00", "binary"),
            (b" \n\n", "empty"),
            (b"name,value\na,1\n", "no format"),
            (b"2\n\nHe 0 0\n", "no format"),
            (b"2024\n\nAll files of this folder are notes, 12 of them.\n", "no format"),
            (b"12\nTable 1 2 3\n", "no format"),
            (b"2\n\n0.5 0 1 0\nnan 0.5 0 1\n", "no format"),
            (b"twelve\nx\nX 0 0 0\n", "no format"),
            (b"# Notes\n\nAll files are V2000\n$$$$ is the end of a record\n", "no format"),
        ] {
            let problem = told(head).unwrap_err();
            assert_eq!(problem.code, Code::BadFormat);
            assert!(problem.message.contains(words), "{}", problem.message);
        }
    }
}

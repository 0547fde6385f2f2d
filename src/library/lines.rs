//! Lines of a stream: any newline, bounded memory, and the place of each one.

use std::collections::VecDeque;
use std::io::{BufRead, Error, Result};

/// Longest line that is kept whole; what lies beyond is left out.
const LONGEST_LINE: usize = 1 << 20;

/// One line without its newline.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub(super) struct Line {
    /// The text: UTF-8, else Latin-1.
    pub text: String,
    /// Number of the line, from 1.
    pub number: u64,
    /// Offset of its first byte in the stream.
    pub start: u64,
    /// Offset of the byte after its newline.
    pub end: u64,
    /// The line was longer than what is kept.
    pub cut: bool,
}

/// Reads lines that end with LF, CR LF or CR, and looks ahead.
#[derive(Debug)]
pub(super) struct Lines<R> {
    input: R,
    ahead: VecDeque<Line>,
    /// Offset and number of the next line to take from the input.
    offset: u64,
    number: u64,
    ended: bool,
    /// An error behind the lines that are ahead: it counts when they are taken.
    failed: Option<Error>,
}

impl<R: BufRead> Lines<R> {
    /// From the beginning of a stream, or from an offset where a line begins that has this number.
    pub fn new(input: R, offset: u64, number: u64) -> Self {
        Self { input, ahead: VecDeque::new(), offset, number, ended: false, failed: None }
    }

    /// Takes the next line; `None` at the end.
    pub fn take(&mut self) -> Result<Option<Line>> {
        match self.ahead.pop_front() {
            Some(line) => Ok(Some(line)),
            None => match self.failed.take() {
                Some(error) => Err(error),
                None => self.read(),
            },
        }
    }

    /// The line `n` places ahead (0: the next one) without taking it; `None` at the end, or where reading on fails.
    pub fn peek(&mut self, n: usize) -> Option<&Line> {
        while self.ahead.len() <= n {
            if self.failed.is_some() {
                return None;
            }
            match self.read() {
                Ok(Some(line)) => self.ahead.push_back(line),
                Ok(None) => return None,
                Err(error) => self.failed = Some(error),
            }
        }
        self.ahead.get(n)
    }

    /// Puts a line back before the others.
    pub fn put_back(&mut self, line: Line) {
        self.ahead.push_front(line);
    }

    /// Offset and number of the next line.
    pub fn place(&self) -> (u64, u64) {
        self.ahead.front().map_or((self.offset, self.number), |line| (line.start, line.number))
    }

    /// Where the lines come from.
    pub fn input(&self) -> &R {
        &self.input
    }

    fn read(&mut self) -> Result<Option<Line>> {
        if self.ended {
            return Ok(None);
        }
        let start = self.offset;
        let mut bytes = Vec::new();
        let mut cut = false;
        loop {
            let buffer = match self.input.fill_buf() {
                Err(error) if error.kind() == std::io::ErrorKind::Interrupted => continue,
                buffer => buffer?,
            };
            if buffer.is_empty() {
                self.ended = true;
                if self.offset == start {
                    return Ok(None);
                }
                break;
            }
            let newline = buffer.iter().position(|&byte| byte == b'\n' || byte == b'\r');
            let body = buffer.get(..newline.unwrap_or(buffer.len())).unwrap_or(buffer);
            let room = LONGEST_LINE - bytes.len().min(LONGEST_LINE);
            cut |= body.len() > room;
            bytes.extend_from_slice(body.get(..room).unwrap_or(body));
            let ended_by = newline.and_then(|at| buffer.get(at)).copied();
            let used = body.len() + usize::from(newline.is_some());
            self.input.consume(used);
            self.offset += used as u64;
            if ended_by == Some(b'\r') {
                let newline = loop {
                    match self.input.fill_buf() {
                        Err(error) if error.kind() == std::io::ErrorKind::Interrupted => {}
                        Err(error) => {
                            // The line is whole; the error is the next one's.
                            self.failed = Some(error);
                            break false;
                        }
                        Ok(next) => break next.first() == Some(&b'\n'),
                    }
                };
                if newline {
                    self.input.consume(1);
                    self.offset += 1;
                }
            }
            if ended_by.is_some() {
                break;
            }
        }
        if start == 0 && bytes.starts_with(b"\xEF\xBB\xBF") {
            bytes.drain(..3);
        }
        let text = String::from_utf8(bytes)
            .unwrap_or_else(|not_utf8| not_utf8.into_bytes().iter().map(|&byte| char::from(byte)).collect());
        let line = Line { text, number: self.number, start, end: self.offset, cut };
        self.number += 1;
        Ok(Some(line))
    }
}

/// A whole number, optionally signed.
pub(super) fn integer(text: &str) -> Option<i64> {
    let text = text.trim();
    let digits = text.strip_prefix(['+', '-']).unwrap_or(text);
    if digits.is_empty() || !digits.bytes().all(|byte| byte.is_ascii_digit()) {
        return None;
    }
    text.parse().ok()
}

/// A coordinate: a decimal number with an optional exponent, Fortran's `D` included. Words such as `nan` are none.
pub(super) fn decimal(text: &str) -> Option<f64> {
    let text = text.trim();
    let allowed = |byte: u8| byte.is_ascii_digit() || matches!(byte, b'+' | b'-' | b'.' | b'e' | b'E' | b'd' | b'D');
    if !text.bytes().all(allowed) || !text.bytes().any(|byte| byte.is_ascii_digit()) {
        return None;
    }
    let value: f64 = if text.bytes().any(|byte| matches!(byte, b'd' | b'D')) {
        text.replace(['d', 'D'], "e").parse().ok()?
    } else {
        text.parse().ok()?
    };
    value.is_finite().then_some(value)
}

/// A text from a file on its way into a message: one line, not longer than fits in a sentence.
pub(super) fn quoted(text: &str) -> String {
    const LONGEST: usize = 40;
    let plain: String = text.trim().chars().map(|c| if c.is_control() { ' ' } else { c }).collect();
    match plain.char_indices().nth(LONGEST) {
        Some((at, _)) => format!("\"{}…\"", plain.get(..at).unwrap_or("")),
        None => format!("\"{plain}\""),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn all(bytes: &[u8], buffer: usize) -> Vec<Line> {
        let mut lines = Lines::new(std::io::BufReader::with_capacity(buffer, bytes), 0, 1);
        let mut found = Vec::new();
        while let Some(line) = lines.take().unwrap() {
            found.push(line);
        }
        found
    }

    #[test]
    fn any_newline_ends_a_line_whatever_the_buffer() {
        for buffer in [1, 2, 3, 64] {
            let lines = all(b"\xEF\xBB\xBFa\r\nb\rc\n\n\xE4\r\r\nlast", buffer);
            let texts: Vec<&str> = lines.iter().map(|line| line.text.as_str()).collect();
            assert_eq!(texts, ["a", "b", "c", "", "ä", "", "last"], "buffer {buffer}");
            assert_eq!(lines[1].start, 6);
            assert_eq!(lines[1].end, 8);
            assert_eq!(lines.last().map(|line| (line.number, line.end)), Some((7, 19)));
        }
    }

    #[test]
    fn a_line_beyond_all_measure_is_cut_and_the_next_one_found() {
        let mut bytes = vec![b'x'; LONGEST_LINE + 5];
        bytes.extend_from_slice(b"\nnext");
        let lines = all(&bytes, 4096);
        assert_eq!((lines[0].text.len(), lines[0].cut), (LONGEST_LINE, true));
        assert_eq!(lines[1].text, "next");
    }

    #[test]
    fn numbers_as_programs_write_them() {
        assert_eq!(decimal("1.0D-3"), Some(1e-3));
        assert_eq!(decimal("1."), Some(1.0));
        assert_eq!(decimal("-.5"), Some(-0.5));
        assert_eq!(decimal("+2e1"), Some(20.0));
        for wrong in ["nan", "inf", "1,5", "e", ".", "1e999", "*^", "--1", ""] {
            assert_eq!(decimal(wrong), None, "{wrong}");
        }
        assert_eq!(integer(" 12 "), Some(12));
        assert_eq!(integer("1.0"), None);
        assert_eq!(integer("99999999999999999999"), None);
    }
}

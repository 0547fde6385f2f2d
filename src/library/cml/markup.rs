//! The characters of an XML file: UTF-8 whatever the file is in, lines counted, no single piece of markup without bound.
//!
//! UTF-8 and ISO-8859-1 are read as declared. What is no UTF-8 though it should be is taken as Latin-1, as in the other
//! formats. Of other encodings the ASCII characters are read.
//!
//! Reference: Extensible Markup Language (XML) 1.0, fifth edition, W3C 2008.

use std::io::{BufRead, Error, ErrorKind, Read, Result};

/// Longest piece of markup or text between two pieces [bytes].
pub(super) const LONGEST_PIECE: usize = 64 << 20;
/// The declaration is looked for in this many bytes.
const DECLARATION: usize = 1024;

#[derive(Clone, Debug, PartialEq, Eq)]
enum Encoding {
    Utf8,
    Latin1,
    /// Another one, by its declared name.
    Other(String),
}

/// A stream of bytes as the characters that its declaration says.
#[derive(Debug)]
pub(in crate::library) struct Markup<R> {
    input: R,
    encoding: Option<Encoding>,
    /// Bytes read before the encoding is known, or a character that is cut at the end of what was read.
    held: Vec<u8>,
    text: Vec<u8>,
    at: usize,
    /// Line of the next character, from 1.
    line: u64,
    after_return: bool,
    /// Bytes taken from the input.
    taken: u64,
    /// Characters handed out, in bytes of UTF-8.
    given: u64,
    /// Where the present piece began in them.
    piece: u64,
    /// An error of the input; the XML reader is told another one.
    failed: Option<Error>,
}

impl<R: BufRead> Markup<R> {
    pub fn new(input: R) -> Self {
        Self {
            input,
            encoding: None,
            held: Vec::new(),
            text: Vec::new(),
            at: 0,
            line: 1,
            after_return: false,
            taken: 0,
            given: 0,
            piece: 0,
            failed: None,
        }
    }

    /// Line of the next character, from 1.
    pub fn line(&self) -> u64 {
        self.line
    }

    /// Bytes taken from the input.
    pub fn taken(&self) -> u64 {
        self.taken
    }

    /// Length of what was handed out [bytes of UTF-8].
    pub fn given(&self) -> u64 {
        self.given
    }

    /// Where the bytes come from.
    pub fn input(&self) -> &R {
        &self.input
    }

    /// A new piece of markup begins, with its own length.
    pub fn begin_piece(&mut self) {
        self.piece = self.given;
    }

    /// The error of the input, once.
    pub fn take_failed(&mut self) -> Option<Error> {
        self.failed.take()
    }

    fn refill(&mut self) -> Result<()> {
        self.text.clear();
        self.at = 0;
        while self.text.is_empty() {
            let bytes = loop {
                match self.input.fill_buf() {
                    Err(error) if error.kind() == ErrorKind::Interrupted => {}
                    Err(error) => {
                        self.failed = Some(error);
                        return Err(Error::other("the file cannot be read on"));
                    }
                    Ok(bytes) => break bytes,
                }
            };
            let n = bytes.len().min(1 << 16);
            self.held.extend_from_slice(bytes.get(..n).unwrap_or(&[]));
            self.input.consume(n);
            self.taken += n as u64;
            let encoding = match &self.encoding {
                Some(encoding) => encoding,
                None => {
                    if n > 0 && self.held.len() < DECLARATION && !self.held.contains(&b'>') {
                        continue;
                    }
                    self.encoding.insert(declared(&self.held))
                }
            };
            self.text = characters(&mut self.held, encoding, n == 0).map_err(Error::other)?;
            if n == 0 {
                break;
            }
        }
        Ok(())
    }
}

impl<R: BufRead> Read for Markup<R> {
    fn read(&mut self, into: &mut [u8]) -> Result<usize> {
        let from = self.fill_buf()?;
        let n = from.len().min(into.len());
        for (slot, byte) in into.iter_mut().zip(from) {
            *slot = *byte;
        }
        self.consume(n);
        Ok(n)
    }
}

impl<R: BufRead> BufRead for Markup<R> {
    fn fill_buf(&mut self) -> Result<&[u8]> {
        if self.at >= self.text.len() {
            if self.given - self.piece > LONGEST_PIECE as u64 {
                return Err(Error::other(format!("a piece of markup is longer than {LONGEST_PIECE} bytes")));
            }
            self.refill()?;
        }
        Ok(self.text.get(self.at..).unwrap_or(&[]))
    }

    fn consume(&mut self, n: usize) {
        let end = self.at.saturating_add(n).min(self.text.len());
        for &byte in self.text.get(self.at..end).unwrap_or(&[]) {
            self.line += u64::from(byte == b'\r' || byte == b'\n' && !self.after_return);
            self.after_return = byte == b'\r';
        }
        self.given += (end - self.at) as u64;
        self.at = end;
    }
}

/// The encoding in the XML declaration; UTF-8 without one.
fn declared(head: &[u8]) -> Encoding {
    let head = head.strip_prefix(b"\xEF\xBB\xBF").unwrap_or(head);
    let name = || {
        let text: String = head.iter().take(DECLARATION).map(|&byte| char::from(byte)).collect();
        let (declaration, _) = text.strip_prefix("<?xml")?.split_once("?>")?;
        let (_, rest) = declaration.split_once("encoding")?;
        let rest = rest.trim_start().strip_prefix('=')?.trim_start();
        let quote = rest.chars().next().filter(|quote| matches!(quote, '"' | '\''))?;
        rest.get(1..)?.split_once(quote).map(|(name, _)| name.trim().to_owned())
    };
    let Some(name) = name() else { return Encoding::Utf8 };
    match name.to_ascii_lowercase().as_str() {
        "utf-8" | "utf8" | "us-ascii" | "ascii" => Encoding::Utf8,
        "iso-8859-1" | "iso8859-1" | "iso_8859-1" | "latin1" | "latin-1" => Encoding::Latin1,
        _ => Encoding::Other(name),
    }
}

/// Bytes as UTF-8; a character that is cut stays held unless the file ends there.
fn characters(held: &mut Vec<u8>, encoding: &Encoding, ended: bool) -> std::result::Result<Vec<u8>, String> {
    if held.is_ascii() {
        return Ok(std::mem::take(held));
    }
    let latin = |bytes: &[u8]| -> String { bytes.iter().map(|&byte| char::from(byte)).collect() };
    match encoding {
        Encoding::Latin1 => Ok(latin(&std::mem::take(held)).into_bytes()),
        Encoding::Other(name) => {
            let name: String = name.chars().filter(|c| c.is_ascii_graphic()).take(40).collect();
            Err(format!("the file is in the encoding {name}; expected UTF-8 or ISO-8859-1"))
        }
        Encoding::Utf8 => {
            let bytes = std::mem::take(held);
            let mut text = String::with_capacity(bytes.len());
            let mut rest = bytes.as_slice();
            while !rest.is_empty() {
                let wrong = match std::str::from_utf8(rest) {
                    Ok(valid) => {
                        text.push_str(valid);
                        break;
                    }
                    Err(wrong) => wrong,
                };
                let (valid, after) = rest.split_at(wrong.valid_up_to().min(rest.len()));
                text.push_str(std::str::from_utf8(valid).unwrap_or(""));
                if wrong.error_len().is_none() && !ended {
                    held.extend_from_slice(after);
                    break;
                }
                let (one, after) = after.split_at(after.len().min(1));
                text.push_str(&latin(one));
                rest = after;
            }
            Ok(text.into_bytes())
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn all(bytes: &[u8], buffer: usize) -> Result<(String, u64)> {
        let mut markup = Markup::new(std::io::BufReader::with_capacity(buffer, bytes));
        let mut text = String::new();
        markup.read_to_string(&mut text)?;
        Ok((text, markup.line()))
    }

    #[test]
    fn any_buffer_gives_the_same_characters_and_lines() {
        let latin = b"<?xml version='1.0' encoding = 'ISO-8859-1'?>\r\n<a>\xE1\xC3\xA1</a>\r\n";
        let utf8 = "<?xml version=\"1.0\"?>\n<a>á…</a>\r<b/>\n".as_bytes();
        let neither = b"<a>\xE1gua \xC3\xA1</a>";
        for buffer in [1, 2, 3, 7, 64, 4096] {
            let (text, line) = all(latin, buffer).unwrap();
            assert_eq!((text.get(47..).unwrap(), line), ("<a>áÃ¡</a>\r\n", 3), "buffer {buffer}");
            assert_eq!(all(utf8, buffer).unwrap(), (String::from_utf8(utf8.to_vec()).unwrap(), 4), "buffer {buffer}");
            assert_eq!(all(neither, buffer).unwrap().0, "<a>água á</a>", "buffer {buffer}");
        }
    }

    #[test]
    fn other_encodings_give_their_ascii_only() {
        assert!(all(b"<?xml version='1.0' encoding='KOI8-R'?><a/>", 64).is_ok());
        let wrong = all(b"<?xml version='1.0' encoding='KOI8-R'?><a>\xC1</a>", 64).unwrap_err();
        assert!(wrong.to_string().contains("KOI8-R"), "{wrong}");
    }

    #[test]
    fn a_piece_has_a_bound() {
        let endless = std::io::BufReader::new(std::io::repeat(b'a'));
        let mut markup = Markup::new(endless);
        let failed = loop {
            match markup.fill_buf() {
                Ok(text) => {
                    let n = text.len();
                    markup.consume(n);
                }
                Err(error) => break error,
            }
        };
        assert!(failed.to_string().contains("longer than"), "{failed}");
    }
}

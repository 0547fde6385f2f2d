//! Gzip files, told by their content and unpacked on the fly.
//!
//! Several members behind one another are one stream, as the format has it. Damage is an error of its own kind, so that
//! the records before it stand and one row says what is wrong and where.
//!
//! Reference: Deutsch, GZIP file format specification version 4.3, RFC 1952, 1996.

use std::fmt;
use std::io::{BufRead, Error, ErrorKind, Read, Result};

use flate2::bufread::MultiGzDecoder;

use super::format::HEAD;

/// True for the first bytes of a gzip stream.
pub(super) fn is_packed(head: &[u8]) -> bool {
    head.starts_with(b"\x1F\x8B")
}

/// A stream as its records are read from it: as it is, or unpacked.
#[derive(Debug)]
pub(super) enum Input<R> {
    Plain(R),
    Packed(Box<Unpacked<R>>),
}

impl<R: BufRead> Input<R> {
    /// Tells by the first bytes whether the stream is packed.
    pub fn told(mut input: R) -> Result<Self> {
        let packed = loop {
            match input.fill_buf() {
                Err(error) if error.kind() == ErrorKind::Interrupted => {}
                head => break is_packed(head?),
            }
        };
        Ok(Self::new(input, packed))
    }

    pub fn new(input: R, packed: bool) -> Self {
        if packed { Self::Packed(Box::new(Unpacked::new(input))) } else { Self::Plain(input) }
    }

    /// Packed bytes taken so far; `None` for a stream that is not packed.
    pub fn packed_bytes(&self) -> Option<u64> {
        match self {
            Input::Plain(_) => None,
            Input::Packed(unpacked) => Some(unpacked.decoder.get_ref().taken),
        }
    }
}

impl<R: BufRead> Read for Input<R> {
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

impl<R: BufRead> BufRead for Input<R> {
    fn fill_buf(&mut self) -> Result<&[u8]> {
        match self {
            Input::Plain(input) => input.fill_buf(),
            Input::Packed(unpacked) => unpacked.fill_buf(),
        }
    }

    fn consume(&mut self, n: usize) {
        match self {
            Input::Plain(input) => input.consume(n),
            Input::Packed(unpacked) => unpacked.consume(n),
        }
    }
}

/// The bytes within a gzip stream.
#[derive(Debug)]
pub(super) struct Unpacked<R> {
    decoder: MultiGzDecoder<Counted<R>>,
    bytes: Vec<u8>,
    at: usize,
    /// An error behind the bytes.
    failed: Option<Error>,
    ended: bool,
}

impl<R: BufRead> Unpacked<R> {
    fn new(input: R) -> Self {
        let decoder = MultiGzDecoder::new(Counted { input, taken: 0, failed: false });
        Self { decoder, bytes: Vec::new(), at: 0, failed: None, ended: false }
    }

    fn fill_buf(&mut self) -> Result<&[u8]> {
        if self.at >= self.bytes.len() && !self.ended {
            if let Some(error) = self.failed.take() {
                self.ended = true;
                return Err(error);
            }
            self.unpack();
            if self.bytes.is_empty() {
                self.ended = true;
                if let Some(error) = self.failed.take() {
                    return Err(error);
                }
            }
        }
        Ok(self.bytes.get(self.at..).unwrap_or(&[]))
    }

    fn consume(&mut self, n: usize) {
        self.at = self.at.saturating_add(n).min(self.bytes.len());
    }

    /// Fills the bytes anew, as many as the telling of a format wants.
    fn unpack(&mut self) {
        self.at = 0;
        self.bytes.resize(HEAD, 0);
        let mut filled = 0;
        while let Some(room) = self.bytes.get_mut(filled..).filter(|room| !room.is_empty()) {
            match self.decoder.read(room) {
                Ok(0) => break,
                Ok(n) => filled += n,
                Err(error) if error.kind() == ErrorKind::Interrupted => {}
                Err(error) => {
                    self.failed = Some(self.damage(error));
                    break;
                }
            }
        }
        self.bytes.truncate(filled);
    }

    /// What the unpacking of bytes says, unless the bytes themselves cannot be had.
    fn damage(&self, error: Error) -> Error {
        let input = self.decoder.get_ref();
        if input.failed {
            return error;
        }
        let what = match error.kind() {
            ErrorKind::UnexpectedEof => "end too early".to_owned(),
            _ => format!("are damaged ({error})"),
        };
        Error::new(ErrorKind::InvalidData, Damage { what, byte: input.taken })
    }
}

/// Damage in a gzip stream.
#[derive(Debug)]
struct Damage {
    what: String,
    byte: u64,
}

impl fmt::Display for Damage {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "the gzip data {} near byte {} of the file", self.what, self.byte)
    }
}

impl std::error::Error for Damage {}

/// The words for damage in a gzip stream; `None` for any other error.
pub(super) fn damage(error: &Error) -> Option<String> {
    error.get_ref().and_then(|inner| inner.downcast_ref::<Damage>()).map(Damage::to_string)
}

/// A stream that counts what is taken from it and keeps its own failures apart.
#[derive(Debug)]
struct Counted<R> {
    input: R,
    taken: u64,
    failed: bool,
}

impl<R: BufRead> Read for Counted<R> {
    fn read(&mut self, into: &mut [u8]) -> Result<usize> {
        let read = self.input.read(into);
        match &read {
            Ok(n) => self.taken += *n as u64,
            Err(error) => self.failed |= error.kind() != ErrorKind::Interrupted,
        }
        read
    }
}

impl<R: BufRead> BufRead for Counted<R> {
    fn fill_buf(&mut self) -> Result<&[u8]> {
        let filled = self.input.fill_buf();
        if let Err(error) = &filled {
            self.failed |= error.kind() != ErrorKind::Interrupted;
        }
        filled
    }

    fn consume(&mut self, n: usize) {
        self.taken += n as u64;
        self.input.consume(n);
    }
}

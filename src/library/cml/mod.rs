//! Chemical Markup Language: `molecule` elements anywhere in an XML file, one record each.
//!
//! Elements count by their local name where their namespace is CML's or none is declared. The file is read as a stream, one
//! molecule at a time. A document type is passed over: nothing outside the file is ever fetched, and no entities but the
//! five of XML and character numbers are known. What is not well formed ends the file, since nobody can say where the next
//! molecule begins; the molecules before it stand.
//!
//! Reference: Murray-Rust, Rzepa, J. Chem. Inf. Comput. Sci. 1999, 39, 928 and 2003, 43, 757 (from memory).

mod atoms;
mod charges;
mod markup;
mod molecule;

use std::io::{BufRead, Result};

use quick_xml::NsReader;
use quick_xml::XmlVersion;
use quick_xml::errors::Error as XmlError;
use quick_xml::escape::resolve_predefined_entity;
use quick_xml::events::{BytesStart, Event};
use quick_xml::name::ResolveResult;

use self::markup::Markup;
use self::molecule::{Attributes, Building, Kind};
use super::lines::quoted;
use super::record::{Broken, Entry, Place};

/// Deepest nesting of elements.
const DEEPEST: usize = 256;
/// Longest name of an element [bytes].
const LONGEST_NAME: usize = 1024;
/// Most attributes of one element.
const MOST_ATTRIBUTES: usize = 256;
/// Longest molecule [bytes].
const LONGEST_MOLECULE: u64 = 256 << 20;

/// Reads molecules one by one.
#[derive(Debug)]
pub(super) struct CmlReader<R> {
    xml: NsReader<Markup<R>>,
    piece: Vec<u8>,
    file: String,
    /// Records handed out.
    number: u64,
    /// The elements that are open.
    open: Vec<Kind>,
    ended: bool,
}

/// What came of one piece of markup.
enum Step {
    On,
    /// The outermost molecule is complete.
    Complete,
    /// The file is not well formed.
    Fatal(String),
    End,
}

impl<R: BufRead> CmlReader<R> {
    pub fn new(input: R, file: &str) -> Self {
        let xml = NsReader::from_reader(Markup::new(input));
        Self { xml, piece: Vec::new(), file: file.to_owned(), number: 0, open: Vec::new(), ended: false }
    }

    /// Where the characters come from.
    pub fn markup(&self) -> &Markup<R> {
        self.xml.get_ref()
    }

    /// The next molecule, read or broken; `None` at the end.
    pub fn next(&mut self) -> Result<Option<Entry>> {
        let mut building = None;
        let mut begin = 0;
        while !self.ended {
            let markup = self.xml.get_mut();
            markup.begin_piece();
            let (line, given) = (markup.line(), markup.given());
            if building.is_none() {
                begin = given;
            }
            self.piece.clear();
            let step = match self.xml.read_resolved_event_into(&mut self.piece) {
                Ok((namespace, event)) => {
                    let ours = match namespace {
                        ResolveResult::Bound(namespace) => is_cml(namespace.as_ref()),
                        _ => true,
                    };
                    step(event, ours, line, &mut self.open, &mut building)
                }
                Err(error) => {
                    if let Some(failed) = self.xml.get_mut().take_failed() {
                        self.ended = true;
                        return Err(failed);
                    }
                    Step::Fatal(words_of(&error))
                }
            };
            let here = self.xml.get_ref();
            match step {
                Step::On => {
                    if let Some(building) = &mut building
                        && here.given() - begin > LONGEST_MOLECULE
                    {
                        building.too_long(format!("the molecule is longer than {LONGEST_MOLECULE} bytes"));
                    }
                }
                Step::Complete => {
                    let Some(building) = building.take() else { continue };
                    if building.is_reference() {
                        continue;
                    }
                    self.number += 1;
                    return Ok(Some(building.finish(&self.file, self.number)));
                }
                Step::Fatal(what) => {
                    self.ended = true;
                    self.number += 1;
                    let line = here.line();
                    let begin = building.as_ref().map_or(line, Building::line);
                    let place = Place { file: self.file.clone(), number: self.number, line: begin };
                    let title = building.as_ref().map_or_else(String::new, Building::title);
                    let message = format!("the markup is not well formed: {what}; the file is read no further");
                    return Ok(Some(Entry::Broken(Broken { place, title, line, message })));
                }
                Step::End => self.ended = true,
            }
        }
        Ok(None)
    }
}

fn step(event: Event<'_>, ours: bool, line: u64, open: &mut Vec<Kind>, building: &mut Option<Building>) -> Step {
    match event {
        Event::Start(element) => start(&element, ours, line, open, building),
        Event::Empty(element) => match start(&element, ours, line, open, building) {
            Step::On => end(open, building),
            other => other,
        },
        Event::End(_) => end(open, building),
        Event::Text(text) => text_of(&text.xml10_content(), open, building),
        Event::CData(text) => text_of(&text.xml10_content(), open, building),
        Event::GeneralRef(reference) => {
            let name: &str = &reference;
            if let Some(known) = resolve_predefined_entity(name) {
                return text_of(known, open, building);
            }
            match reference.resolve_char_ref() {
                Ok(Some(character)) => text_of(character.encode_utf8(&mut [0; 4]), open, building),
                Ok(None) => {
                    if let Some(building) = building {
                        building.wrong(line, unknown_entity(name));
                    }
                    Step::On
                }
                Err(error) => Step::Fatal(words_of(&error)),
            }
        }
        Event::Eof => match (open.is_empty(), building) {
            (true, _) => Step::End,
            (false, Some(_)) => Step::Fatal("the file ends within a molecule".to_owned()),
            (false, None) => Step::Fatal("the file ends within an element that is open".to_owned()),
        },
        Event::Comment(_) | Event::Decl(_) | Event::PI(_) | Event::DocType(_) => Step::On,
    }
}

fn start(
    element: &BytesStart<'_>,
    ours: bool,
    line: u64,
    open: &mut Vec<Kind>,
    building: &mut Option<Building>,
) -> Step {
    if open.len() >= DEEPEST {
        return Step::Fatal(format!("elements are nested more than {DEEPEST} deep"));
    }
    if element.name().as_ref().len() > LONGEST_NAME {
        return Step::Fatal(format!("the name of an element is longer than {LONGEST_NAME} bytes"));
    }
    let kind = if ours { Kind::of(element.local_name().as_ref(), open.last()) } else { Kind::Other };
    open.push(kind);
    if kind == Kind::Molecule && building.is_none() {
        *building = Some(Building::new(line));
    }
    let Some(building) = building else { return Step::On };
    match attributes(element) {
        Ok(Ok(attributes)) => building.start(kind, &attributes, line),
        Ok(Err(wrong)) => {
            building.wrong(line, wrong);
            building.start(kind, &Vec::new(), line);
        }
        Err(fatal) => return Step::Fatal(fatal),
    }
    Step::On
}

fn end(open: &mut Vec<Kind>, building: &mut Option<Building>) -> Step {
    let kind = open.pop().unwrap_or(Kind::Other);
    let complete = building.as_mut().is_some_and(|building| building.end(kind));
    if complete { Step::Complete } else { Step::On }
}

fn text_of(text: &str, open: &[Kind], building: &mut Option<Building>) -> Step {
    if let (Some(kind), Some(building)) = (open.last(), building) {
        building.text(*kind, text);
    }
    Step::On
}

/// The attributes of an element that have no prefix; what is wrong with a value, or with the markup itself.
fn attributes<'a>(
    element: &'a BytesStart<'_>,
) -> std::result::Result<std::result::Result<Attributes<'a>, String>, String> {
    let mut found = Vec::new();
    let mut wrong = None;
    for (n, attribute) in element.attributes().enumerate() {
        if n >= MOST_ATTRIBUTES {
            return Err(format!("an element has more than {MOST_ATTRIBUTES} attributes"));
        }
        let attribute = attribute.map_err(|error| words_of(&XmlError::InvalidAttr(error)))?;
        let key = attribute.key;
        let (name, prefix) = key.decompose();
        if prefix.is_some() {
            continue;
        }
        match attribute.normalized_value(XmlVersion::Implicit1_0) {
            Ok(value) => found.push((name.into_inner(), value)),
            Err(error) => wrong = Some(format!("the attribute {}: {}", quoted(name.into_inner()), words_of(&error))),
        }
    }
    Ok(wrong.map_or(Ok(found), Err))
}

/// CML has had several namespaces; all of them have its name in them.
fn is_cml(namespace: &str) -> bool {
    namespace.to_ascii_lowercase().contains("cml")
}

fn unknown_entity(name: &str) -> String {
    format!("the entity {} is not one of XML's five; no document type is read", quoted(name))
}

/// What the XML reader says, in one line of bounded length.
fn words_of(error: &XmlError) -> String {
    let said = error.to_string();
    let plain: String = said.chars().map(|c| if c.is_control() { ' ' } else { c }).collect();
    match plain.char_indices().nth(200) {
        Some((at, _)) => format!("{}…", plain.get(..at).unwrap_or("")),
        None => plain,
    }
}

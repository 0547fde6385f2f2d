//! From the embedded CSV text to tables by atomic number. Every irregularity is an error, named by its line.

use super::sources::Source;
use super::{Element, Entry};
use crate::selectors::{
    MARK_CORROBORATED, MARK_FROM_MEMORY, MARK_TRANSCRIBED, MARK_VERIFIED, STATE_AS_LISTED, STATE_HIGH_SPIN,
    STATE_LOW_SPIN, STATE_SP, STATE_SP2, STATE_SP3, Selector,
};
use crate::status::{Code, Failure};
use serde::Deserialize;
use serde::de::DeserializeOwned;

/// Number of elements.
const ELEMENTS: usize = 118;
/// Slots of the symbol index: two letters, the second of which may be absent.
const SYMBOL_SLOTS: usize = 27 * 27;

const VALUES: [&str; 6] = [
    include_str!("covalent_radii.csv"),
    include_str!("vdw_radii.csv"),
    include_str!("electronegativity.csv"),
    include_str!("ionization.csv"),
    include_str!("atomic_weights.csv"),
    include_str!("polarizabilities.csv"),
];

/// All that is embedded.
pub(super) struct Tables {
    tables: Vec<Table>,
    pub(super) sources: Vec<Source>,
    pub(super) elements: Vec<Element>,
    symbols: Vec<i32>,
}

/// One published table: its entries in order, and which of them belong to each element.
pub(super) struct Table {
    name: String,
    selector: Option<Selector>,
    entries: Vec<Entry>,
    /// First entry and number of entries, by atomic number.
    of_element: Vec<(usize, usize)>,
}

impl Table {
    pub(super) fn entry(&self, atomic_number: i32, state: Selector) -> Result<&Entry, Failure> {
        let of_element = usize::try_from(atomic_number).ok().and_then(|z| self.of_element.get(z));
        let &(first, count) = match of_element {
            Some(range) if atomic_number > 0 => range,
            _ => return Err(Failure::new(Code::UnknownElement)),
        };
        let mut entries = self.entries.iter().skip(first).take(count);
        let found = if state == STATE_AS_LISTED { entries.next() } else { entries.find(|entry| entry.state == state) };
        found.ok_or(Failure::new(Code::NoData))
    }
}

impl Tables {
    pub(super) fn by_selector(&self, selector: Selector) -> Option<&Table> {
        self.tables.iter().find(|table| table.selector == Some(selector))
    }

    pub(super) fn by_name(&self, name: &str) -> Option<&Table> {
        self.tables.iter().find(|table| table.name == name)
    }

    pub(super) fn element_by_text(&self, text: &str) -> Option<i32> {
        if let Some(slot) = symbol_slot(text) {
            return self.symbols.get(slot).copied().filter(|&z| z > 0);
        }
        let named = |element: &Element| {
            element.name.eq_ignore_ascii_case(text)
                || element.other_names.iter().any(|other| other.eq_ignore_ascii_case(text))
        };
        self.elements.iter().position(named).and_then(|index| i32::try_from(index + 1).ok())
    }
}

/// Slot of a text of one or two letters.
fn symbol_slot(text: &str) -> Option<usize> {
    let letter = |byte: u8| byte.is_ascii_alphabetic().then(|| usize::from(byte.to_ascii_lowercase() - b'a') + 1);
    match text.as_bytes() {
        [first] => Some(letter(*first)? * 27 - 27),
        [first, second] => Some(letter(*first)? * 27 - 27 + letter(*second)?),
        _ => None,
    }
}

#[derive(Deserialize)]
struct ValueRow {
    table: String,
    atomic_number: i32,
    state: String,
    value: String,
    u: String,
    mark: String,
    note: String,
}

#[derive(Deserialize)]
struct ElementRow {
    atomic_number: usize,
    symbol: String,
    name: String,
    other_names: String,
}

/// Reads everything that is embedded.
pub(super) fn read_all() -> Result<Tables, String> {
    let mut tables = Vec::new();
    for text in VALUES {
        read_values(text, &mut tables)?;
    }
    let sources: Vec<Source> = rows(include_str!("sources.csv"))?;
    for source in &sources {
        mark(&source.mark)?;
    }
    for table in &tables {
        if !sources.iter().any(|source| source.table == table.name) {
            return Err(format!("{} has no source", table.name));
        }
    }
    let (elements, symbols) = read_elements(include_str!("elements.csv"))?;
    Ok(Tables { tables, sources, elements, symbols })
}

fn rows<T: DeserializeOwned>(text: &str) -> Result<Vec<T>, String> {
    csv::Reader::from_reader(text.as_bytes()).deserialize().collect::<Result<_, _>>().map_err(|error| error.to_string())
}

fn read_values(text: &str, tables: &mut Vec<Table>) -> Result<(), String> {
    for (index, row) in rows::<ValueRow>(text)?.into_iter().enumerate() {
        let wrong = |what: &str| Err(format!("{} row {}: {what}", row.table, index + 1));
        let z = match usize::try_from(row.atomic_number) {
            Ok(z) if (1..=ELEMENTS).contains(&z) => z,
            _ => return wrong("no such element"),
        };
        let value = match row.value.parse::<f64>() {
            Ok(value) if value.is_finite() && value > 0.0 => value,
            _ => return wrong("no positive number"),
        };
        let u = match row.u.parse::<f64>() {
            _ if row.u.is_empty() => f64::NAN,
            Ok(u) if u.is_finite() && u >= 0.0 => u,
            _ => return wrong("no uncertainty"),
        };
        let Some(last_digit) = last_digit(&row.value) else { return wrong("not a plain decimal number") };
        let entry = Entry {
            value,
            u,
            last_digit,
            state: state(&row.state)?,
            mark: mark(&row.mark)?,
            estimated: ["estimate", "theory", "semiempirical"].iter().any(|word| row.note.starts_with(word)),
            note: row.note.clone(),
        };
        let known = tables.iter().position(|table| table.name == row.table);
        if known.is_some_and(|known| known + 1 != tables.len()) {
            return wrong("the rows of a table must stand together");
        }
        if known.is_none() {
            tables.push(Table {
                selector: Selector::by_name(&row.table).ok(),
                name: row.table.clone(),
                entries: Vec::new(),
                of_element: vec![(0, 0); ELEMENTS + 1],
            });
        }
        let Some(table) = tables.last_mut() else { return wrong("no table") };
        let end = table.entries.len();
        match table.of_element.get_mut(z) {
            Some(range) if range.1 == 0 => *range = (end, 1),
            Some(range) if range.0 + range.1 == end => range.1 += 1,
            _ => return wrong("the rows of an element must stand together"),
        }
        let (first, count) = table.of_element.get(z).copied().unwrap_or_default();
        if table.entries.iter().skip(first).take(count).any(|other| other.state == entry.state) {
            return wrong("a state stands twice");
        }
        if count > 1 && entry.state == STATE_AS_LISTED {
            return wrong("a further entry needs a state");
        }
        table.entries.push(entry);
    }
    Ok(())
}

fn read_elements(text: &str) -> Result<(Vec<Element>, Vec<i32>), String> {
    let mut elements = Vec::new();
    let mut symbols = vec![0; SYMBOL_SLOTS];
    for row in rows::<ElementRow>(text)? {
        if row.atomic_number != elements.len() + 1 {
            return Err(format!("element {} is out of order", row.atomic_number));
        }
        let z = i32::try_from(row.atomic_number).map_err(|error| error.to_string())?;
        let element = Element {
            symbol: row.symbol,
            name: row.name,
            other_names: row.other_names.split_whitespace().map(str::to_owned).collect(),
        };
        for text in element.other_names.iter().chain([&element.symbol]) {
            let Some(slot) = symbol_slot(text) else { continue };
            match symbols.get_mut(slot) {
                Some(place) if *place == 0 => *place = z,
                _ => return Err(format!("the symbol {text} stands twice")),
            }
        }
        elements.push(element);
    }
    if elements.len() != ELEMENTS {
        return Err(format!("{} elements", elements.len()));
    }
    Ok((elements, symbols))
}

/// One unit of the last digit of a plain decimal number.
fn last_digit(text: &str) -> Option<f64> {
    if !text.bytes().all(|byte| byte.is_ascii_digit() || byte == b'.') {
        return None;
    }
    let decimals = text.split_once('.').map_or(0, |(_, decimals)| decimals.len());
    // Powers of ten are exact up to 10^22, so the quotient is the double nearest to the decimal number.
    (decimals <= 22).then(|| 1.0 / (0..decimals).fold(1.0, |power, _| power * 10.0))
}

fn state(text: &str) -> Result<Selector, String> {
    Ok(match text {
        "" => STATE_AS_LISTED,
        "sp3" => STATE_SP3,
        "sp2" => STATE_SP2,
        "sp" => STATE_SP,
        "low_spin" => STATE_LOW_SPIN,
        "high_spin" => STATE_HIGH_SPIN,
        _ => return Err(format!("{text}: no such state")),
    })
}

/// The selector of a mark's word.
pub(super) fn mark(text: &str) -> Result<Selector, String> {
    Ok(match text {
        "verified" => MARK_VERIFIED,
        "corroborated" => MARK_CORROBORATED,
        "transcribed" => MARK_TRANSCRIBED,
        "from_memory" => MARK_FROM_MEMORY,
        _ => return Err(format!("{text}: no such mark")),
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::selectors;

    /// The embedded text is sound; at run time its faults could only be reported as internal.
    #[test]
    fn embedded_tables_are_sound() {
        let tables = read_all().unwrap_or_else(|fault| panic!("{fault}"));
        let count = |name| tables.by_name(name).map_or(0, |table| table.entries.len());
        // Numbers of entries in the published tables (the coverages that the papers state, and the states of C, Mn,
        // Fe, Co); without No in the table of double bonds, which is in dispute.
        for (name, entries) in [
            ("RADII_CORDERO_2008", 96 + 5),
            ("RADII_PYYKKO_SINGLE_2009", 118),
            ("RADII_PYYKKO_DOUBLE_2009", 108),
            ("RADII_PYYKKO_TRIPLE_2005", 80),
            ("VDW_BONDI_1964", 38),
            ("VDW_MANTINA_2009", 44),
            ("VDW_ALVAREZ_2013", 93),
            ("WEIGHTS_STANDARD_2021", 84),
            ("MASSES_ABUNDANT_ISOTOPE_2020", 118),
            ("POLARIZABILITY_2018", 117),
        ] {
            assert_eq!(count(name), entries, "{name}");
        }
    }

    /// Every selector of a group of tables has its table (Mulliken's scale is computed) and its source.
    #[test]
    fn every_table_selector_has_values_and_a_source() {
        let tables = read_all().unwrap_or_else(|fault| panic!("{fault}"));
        let groups = ["radii", "vdw_radii", "electronegativity", "masses", "polarizability"];
        for choice in selectors::ALL.iter().filter(|choice| groups.contains(&choice.group)) {
            let computed = choice.selector == selectors::ELECTRONEGATIVITY_MULLIKEN;
            assert_eq!(tables.by_selector(choice.selector).is_none(), computed, "{}", choice.name);
            assert!(tables.sources.iter().any(|source| source.table == choice.name), "{}", choice.name);
        }
    }

    /// A source claims what its table has: the number of elements, and the weakest mark of any entry.
    #[test]
    fn sources_say_what_the_tables_hold() {
        let tables = read_all().unwrap_or_else(|fault| panic!("{fault}"));
        for table in &tables.tables {
            let source = tables.sources.iter().find(|source| source.table == table.name);
            let source = source.unwrap_or_else(|| panic!("{}", table.name));
            let elements = table.of_element.iter().filter(|range| range.1 > 0).count();
            assert!(source.covers.starts_with(&format!("{elements} elements")), "{}: {elements}", table.name);
            let weakest = table.entries.iter().map(|entry| entry.mark).max();
            assert_eq!(Some(mark(&source.mark).unwrap_or_else(|fault| panic!("{fault}"))), weakest, "{}", table.name);
            if source.uncertainty.starts_with("none published") {
                assert!(table.entries.iter().all(|entry| entry.u.is_nan()), "{}", table.name);
            }
        }
    }

    #[test]
    fn a_malformed_table_is_refused() {
        let head = "table,atomic_number,state,value,u,mark,note\n";
        let read = |body: &str| read_values(&format!("{head}{body}"), &mut Vec::new());
        assert!(read("T,1,,31,5,verified,\n").is_ok());
        for wrong in [
            "T,0,,31,5,verified,\n",
            "T,119,,31,5,verified,\n",
            "T,1,,,5,verified,\n",
            "T,1,,3e1,5,verified,\n",
            "T,1,,31,-5,verified,\n",
            "T,1,,31,5,certain,\n",
            "T,1,sp4,31,5,verified,\n",
            "T,1,,31,5,verified,\nT,1,,32,5,verified,\n",
            "T,1,,31,5,verified,\nT,2,,28,,verified,\nT,1,sp,32,5,verified,\n",
            "T,1,,31,5,verified,\nS,1,,28,,verified,\nT,2,,32,5,verified,\n",
            "T,1,,31,5\n",
        ] {
            assert!(read(wrong).is_err(), "{wrong}");
        }
    }

    /// Hosts may call from threads with little room.
    #[test]
    fn a_small_stack_is_enough() {
        let reader = std::thread::Builder::new().stack_size(64 * 1024).spawn(|| read_all().is_ok());
        assert!(reader.unwrap_or_else(|fault| panic!("{fault}")).join().is_ok_and(|sound| sound));
    }

    #[test]
    fn last_digit_of_printed_numbers() {
        assert_eq!(last_digit("76"), Some(1.0));
        assert_eq!(last_digit("1.460"), Some(0.001));
        assert_eq!(last_digit("1e3"), None);
    }
}

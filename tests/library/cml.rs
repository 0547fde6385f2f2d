//! Chemical Markup Language.

use bondmoment::molecule::Bond;

use super::*;

const HF: &str = "<atomArray><atom id='a1' elementType='H' x3='0' y3='0' z3='0'/>\
    <atom id='a2' elementType='F' x3='0' y3='0' z3='0.9168'/></atomArray>\
    <bondArray><bond atomRefs2='a1 a2' order='1'/></bondArray>";

fn all_told(content: &str) -> Vec<String> {
    parse(content.as_bytes()).entries().iter().map(told).collect()
}

/// A broken record made of a molecule with a fault, and a good one after it.
fn message_of(inner: &str) -> String {
    let told = all_told(&format!(
        "<cml>\n<molecule title='x'>\n{inner}\n</molecule>\n<molecule title='y'>{HF}</molecule></cml>"
    ));
    assert_eq!(told.len(), 2, "{told:?}");
    assert_eq!(told[1], "y");
    told[0].clone()
}

fn one(content: &str) -> Record {
    let library = parse(content.as_bytes());
    assert_eq!(library.entries().len(), 1);
    good(&library.entries()[0]).clone()
}

#[test]
fn molecules_stand_anywhere_under_any_prefix() {
    let wrapped = format!(
        "<?xml version='1.0'?>\n<!DOCTYPE feed SYSTEM 'http://nowhere.invalid/x.dtd' [<!ENTITY e 'no'>]>\n\
         <feed xmlns='http://example.org/feed' xmlns:c='http://www.xml-cml.org/schema'>\n<molecule>not ours</molecule>\n\
         <c:module><c:list>\n<c:molecule title='one'>{}</c:molecule></c:list></c:module>\n\
         <entry><molecule xmlns='http://www.xml-cml.org/schema/cml2/core' title='two'>{HF}</molecule></entry>\n\
         <!-- <molecule/> --><c:reactant><c:molecule ref='m1'/></c:reactant></feed>\n",
        HF.replace("</", "</c:").replace('<', "<c:").replace("<c:/c:", "</c:")
    );
    let library = parse(wrapped.as_bytes());
    let records: Vec<&Record> = library.entries().iter().map(good).collect();
    assert_eq!(records.len(), 2);
    assert_eq!((records[0].title.as_str(), records[0].place.line), ("one", 6));
    assert_eq!((records[1].title.as_str(), records[1].place.line), ("two", 7));
    assert_eq!(records[0].xyz, records[1].xyz);
    assert_eq!(records[0].atomic_number, [1, 9]);
}

#[test]
fn lists_of_atoms_and_bonds() {
    let record = one("<molecule><name>hydroxide</name>\n<atomArray atomID='o h' elementType='O H' x3='0 0' y3='0 0' \
         z3='0 0.97' formalCharge='-1 0'/>\n<bondArray bondID='b' atomRef1='o' atomRef2='h' order='S'/></molecule>");
    assert_eq!((record.title.as_str(), &record.atomic_number[..]), ("hydroxide", &[8, 1][..]));
    assert_eq!(record.formal_charge.as_deref(), Some(&[-1, 0][..]));
    assert_eq!(record.bonds.as_deref(), Some(&[Bond { a: 0, b: 1, order: 1.0 }][..]));
    let uneven = message_of("<atomArray atomID='o h' elementType='O H' x3='0' y3='0 0' z3='0 1'/>");
    assert!(uneven.contains("record 1, line 3: the list x3 of atomArray has 1 entries; expected 2"), "{uneven}");
}

#[test]
fn names_and_data() {
    let record = one(&format!(
        "<molecule title='HF &amp; co'><name>HF &#38; co</name><name convention='iupac'>fl<![CDATA[uo]]>rane</name>\
         <formula concise='H 1 F 1'><atomArray elementType='H F' count='1 1'/></formula>{HF}\
         <propertyList><property dictRef='d:bp'><scalar units='u:c'> 19.5 </scalar></property></propertyList>\
         <property title='sample'><scalar title='other'>&lt;S-1&gt;</scalar></property><scalar title='batch'>7</scalar>\
         </molecule>"
    ));
    assert_eq!(record.title, "HF & co");
    let items = [("name", "fluorane"), ("d:bp", "19.5"), ("sample", "<S-1>"), ("batch", "7")];
    assert_eq!(record.data, items.map(|(name, value)| (name.to_owned(), value.to_owned())));
}

#[test]
fn nested_molecules_are_fragments_of_the_outer_one() {
    let ammonium = "<molecule formalCharge='1'><atomArray><atom id='a1' elementType='Na' x3='3' y3='0' z3='0'/></atomArray></molecule>";
    let record =
        one(&format!("<molecule title='pair'>{ammonium}<molecule formalCharge='0'>{HF}</molecule></molecule>"));
    assert_eq!(record.atomic_number, [11, 1, 9]);
    assert_eq!(record.formal_charge.as_deref(), Some(&[1, 0, 0][..]));
    // Ids may be used again in another fragment, but not across.
    assert_eq!(record.bonds.as_deref(), Some(&[Bond { a: 1, b: 2, order: 1.0 }][..]));
    let across = message_of(&format!(
        "{ammonium}<molecule>{HF}</molecule><bondArray><bond atomRefs2='a1 a2' order='1'/></bondArray>"
    ));
    assert!(across.contains("bond 2: several atoms have the id \"a1\""), "{across}");
}

/// Hydroxide and ammonium: the bonds say which atom carries the charge that only the molecule states.
#[test]
fn a_charge_of_the_molecule_finds_its_atom() {
    let hydroxide = "<atomArray><atom id='h' elementType='H' x3='0' y3='0' z3='0.97'/>\
        <atom id='o' elementType='O' x3='0' y3='0' z3='0'/></atomArray><bondArray><bond atomRefs2='o h' order='1'/></bondArray>";
    let record = one(&format!("<molecule formalCharge='-1'>{hydroxide}</molecule>"));
    assert_eq!(record.formal_charge.as_deref(), Some(&[0, -1][..]));
    let told = all_told(&format!("<molecule formalCharge='3'>{hydroxide}</molecule>"));
    assert!(told[0].contains("line 1: the charge 3 of the molecule is on no atom"), "{}", told[0]);
    let contradiction = hydroxide.replace("id='o'", "id='o' formalCharge='-1'");
    let told = all_told(&format!("<molecule formalCharge='0'>{contradiction}</molecule>"));
    assert!(told[0].contains("the charge of the molecule is 0, that of its atoms -1"), "{}", told[0]);
}

#[test]
fn coordinates_on_paper_make_a_drawing() {
    let flat = HF.replace("z3='0'", "").replace("z3='0.9168'", "").replace("x3", "x2").replace("y3='0'", "y2='0'");
    let record = one(&format!("<molecule>{}</molecule>", flat.replacen("x2='0' y2='0' /><", "x2='1' y2='0'/><", 1)));
    assert!(record.drawing);
    assert_eq!(record.xyz, [[1.0, 0.0, 0.0], [0.0, 0.0, 0.0]]);
    let nowhere = one("<molecule><atom elementType='He'/><atom elementType='He'/></molecule>");
    assert!(nowhere.drawing);
}

#[test]
fn stated_hydrogens_that_are_not_there_are_missed() {
    // H3C-Cl as CH2Cl: with one hydrogen too few and others there, only the count tells.
    let atoms = |count: u8| {
        format!(
            "<molecule title='c'><atomArray><atom id='c' elementType='C' x3='0' y3='0' z3='0' hydrogenCount='{count}'/>\
             <atom id='l' elementType='Cl' x3='0' y3='0' z3='1.78'/><atom id='h' elementType='H' x3='1' y3='0' z3='-.35'/>\
             <atom id='i' elementType='H' x3='-.5' y3='.9' z3='-.35'/></atomArray><bondArray>\
             <bond atomRefs2='c l' order='1'/><bond atomRefs2='c h' order='1'/><bond atomRefs2='c i' order='1'/>\
             </bondArray></molecule>"
        )
    };
    let kind = |count| text(&tables_of(&atoms(count)).polarity, "structure_kind", 0);
    assert_eq!((kind(2), kind(3)), ("open shell".to_owned(), "hydrogens missing".to_owned()));
}

#[test]
fn a_broken_molecule_costs_itself() {
    for (inner, words) in [
        ("<atomArray><atom id='a' elementType='Qq'/></atomArray>", "line 3: atom 1: there is no element \"Qq\""),
        ("<atomArray><atom id='a'/></atomArray>", "atom 1: it states no elementType"),
        ("<atom id='a' elementType='C' x3='zero' y3='0' z3='0'/>", "expected a decimal number as x3, found \"zero\""),
        ("<atom id='a' elementType='C' x3='0' y3='0'/>", "it states some of x3, y3 and z3"),
        ("<atom id='a' elementType='C' xFract='0' yFract='0' zFract='0'/>", "fractions of a unit cell"),
        ("<atom id='a' elementType='C' formalCharge='+'/>", "expected formalCharge from -100 to 100, found \"+\""),
        ("<atom id='a' elementType='C'/>\n<atom id='a' elementType='C'/>", "line 4: atom 2: its id \"a\""),
        ("<atom id='a' elementType='&who;'/>", "\"elementType\""),
        ("<name>&who;</name>", "the entity \"who\" is not one of XML's five"),
        ("<molecule ref='m2'/>", "a fragment refers to another molecule"),
        ("<molecule count='2'><atom id='a' elementType='Na'/></molecule>", "the fragment is there \"2\" times"),
        ("", "line 2: the record has no atoms"),
    ] {
        let told = message_of(inner);
        assert!(told.contains(words), "{told}");
        assert!(told.starts_with("text, record 1, line "), "{told}");
    }
    for (from, to, words) in [
        ("order='1'", "order='4'", "bond 1: its order is \"4\"; expected 1, 2, 3, S, D, T, A or 1.5"),
        ("order='1'", "", "bond 1: it states no order"),
        ("a1 a2", "a1 a9", "bond 1: there is no atom \"a9\""),
        ("a1 a2", "a1 a1", "bond 1: it joins atom \"a1\" with itself"),
        ("a1 a2", "a1", "bond 1: expected two atoms, found \"a1\""),
        ("</bondArray>", "<bond atomRefs2='a2 a1' order='1'/></bondArray>", "atoms \"a2\" and \"a1\" are bonded twice"),
    ] {
        let told = message_of(&HF.replace(from, to));
        assert!(told.contains(words), "{told}");
    }
}

#[test]
fn what_is_not_well_formed_ends_the_file() {
    let good = format!("<molecule title='good'>{HF}</molecule>\n");
    for (bad, line, words) in [
        (format!("<cml>\n{good}<molecule title='bad'>\n<atomArray></molecule>{good}</cml>"), 4, "not well formed"),
        (format!("<cml>\n{good}<molecule title='bad'><atom id=a/></molecule>{good}</cml>"), 3, "not well formed"),
        (format!("<cml>\n{good}<molecule title='bad'>\n<atomArray>"), 4, "the file ends within a molecule"),
        (format!("<cml>\n{good}"), 3, "the file ends within an element that is open"),
        (format!("<cml>\n{good}{}{good}", "<a>".repeat(400)), 3, "nested more than 256 deep"),
        (format!("<cml>\n{good}&#xFFFFFFFF;{good}</cml>"), 3, "not well formed"),
    ] {
        let told = all_told(&bad);
        assert_eq!(told.len(), 2, "{told:?}");
        assert_eq!(told[0], "good");
        assert!(told[1].starts_with(&format!("text, record 2, line {line}: ")), "{}", told[1]);
        assert!(told[1].contains(words) && told[1].contains("the file is read no further"), "{}", told[1]);
    }
}

#[test]
fn newlines_byte_order_mark_and_encodings() {
    let plain = std::fs::read_to_string(file("same.cml")).unwrap();
    let expected = format!("{:?}", parse(plain.as_bytes()).entries());
    for other in [plain.replace('\n', "\r\n"), plain.replace('\n', "\r"), format!("\u{FEFF}{plain}")] {
        assert_eq!(format!("{:?}", parse(other.as_bytes()).entries()), expected);
    }
    let latin = plain.replacen("UTF-8", "ISO-8859-1", 1).replacen("nitromethane", "#gua", 1);
    let latin: Vec<u8> = latin.bytes().map(|byte| if byte == b'#' { 0xE1 } else { byte }).collect();
    assert_eq!(good(&parse(&latin).entries()[0]).title, "água");
    let utf8 = plain.replacen("nitromethane", "água", 1);
    assert_eq!(good(&parse(utf8.as_bytes()).entries()[0]).title, "água");
    let unknown = utf8.replacen("UTF-8", "KOI8-R", 1);
    let told = all_told(&unknown);
    assert!(told.len() == 1 && told[0].contains("encoding KOI8-R; expected UTF-8 or ISO-8859-1"), "{told:?}");
}

#[test]
fn hydrogen_bonds_are_left_out() {
    let bonds = "<bond atomRefs2='a1 a2' order='1'/><bond atomRefs2='a2 a3' order='hbond'/>";
    let record = one(&format!(
        "<molecule>{}</molecule>",
        HF.replace("<bond atomRefs2='a1 a2' order='1'/>", bonds)
            .replace("</atomArray>", "<atom id='a3' elementType='He' x3='0' y3='0' z3='4'/></atomArray>")
    ));
    assert_eq!(record.bonds.map(|bonds| bonds.len()), Some(1));
    assert_eq!(parse(b"<cml><molecule ref='m'/></cml>").entries().len(), 0);
}

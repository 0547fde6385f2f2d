//! Files of structures in, the polarity table out: readers, kinds of record, rows, runs.

mod library {
    mod cml;
    mod packed;
    mod reading;
    mod robust;
    mod rows;
    mod runs;
    mod told;
    mod v3000;

    use std::path::PathBuf;
    use std::sync::atomic::AtomicBool;

    use bondmoment::library::{Entry, MoleculeLibrary, Record, Settings, Table, Tables, Wanted};
    use bondmoment::parallel::Threads;
    use bondmoment::selectors::FORMAT_BY_CONTENT;

    pub fn file(name: &str) -> PathBuf {
        PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("tests/structures").join(name)
    }

    pub fn demo() -> PathBuf {
        PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("src/cli/demo/structures")
    }

    pub fn never() -> AtomicBool {
        AtomicBool::new(false)
    }

    pub fn parse(content: &[u8]) -> MoleculeLibrary {
        MoleculeLibrary::parse(content, "text", FORMAT_BY_CONTENT, Threads::new(1), &never()).unwrap()
    }

    pub fn read(name: &str) -> MoleculeLibrary {
        MoleculeLibrary::read(&file(name), FORMAT_BY_CONTENT, Threads::new(1), &never()).unwrap()
    }

    pub fn tables(library: &MoleculeLibrary, settings: &Settings) -> Tables {
        let n = library.entries().len();
        library.polarity_table(0, n, settings, Wanted::ALL, Threads::new(1), &never()).unwrap()
    }

    /// The tables of one text with default settings.
    pub fn tables_of(content: &str) -> Tables {
        tables(&parse(content.as_bytes()), &Settings::default())
    }

    pub fn text(table: &Table, name: &str, row: usize) -> String {
        table.by_name(name).unwrap().text(row).into_owned()
    }

    pub fn number(table: &Table, name: &str, row: usize) -> f64 {
        table.by_name(name).unwrap().numbers().unwrap()[row]
    }

    pub fn status(table: &Table, name: &str, row: usize) -> i32 {
        table.by_name(name).unwrap().status()[row]
    }

    pub fn good(entry: &Entry) -> &Record {
        match entry {
            Entry::Molecule(record) => record,
            Entry::Broken(broken) => panic!("{}", broken.text()),
        }
    }

    /// The title of a good record, or the message of a broken one.
    pub fn told(entry: &Entry) -> String {
        match entry {
            Entry::Molecule(record) => record.title.clone(),
            Entry::Broken(broken) => broken.text(),
        }
    }
}

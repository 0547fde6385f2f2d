//! Computed against measured dipoles of the open set: `cargo run --release --example accuracy`.
//!
//! Reads tests/open_set, finds the bonds of each structure, computes its dipole with every charge model that needs no
//! charges from the caller, and prints how far it is from the measured one; with `--csv` the whole table.

use std::error::Error;
use std::fs;
use std::path::Path;

use bondmoment::bonds::find::find_bonds;
use bondmoment::charges::partial_charges;
use bondmoment::library::MoleculeLibrary;
use bondmoment::library::{Entry, number_text};
use bondmoment::moments;
use bondmoment::parallel::Threads;
use bondmoment::selectors::{BONDS_ALTERNATING, CHARGES_PEOE_1980, FORMAT_XYZ};

/// One molecule of the set.
pub struct Row {
    stem: String,
    flags: String,
    measured: f64,
    /// |μ| [D], or why there is none.
    computed: Result<f64, String>,
}

#[allow(dead_code)] // The test of the README uses the report alone.
fn main() -> Result<(), Box<dyn Error>> {
    let rows = rows(&Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/open_set"))?;
    if std::env::args().any(|argument| argument == "--csv") {
        println!("molecule,measured_D,peoe_D,difference_D,flags,reason");
        for row in &rows {
            let measured = number_text(row.measured);
            match &row.computed {
                Ok(dipole) => {
                    let difference = dipole - row.measured;
                    println!("{},{measured},{dipole:.3},{difference:.3},{},", row.stem, row.flags);
                }
                Err(reason) => println!("{},{measured},,,{},{reason}", row.stem, row.flags),
            }
        }
        return Ok(());
    }
    print!("{}", report(&rows));
    Ok(())
}

/// How far computed dipoles are from measured ones.
pub fn report(rows: &[Row]) -> String {
    let mut differences: Vec<(f64, &Row)> =
        rows.iter().filter_map(|row| Some((row.computed.as_ref().ok()? - row.measured, row))).collect();
    differences.sort_by(|a, b| b.0.abs().total_cmp(&a.0.abs()).then_with(|| a.1.stem.cmp(&b.1.stem)));
    let n = differences.len();
    let rms = (differences.iter().map(|(d, _)| d * d).sum::<f64>() / n as f64).sqrt();
    let mut sizes: Vec<f64> = differences.iter().map(|(d, _)| d.abs()).collect();
    sizes.sort_by(f64::total_cmp);
    let median = if n % 2 == 1 { sizes[n / 2] } else { (sizes[n / 2 - 1] + sizes[n / 2]) / 2.0 };
    let mut text = format!(
        "PEOE 1980 against measured dipoles, open set: n = {n} ({} molecules, the others have no parameters)\n\
         rms {rms:.2} D, median {median:.2} D, worst ten:\n",
        rows.len()
    );
    for (difference, row) in differences.iter().take(10) {
        let (name, measured, computed) = (&row.stem, row.measured, row.measured + difference);
        text.push_str(&format!("  {name:<20} measured {measured:.2}  computed {computed:.2}  {difference:+.2} D\n"));
    }
    text
}

/// The open set, computed.
pub fn rows(folder: &Path) -> Result<Vec<Row>, Box<dyn Error>> {
    let mut rows = Vec::new();
    let never = std::sync::atomic::AtomicBool::new(false);
    for record in csv::Reader::from_path(folder.join("open.csv"))?.deserialize() {
        let record: std::collections::BTreeMap<String, String> = record?;
        let cell = |name: &str| record.get(name).cloned().unwrap_or_default();
        let stem = cell("stem");
        let content = fs::read(folder.join("molecules").join(format!("{stem}.xyz")))?;
        let library = MoleculeLibrary::parse(&content, &stem, FORMAT_XYZ, Threads::new(1), &never)
            .map_err(|problem| problem.message)?;
        let Some(Entry::Molecule(structure)) = library.entries().first() else {
            return Err(format!("{stem}: no structure").into());
        };
        let molecule = structure.molecule();
        let computed = find_bonds(molecule, BONDS_ALTERNATING)
            .and_then(|bonding| partial_charges(CHARGES_PEOE_1980, molecule, &bonding, None))
            .and_then(|charges| moments::dipole(molecule, &charges, 0.0))
            .map(|dipole| dipole.magnitude.value)
            .map_err(|failure| failure.code.text().to_owned());
        rows.push(Row { stem, flags: cell("flags"), measured: cell("mu_D").parse()?, computed });
    }
    Ok(rows)
}

//! `demo`: the structures of an invented laboratory through `tabulate`.

use std::io::{BufWriter, Write, stdout};
use std::sync::atomic::AtomicBool;

use bondmoment::library::{Settings, Table, Tabulation, Wanted};
use bondmoment::moments::PEOE_RMS_D;
use bondmoment::parallel::Threads;
use bondmoment::selectors::FORMAT_BY_CONTENT;
use clap::Args;

use crate::{Outcome, Trouble, tabulate};

/// An invented laboratory's structures through tabulate, and what to see in the table
#[derive(Args)]
#[command(after_help = "Example:\n  bondmoment demo")]
pub(crate) struct Demo {}

/// Geometries of real compounds; the laboratory is invented. `demo/structures/NOTICE.txt` names their sources.
const FILES: &[(&str, &[u8])] = &[
    ("acetonitrile.mol", include_bytes!("demo/structures/acetonitrile.mol")),
    ("ammonium_acetate.cml", include_bytes!("demo/structures/ammonium_acetate.cml")),
    ("carbon_dioxide.xyz", include_bytes!("demo/structures/carbon_dioxide.xyz")),
    ("carriers.cml", include_bytes!("demo/structures/carriers.cml")),
    ("chloromethane.xyz", include_bytes!("demo/structures/chloromethane.xyz")),
    ("extra_v3000.sdf", include_bytes!("demo/structures/extra_v3000.sdf")),
    ("ions_and_pairs.xyz", include_bytes!("demo/structures/ions_and_pairs.xyz")),
    ("library.sdf", include_bytes!("demo/structures/library.sdf")),
    ("oxygenates.sdf.gz", include_bytes!("demo/structures/oxygenates.sdf.gz")),
    ("sulfur_hexafluoride.cml", include_bytes!("demo/structures/sulfur_hexafluoride.cml")),
    ("broken/among_good.sdf", include_bytes!("demo/structures/broken/among_good.sdf")),
];

impl Demo {
    pub(crate) fn run(&self) -> Result<Outcome, Trouble> {
        let folder = tempfile::tempdir()?;
        std::fs::create_dir(folder.path().join("broken"))?;
        for (name, content) in FILES {
            std::fs::write(folder.path().join(name), content)?;
        }
        let paths = [folder.path().to_owned()];
        let mut run = Tabulation::open(&paths, FORMAT_BY_CONTENT, Settings::default(), None)
            .map_err(|problem| problem.message)?;
        let wanted = Wanted { polarity: true, bonds: false, atoms: false };
        let never = AtomicBool::new(false);
        let tables = run
            .next_batch(usize::MAX, wanted, Threads::new(1), &never)
            .map_err(|problem| problem.message)?
            .ok_or_else(|| "the demo has no structures".to_owned())?;
        let mut out = BufWriter::new(stdout().lock());
        writeln!(out, "Structures of an invented laboratory (the compounds are real), charges by PEOE:\n")?;
        tabulate::plain(&mut out, &tables.polarity, true)?;
        explain(&mut out, &tables.polarity)?;
        out.flush()?;
        Ok(Outcome::AllGood)
    }
}

fn explain(out: &mut impl Write, table: &Table) -> Result<(), Trouble> {
    let texts = |name: &str| -> Result<Vec<String>, Trouble> {
        let column = table.by_name(name).map_err(|_| format!("the table has no column {name}"))?;
        Ok((0..table.rows()).map(|row| column.text(row).into_owned()).collect())
    };
    let (polarity, status, detail) = (texts("polarity")?, texts("status")?, texts("detail")?);
    let by_symmetry = detail.iter().filter(|text| text.contains("by symmetry")).count();
    let failed = status.iter().filter(|text| *text != "OK").count();
    let count = |verdict: &str| polarity.iter().filter(|text| *text == verdict).count();
    writeln!(
        out,
        "\nWhat to see in it\n\
         - {} rows: {} polar, {} non-polar, {} undecided, {} charged, {failed} without a dipole, each with its reason.\n\
         - Polar bonds do not make a polar molecule: {by_symmetry} rows are without a dipole by symmetry, tetrachloromethane\n  \
           and p-dichlorobenzene among them, whatever the charges.\n\
         - One conformer is not the molecule: anti-1,2-dichloroethane has no dipole by symmetry, yet turning about its C-C bond\n  \
           makes one, so it is undecided; hexane and cyclohexane turn too, and stay non-polar.\n\
         - The arrow of a dipole points from - to +; \"- end\" names the negative end of the strongest bond.\n\
         - PEOE misses measured dipoles by {PEOE_RMS_D} D (rms) and says nothing of pi bonds: nitrobenzene, measured at 4.2 D, comes\n  \
           out far too small. A verdict counts that in.\n\
         - Records that cannot be computed cost themselves only: among_good.sdf has three (an unknown element, a flat drawing, one\n  \
           without its hydrogens), and the two good ones around them are there.\n\n\
         Your own files: bondmoment tabulate FILE... --into FOLDER",
        table.rows(),
        count("polar"),
        count("non-polar"),
        count("undecided"),
        count("charged"),
    )?;
    Ok(())
}

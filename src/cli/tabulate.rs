//! `tabulate`: files of structures in, the polarity table out.

use std::fs::File;
use std::io::{BufWriter, IsTerminal, Write, stderr, stdin, stdout};
use std::path::{Path, PathBuf};
use std::sync::atomic::AtomicBool;
use std::time::Duration;

use bondmoment::catalogue::DATA_VERSION;
use bondmoment::catalogue::evaluate::choice_of;
use bondmoment::library::settings::{Holds, SETTINGS};
use bondmoment::library::tabulation::LeftOut;
use bondmoment::library::write::{CsvStyle, write_csv, write_json_lines};
use bondmoment::library::{Settings, Table, Tables, Tabulation, Wanted};
use bondmoment::moments::PEOE_RMS_D;
use bondmoment::parallel::Threads;
use bondmoment::selectors::{
    CHARGES_PEOE_1980, FORMAT_BY_CONTENT, MASSES_ABUNDANT_ISOTOPE_2020, RADII_PYYKKO_DOUBLE_2009,
    RADII_PYYKKO_TRIPLE_2005,
};
use bondmoment::tables;
use clap::Args;
use indicatif::{ProgressBar, ProgressStyle};

use crate::{Layout, Outcome, Trouble, show};

/// Records computed at a time.
const BATCH: usize = 4096;

/// Files of structures in, the polarity table out
///
/// Takes XYZ files (one or many frames), molfiles and SD files (V2000 and V3000) and CML, gzip-compressed or not, told by
/// their content, or folders of them. A record that cannot be read or computed gets a row that says why, and the others go on.
#[derive(Args)]
#[command(after_help = "Examples:\n  bondmoment tabulate library.sdf\n  \
    bondmoment tabulate structures/ --into results\n  \
    bondmoment tabulate library.sdf --layout csv --set polarity_limit_D=0.3 > polarity.csv\n\n\
    Exit status: 0 all rows good, 1 some rows failed, 2 the job could not be done.")]
pub(crate) struct Tabulate {
    /// Files or folders; - is standard input
    #[arg(required_unless_present = "list_settings")]
    paths: Vec<PathBuf>,
    /// Folder for polarity, bonds and atoms tables and a page of settings; made if need be
    #[arg(long, value_name = "FOLDER")]
    into: Option<PathBuf>,
    /// How to print the polarity table; with --into csv or json-lines
    #[arg(long, value_enum)]
    layout: Option<Layout>,
    /// A setting, NAME=VALUE; may be given several times
    #[arg(long = "set", value_name = "NAME=VALUE")]
    set: Vec<String>,
    /// List the settings with their defaults
    #[arg(long)]
    list_settings: bool,
    /// Write CSV with decimal comma, and semicolons between the cells
    #[arg(long)]
    decimal_comma: bool,
    /// Threads; 0 is all that there are
    #[arg(long, default_value_t = 0)]
    threads: i32,
}

impl Tabulate {
    pub(crate) fn run(&self) -> Result<Outcome, Trouble> {
        if self.list_settings {
            return list_settings();
        }
        if !(0..=1024).contains(&self.threads) {
            return Err(Trouble::Words("--threads must be from 0 to 1024".to_owned()));
        }
        let settings = self.settings()?;
        let mut run = if self.paths.len() == 1 && self.paths[0] == Path::new("-") {
            Tabulation::from_reader("standard input", stdin(), FORMAT_BY_CONTENT, settings.clone())
        } else {
            Tabulation::open(&self.paths, FORMAT_BY_CONTENT, settings.clone(), None)
        }
        .map_err(|problem| problem.message)?;
        for LeftOut { message, .. } in run.left_out() {
            eprintln!("left out: {message}");
        }
        match &self.into {
            Some(folder) => self.write_folder(&mut run, folder),
            None => self.to_output(&mut run),
        }
    }

    fn settings(&self) -> Result<Settings, Trouble> {
        let mut settings = Settings::default();
        for text in &self.set {
            let (name, value) = text.split_once('=').ok_or_else(|| format!("--set {text}: expected NAME=VALUE"))?;
            let name = name.trim();
            let group = SETTINGS.iter().find(|setting| setting.name == name).and_then(|setting| match setting.holds {
                Holds::Choice(group, ..) => Some(group),
                _ => None,
            });
            // A choice may leave out the prefix of its group.
            match group.and_then(|group| choice_of(group, value)) {
                Some(choice) => settings.set_choice(name, choice),
                None => settings.set_from_text(name, value),
            }
            .map_err(|failure| format!("--set {text}: {}; --list-settings lists them", failure.code.text()))?;
        }
        Ok(settings)
    }

    /// The polarity table to standard output as it comes.
    fn to_output(&self, run: &mut Tabulation) -> Result<Outcome, Trouble> {
        let layout = self.layout.unwrap_or(Layout::Plain);
        let wanted = Wanted { polarity: true, bonds: false, atoms: false };
        let mut out = BufWriter::new(stdout().lock());
        let mut first = true;
        let outcome = self.batches(run, wanted, |tables| {
            match layout {
                Layout::Plain => plain(&mut out, &tables.polarity, first)?,
                Layout::Csv => write_csv(&tables.polarity, &mut out, self.csv(first))?,
                Layout::JsonLines => write_json_lines(&tables.polarity, &mut out)?,
            }
            first = false;
            Ok(())
        })?;
        if layout == Layout::Plain && !first {
            footnote(&mut out)?;
        }
        out.flush()?;
        Ok(outcome)
    }

    fn csv(&self, first: bool) -> CsvStyle {
        CsvStyle { decimal_comma: self.decimal_comma, without_names: !first }
    }

    /// All three tables into a folder; each file appears whole or not at all.
    fn write_folder(&self, run: &mut Tabulation, folder: &Path) -> Result<Outcome, Trouble> {
        let layout = match self.layout {
            None | Some(Layout::Csv) => Layout::Csv,
            Some(Layout::JsonLines) => Layout::JsonLines,
            Some(Layout::Plain) => return Err(Trouble::Words("--into writes csv or json-lines".to_owned())),
        };
        let ending = if layout == Layout::Csv { "csv" } else { "jsonl" };
        let named = |error: std::io::Error| Trouble::Words(format!("{}: {error}", folder.display()));
        std::fs::create_dir_all(folder).map_err(named)?;
        let file = |name: &str| -> Result<Output, Trouble> {
            let target = folder.join(format!("{name}.{ending}"));
            let draft = tempfile::NamedTempFile::new_in(folder).map_err(named)?;
            let writer = BufWriter::new(draft.reopen().map_err(named)?);
            Ok(Output { target, draft, writer })
        };
        let mut outputs = [file("polarity")?, file("bonds")?, file("atoms")?];
        let mut first = true;
        let outcome = self.batches(run, Wanted::ALL, |tables| {
            for (output, table) in outputs.iter_mut().zip([&tables.polarity, &tables.bonds, &tables.atoms]) {
                match layout {
                    Layout::JsonLines => write_json_lines(table, &mut output.writer)?,
                    _ => write_csv(table, &mut output.writer, self.csv(first))?,
                }
            }
            first = false;
            Ok(())
        })?;
        let mut page = file("settings")?;
        page.target.set_extension("txt");
        write_page(&mut page.writer, run.settings(), &self.paths)?;
        for output in outputs.into_iter().chain([page]) {
            output.keep()?;
        }
        eprintln!("polarity.{ending}, bonds.{ending}, atoms.{ending} and settings.txt are in {}", folder.display());
        Ok(outcome)
    }

    /// Batch by batch, with a progress bar where somebody watches.
    fn batches(
        &self,
        run: &mut Tabulation,
        wanted: Wanted,
        mut take: impl FnMut(&Tables) -> Result<(), Trouble>,
    ) -> Result<Outcome, Trouble> {
        let progress = run.progress();
        let bar = if stderr().is_terminal() && progress.bytes_total() > 1 << 20 {
            let style = ProgressStyle::with_template("{msg} records  {bytes} of {total_bytes}  {wide_bar}  {eta}");
            let bar = ProgressBar::new(progress.bytes_total());
            bar.set_style(style.map_err(|error| error.to_string())?);
            bar.enable_steady_tick(Duration::from_millis(250));
            bar
        } else {
            ProgressBar::hidden()
        };
        let never = AtomicBool::new(false);
        let threads = Threads::new(self.threads);
        let mut outcome = Outcome::AllGood;
        loop {
            let batch = run.next_batch(BATCH, wanted, threads, &never).map_err(|problem| problem.message)?;
            let Some(tables) = batch else { break };
            if let Ok(status) = tables.polarity.by_name("status")
                && (0..tables.polarity.rows()).any(|row| status.text(row) != "OK")
            {
                outcome = Outcome::SomeFailed;
            }
            take(&tables)?;
            bar.set_position(progress.bytes_done());
            bar.set_message(progress.records_done().to_string());
        }
        bar.finish_and_clear();
        Ok(outcome)
    }
}

/// A file on its way: written beside its place and moved there when it is whole.
struct Output {
    target: PathBuf,
    draft: tempfile::NamedTempFile,
    writer: BufWriter<File>,
}

impl Output {
    fn keep(mut self) -> Result<(), Trouble> {
        self.writer.flush()?;
        let named = |error: std::io::Error| Trouble::Words(format!("{}: {error}", self.target.display()));
        self.writer.get_ref().sync_all().map_err(named)?;
        open_to_readers(self.draft.as_file()).map_err(named)?;
        self.draft.persist(&self.target).map_err(|error| named(error.error))?;
        Ok(())
    }
}

/// Drafts are private to their writer; results are as readable as any new file.
#[cfg(unix)]
fn open_to_readers(file: &File) -> std::io::Result<()> {
    use std::os::unix::fs::PermissionsExt;
    file.set_permissions(std::fs::Permissions::from_mode(0o644))
}

#[cfg(not(unix))]
fn open_to_readers(_: &File) -> std::io::Result<()> {
    Ok(())
}

/// One page that says with what the tables were made.
fn write_page(out: &mut impl Write, settings: &Settings, paths: &[PathBuf]) -> Result<(), Trouble> {
    writeln!(out, "bondmoment {}, tables {DATA_VERSION}", env!("CARGO_PKG_VERSION"))?;
    for path in paths {
        writeln!(out, "read: {}", path.display())?;
    }
    writeln!(out, "\nUnits: Å, e, D. A dipole points from - to +. Atoms are numbered from 1.\n\nSettings")?;
    let mut lines = Vec::new();
    for setting in SETTINGS {
        let value = settings.text_of(setting.name).unwrap_or_default();
        lines.push(vec![format!("  {}", setting.name), value, setting.unit.to_owned(), setting.help.to_owned()]);
    }
    show::columns(out, &lines)?;
    writeln!(out, "\nSources")?;
    for choice in [
        settings.charge_model,
        settings.electronegativity,
        settings.ionic_law,
        settings.covalent_radii,
        RADII_PYYKKO_DOUBLE_2009,
        RADII_PYYKKO_TRIPLE_2005,
        settings.vdw_radii,
        MASSES_ABUNDANT_ISOTOPE_2020,
    ] {
        if let Ok(source) = tables::source(choice) {
            writeln!(out, "  {}: {}, {}", choice.name(), source.author, source.journal)?;
        }
    }
    if settings.charge_model == CHARGES_PEOE_1980 {
        writeln!(
            out,
            "\nPEOE states no uncertainty: verdicts take its rms over the open set of measured dipoles, {PEOE_RMS_D} D, in every\n\
             direction. With it a molecule is polar above about {:.1} D and non-polar by symmetry only.",
            settings.polarity_limit_d + 2.0 * PEOE_RMS_D
        )?;
    }
    Ok(())
}

fn list_settings() -> Result<Outcome, Trouble> {
    let settings = Settings::default();
    let mut lines = vec![vec!["setting".to_owned(), "default".to_owned(), "meaning".to_owned()]];
    for setting in SETTINGS {
        let default = settings.text_of(setting.name).unwrap_or_default();
        lines.push(vec![setting.name.to_owned(), default, setting.help.to_owned()]);
    }
    show::columns(&mut stdout().lock(), &lines)?;
    Ok(Outcome::AllGood)
}

/// The columns for people, of fixed width so that rows can be printed as they come.
pub(crate) fn plain(out: &mut impl Write, table: &Table, first: bool) -> Result<(), Trouble> {
    if first {
        writeln!(
            out,
            "{:<26} {:<12} {:>7}  {:<10} {:<12} {:>5}  status, detail",
            "compound", "formula", "dipole", "polarity", "strongest", "dchi"
        )?;
        writeln!(out, "{:<26} {:<12} {:>7}  {:<10} {:<12} {:>5}", "", "", "D", "", "bond, - end", "")?;
    }
    let column = |name: &str| table.by_name(name).map_err(|_| format!("the table has no column {name}"));
    let (compound, formula, dipole, polarity) =
        (column("compound")?, column("formula")?, column("dipole_D")?, column("polarity")?);
    let (bond, end, delta) = (column("strongest_bond")?, column("negative_end")?, column("delta_chi")?);
    let (status, detail) = (column("status")?, column("detail")?);
    let number = |column: &bondmoment::library::Column, row: usize, places: usize| {
        column
            .numbers()
            .ok()
            .and_then(|values| values.get(row))
            .filter(|x| !x.is_nan())
            .map_or(String::new(), |x| format!("{x:.places$}"))
    };
    for row in 0..table.rows() {
        let strongest = match (bond.text(row), end.text(row)) {
            (bond, end) if bond.is_empty() || end.is_empty() => bond.into_owned(),
            (bond, end) => format!("{bond} {end}"),
        };
        // What holds for most rows stands once, below the table.
        let detail = detail.text(row);
        let told: Vec<&str> = detail.split("; ").filter(|words| !is_common(words)).collect();
        let remarks = match (status.text(row), told.join("; ")) {
            (status, told) if status == "OK" => told,
            (status, told) if told.is_empty() => status.into_owned(),
            (status, told) => format!("{status}: {told}"),
        };
        let line = format!(
            "{:<26} {:<12} {:>7}  {:<10} {:<12} {:>5}  {}",
            clipped(&compound.text(row), 26),
            clipped(&formula.text(row), 12),
            number(dipole, row, 3),
            polarity.text(row),
            clipped(&strongest, 12),
            number(delta, row, 2),
            remarks
        );
        writeln!(out, "{}", line.trim_end())?;
    }
    Ok(())
}

/// Remarks that most rows have.
const COMMON: [&str; 2] = ["bonds found from the coordinates", "judged with the rms of the model"];

fn is_common(words: &str) -> bool {
    COMMON.iter().any(|common| words.starts_with(common))
}

/// What the plain columns leave out.
pub(crate) fn footnote(out: &mut impl Write) -> Result<(), Trouble> {
    writeln!(
        out,
        "\nDipoles in D, by charges without an uncertainty of their own unless you gave some: verdicts count the model's rms of\n\
         {PEOE_RMS_D} D in. The arrow points from - to +; \"- end\" is the negative end of the strongest bond, dchi its difference of\n\
         electronegativity. Uncertainties, vectors, bonds and atoms: --into FOLDER, or --layout csv."
    )?;
    Ok(())
}

/// A text of at most so many characters.
fn clipped(text: &str, most: usize) -> String {
    if text.chars().count() <= most {
        return text.to_owned();
    }
    text.chars().take(most - 1).chain(['…']).collect()
}

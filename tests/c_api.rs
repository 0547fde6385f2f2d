//! The C ABI as C and C++ programs see it: every program of tests/abi is compiled as C99, C11, C17 and C++17, linked with
//! the static or the shared library, and run.
#![cfg(unix)]

use std::fs::{self, File};
use std::path::{Path, PathBuf};
use std::process::{Command, ExitStatus};
use std::time::{Duration, Instant};

/// Programs in C; each is also valid C++17.
const PROGRAMS: &[&str] =
    &["about", "bonds", "charges", "elements", "fork", "host_state", "library", "moments", "panic", "plain", "threads"];
const LONGEST: Duration = Duration::from_secs(180);

#[derive(Clone, Copy, PartialEq)]
enum Link {
    Static,
    Shared,
}

fn root() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// The folder of the libraries that were built with this test: beside its executable.
fn libraries() -> PathBuf {
    let executable = std::env::current_exe().expect("the test knows its own path");
    executable.parent().expect("the test lies in a folder").to_path_buf()
}

fn work_folder(name: &str) -> PathBuf {
    let folder = Path::new(env!("CARGO_TARGET_TMPDIR")).join("c_api").join(name);
    fs::create_dir_all(&folder).expect("the target folder can be written");
    folder
}

/// Compiles and links one source; the command's output if that fails.
fn build(source: &Path, standard: &str, link: Link, more: &[&str], folder: &Path) -> Result<PathBuf, String> {
    let cpp = standard.starts_with("c++");
    let mut build = cc::Build::new();
    build.target(env!("BMOM_TARGET")).host(env!("BMOM_TARGET")).opt_level(1).cpp(cpp);
    build.out_dir(folder).cargo_metadata(false);
    let stem = source.file_stem().unwrap_or_default().to_string_lossy();
    let program = folder.join(stem.as_ref());
    let mut command = build.get_compiler().to_command();
    command.arg(format!("-std={standard}"));
    command.args(["-pedantic", "-Wall", "-Wextra", "-Werror"]).args(more);
    command.arg("-I").arg(root().join("include"));
    if cpp {
        command.args(["-x", "c++"]).arg(source).args(["-x", "none"]);
    } else {
        command.arg(source);
    }
    match link {
        // Without the library's debug information, which would make each program 100 MB.
        Link::Static => command.arg(libraries().join("libbondmoment.a")).arg("-Wl,--strip-debug"),
        Link::Shared => {
            let library = libraries().join("libbondmoment.so");
            let named = folder.join(env!("BMOM_SONAME"));
            let _ = fs::remove_file(&named);
            std::os::unix::fs::symlink(&library, &named).expect("the target folder can be written");
            command.arg(library).arg(format!("-Wl,-rpath,{}", folder.display()))
        }
    };
    command.args(["-lpthread", "-ldl", "-lm", "-o"]).arg(&program);
    let output = command.output().map_err(|error| format!("no C compiler: {error}"))?;
    if output.status.success() {
        return Ok(program);
    }
    Err(format!("{command:?}\n{}{}", String::from_utf8_lossy(&output.stdout), String::from_utf8_lossy(&output.stderr)))
}

/// Runs a program; what it printed if it fails or does not come to an end.
fn run(program: &Path, folder: &Path) -> Result<(), String> {
    let printed = program.with_extension("txt");
    let output = File::create(&printed).map_err(|error| error.to_string())?;
    let errors = output.try_clone().map_err(|error| error.to_string())?;
    let mut child = Command::new(program)
        .arg(root().join("tests/published/molecules"))
        .arg(folder)
        .stdout(output)
        .stderr(errors)
        .spawn()
        .map_err(|error| format!("{}: {error}", program.display()))?;
    let begin = Instant::now();
    let end: Option<ExitStatus> = loop {
        match child.try_wait().map_err(|error| error.to_string())? {
            Some(status) => break Some(status),
            None if begin.elapsed() > LONGEST => {
                child.kill().and_then(|()| child.wait()).map_err(|error| error.to_string())?;
                break None;
            }
            None => std::thread::sleep(Duration::from_millis(5)),
        }
    };
    match end {
        Some(status) if status.success() => Ok(()),
        Some(status) => Err(format!("{status}\n{}", String::from_utf8_lossy(&fs::read(&printed).unwrap_or_default()))),
        None => Err(format!("{} did not come to an end in {LONGEST:?}", program.display())),
    }
}

fn build_and_run(source: &str, standard: &str, link: Link, more: &[&str], folder: &Path) -> Result<(), String> {
    let source = root().join(source);
    build(&source, standard, link, more, folder)
        .and_then(|program| run(&program, folder))
        .map_err(|problem| format!("{} as {standard}: {problem}", source.display()))
}

fn all_programs(standard: &str, link: Link) {
    let folder = work_folder(standard);
    let problems: Vec<String> = PROGRAMS
        .iter()
        .filter_map(|name| build_and_run(&format!("tests/abi/{name}.c"), standard, link, &[], &folder).err())
        .collect();
    assert!(problems.is_empty(), "{}", problems.join("\n\n"));
}

#[test]
fn as_c99_with_the_static_library() {
    all_programs("c99", Link::Static);
}

#[test]
fn as_c11_with_the_shared_library() {
    all_programs("c11", Link::Shared);
}

#[test]
fn as_c17_with_the_shared_library() {
    all_programs("c17", Link::Shared);
}

#[test]
fn as_cpp17_with_the_shared_library() {
    all_programs("c++17", Link::Shared);
}

/// The programs of users: the examples in C and C++.
#[test]
fn examples() {
    let folder = work_folder("examples");
    for (source, standard, link) in [
        ("tests/abi/plain.cpp", "c++17", Link::Static),
        ("tests/abi/plain.cpp", "c++17", Link::Shared),
        ("bindings/c/first.c", "c99", Link::Static),
        ("bindings/c/first.c", "c99", Link::Shared),
    ] {
        build_and_run(source, standard, link, &[], &folder).unwrap_or_else(|problem| panic!("{problem}"));
    }
}

/// A host that is built for speed at the cost of IEEE arithmetic gets the same bits.
#[test]
fn a_host_with_fast_mathematics() {
    for link in [Link::Static, Link::Shared] {
        let folder = work_folder("fast_math");
        for name in ["host_state", "elements", "charges", "moments"] {
            build_and_run(&format!("tests/abi/{name}.c"), "c11", link, &["-O2", "-ffast-math"], &folder)
                .unwrap_or_else(|problem| panic!("{problem}"));
        }
    }
}

/// Every file of tests/abi is compiled by one of these tests.
#[test]
fn no_program_is_left_out() {
    let listed = |name: &str| PROGRAMS.contains(&name);
    for entry in fs::read_dir(root().join("tests/abi")).expect("tests/abi can be read") {
        let path = entry.expect("tests/abi can be read").path();
        let stem = path.file_stem().unwrap_or_default().to_string_lossy().into_owned();
        if path.extension().is_some_and(|extension| extension == "c") {
            assert!(listed(&stem), "{} is not compiled", path.display());
        }
    }
}

//! Writes the C header into OUT_DIR from `src/c_api` and the lists of constants, and names the shared library's soname.
//!
//! The source tree is written to only where the environment says `BMOM_UPDATE_HEADER=1`: then `include/bondmoment.h` is
//! refreshed.

use std::fmt::Write as _;
use std::path::Path;
use std::{env, fs};

#[allow(dead_code, unused_imports)]
#[path = "src/selectors.rs"]
mod selectors;
#[allow(dead_code)]
#[path = "src/status.rs"]
mod status;

/// Version of the C ABI: rises only when a function goes or changes. The soname carries it.
const ABI_VERSION: i32 = 1;

/// The entry points, in the order of the header.
const SOURCES: &[&str] =
    &["about", "elements", "bonds", "charges", "moments", "settings", "library", "tabulation", "table"];

fn main() {
    println!("cargo::rerun-if-changed=build.rs");
    println!("cargo::rerun-if-changed=cbindgen.toml");
    println!("cargo::rerun-if-changed=src/c_api");
    println!("cargo::rerun-if-changed=src/selectors.rs");
    println!("cargo::rerun-if-changed=src/status.rs");
    println!("cargo::rerun-if-changed=src/tables/version.txt");
    println!("cargo::rerun-if-env-changed=BMOM_UPDATE_HEADER");

    let root = env::var("CARGO_MANIFEST_DIR").expect("cargo sets CARGO_MANIFEST_DIR");
    let out = env::var("OUT_DIR").expect("cargo sets OUT_DIR");
    let soname = format!("libbondmoment.so.{ABI_VERSION}");
    println!("cargo::rustc-env=BMOM_ABI_VERSION={ABI_VERSION}");
    println!("cargo::rustc-env=BMOM_SONAME={soname}");
    println!("cargo::rustc-env=BMOM_TARGET={}", env::var("TARGET").expect("cargo sets TARGET"));
    if env::var("CARGO_CFG_TARGET_OS").as_deref() == Ok("linux") {
        println!("cargo::rustc-cdylib-link-arg=-Wl,-soname,{soname}");
        // Static texts and late threads must never dangle, so the library stays mapped.
        println!("cargo::rustc-cdylib-link-arg=-Wl,-z,nodelete");
    }

    let mut config = cbindgen::Config::from_file(Path::new(&root).join("cbindgen.toml")).expect("cbindgen.toml");
    config.header =
        Some(fs::read_to_string(Path::new(&root).join("src/c_api/header.txt")).expect("src/c_api/header.txt"));
    config.after_includes = Some(constants(&root));
    let mut builder = cbindgen::Builder::new().with_config(config);
    for source in SOURCES {
        builder = builder.with_src(Path::new(&root).join(format!("src/c_api/{source}.rs")));
    }
    let header = Path::new(&out).join("bondmoment.h");
    builder.generate().expect("cbindgen reads src/c_api").write_to_file(&header);
    println!("cargo::rustc-env=BMOM_GENERATED_HEADER={}", header.display());
    if env::var("BMOM_UPDATE_HEADER").as_deref() == Ok("1") {
        fs::copy(&header, Path::new(&root).join("include/bondmoment.h")).expect("include/ can be written");
    }
}

/// Versions, status codes, remarks and selectors as macros.
fn constants(root: &str) -> String {
    let mut text = String::new();
    let define = |text: &mut String, name: &str, value: &str, comment: &str| {
        let comment = if comment.is_empty() { String::new() } else { format!(" /* {} */", ascii(comment)) };
        writeln!(text, "#define BMOM_{name} {value}{comment}").expect("a string can be written");
    };
    let version = env::var("CARGO_PKG_VERSION").expect("cargo sets CARGO_PKG_VERSION");
    let data = fs::read_to_string(Path::new(root).join("src/tables/version.txt")).expect("src/tables/version.txt");
    text.push_str("/* Versions of this header; compare bmom_abi_version(), bmom_version(), bmom_data_version(). */\n");
    define(&mut text, "ABI_VERSION", &ABI_VERSION.to_string(), "");
    define(&mut text, "VERSION", &format!("\"{version}\""), "");
    define(&mut text, "DATA_VERSION", &format!("\"{}\"", data.trim()), "");
    text.push_str("\n/* Status: code + 1000 x argument. An unknown code is a failure. */\n");
    for code in status::Code::ALL {
        define(&mut text, code.name(), &(*code as i32).to_string(), code.text());
    }
    text.push_str("\n/* Remarks: bits of one integer. No remark is a failure. */\n");
    for (bit, name, words) in status::remark::ALL {
        define(&mut text, &format!("REMARK_{name}"), &bit.to_string(), words);
    }
    let mut group = "";
    for choice in selectors::ALL {
        if choice.group != group {
            group = choice.group;
            writeln!(text, "\n/* {} */", group.replace('_', " ")).expect("a string can be written");
        }
        define(&mut text, choice.name, &choice.selector.0.to_string(), choice.title);
    }
    text
}

/// Headers are ASCII: old compilers and editors read nothing else.
fn ascii(text: &str) -> String {
    let mut plain = String::new();
    for c in text.chars() {
        match c {
            'Å' => plain.push('A'),
            'ö' => plain.push('o'),
            '²' => plain.push_str("^2"),
            '³' => plain.push('3'),
            '⁻' => plain.push_str("^-"),
            '¹' => plain.push('1'),
            '°' => plain.push_str("deg "),
            c if c.is_ascii() => plain.push(c),
            c => panic!("no ASCII twin for {c} in {text}: add it to build.rs"),
        }
    }
    plain
}

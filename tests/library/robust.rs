//! Nothing that a file holds makes a reader or a row panic.

use proptest::prelude::*;

use bondmoment::selectors::{FORMAT_CML, FORMAT_CTFILE, FORMAT_XYZ};

use super::*;

/// Reads the bytes in every format and computes every row.
fn survive(bytes: &[u8]) {
    for format in [FORMAT_BY_CONTENT, FORMAT_XYZ, FORMAT_CTFILE, FORMAT_CML] {
        if let Ok(library) = MoleculeLibrary::parse(bytes, "f", format, Threads::new(1), &never()) {
            let tables = tables(&library, &Settings::default());
            assert_eq!(tables.polarity.rows(), library.entries().len());
        }
    }
}

fn samples() -> Vec<Vec<u8>> {
    let names = [
        "frames.xyz",
        "bad_frames.xyz",
        "among_good.sdf",
        "properties.sdf",
        "v3000.sdf",
        "same.cml",
        "same_v2000.sdf.gz",
    ];
    names.map(|name| std::fs::read(file(name)).unwrap()).to_vec()
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 300, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn random_bytes(bytes in proptest::collection::vec(any::<u8>(), 0..600)) {
        survive(&bytes);
    }

    #[test]
    fn random_lines(lines in proptest::collection::vec("[ -~]{0,40}|[ 0-9]{1,6}|[CHO] [0-9.]{1,4} [0-9.]{1,4} [0-9.]{1,4}", 0..12)) {
        survive(lines.join("\n").as_bytes());
    }

    #[test]
    fn random_markup(pieces in proptest::collection::vec(
        "</?(cml|molecule|atomArray|atom|bondArray|bond|name|scalar)( (id|elementType|x3|order|atomRefs2|formalCharge)='[a-cC0-9 &;]{0,4}'){0,3}/?>|[ -~]{0,8}",
        0..40,
    )) {
        survive(pieces.concat().as_bytes());
        survive(format!("<molecule>{}", pieces.concat()).as_bytes());
    }

    #[test]
    fn mutated_files(
        which in 0_usize..7,
        changes in proptest::collection::vec((any::<prop::sample::Index>(), any::<u8>(), 0_u8..4), 1..12),
    ) {
        let mut bytes = samples()[which].clone();
        for (at, byte, what) in changes {
            let at = at.index(bytes.len());
            match what {
                0 => bytes[at] = byte,
                1 => { bytes.remove(at); }
                2 => bytes.insert(at, byte),
                _ => bytes[at] = b"0123456789 .-$MCH\n\r></&;\"="[usize::from(byte) % 26],
            }
        }
        survive(&bytes);
    }
}

#[test]
fn extremes() {
    survive(b"");
    survive(b"99999999999999999999\n\nC 0 0 0\n");
    survive(b"-3\n\nC 0 0 0\n");
    survive(b"2\n\nC 1e9 0 0\nC -1e9 0 0\n");
    survive(b"2\n\nC 0 0 0\nC 0 0 0\n");
    survive("1\n\nHe 0 0 0\n".repeat(500).as_bytes());
    survive(b"x\nx\nx\n  1  0  0 V2000\n    0.0000    0.0000    0.0000 C   0  9\nM  END\n");
    survive(
        b"x\nx\nx\n  1  0  0 V2000\n    0.0000    0.0000    0.0000 C   0  0\nS  SKP99999999999\nM  CHG  9\nM  END\n",
    );
    survive("x\nx\nx\n  1  0  0 V2000\n    0.0000    0.0000    0.0000 \u{e9}   0  0\nM  END\n".as_bytes());
}

/// Callers may have small stacks.
#[test]
fn a_stack_of_64_kib_is_enough() {
    let bytes = std::fs::read(demo().join("library.sdf")).unwrap();
    let work = move || {
        survive(&bytes);
        for sample in samples() {
            survive(&sample);
        }
    };
    std::thread::Builder::new().stack_size(64 << 10).spawn(work).unwrap().join().unwrap();
}

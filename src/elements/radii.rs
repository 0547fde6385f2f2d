//! Covalent and van der Waals radii, and the radius of a Bohr orbit.

use super::{ELEMENT, LOOK_UP};
use crate::constants::BOHR_RADIUS_A;
use crate::declare::{Argument, Example, Function, INTEGER, Kind, NUMBER, SELECTOR};
use crate::quantity::Quantity;
use crate::selectors::{RADII_CORDERO_2008, STATE_AS_LISTED, Selector, VDW_MANTINA_2009};
use crate::status::{Code, Failure};
use crate::tables;

/// The tables print picometres.
const PM_PER_ANGSTROM: f64 = 100.0;

const RADIUS: Argument = Argument {
    name: "radius_A",
    label: "radius",
    unit: "Å",
    minimum: 0.0,
    above: true,
    uncertainty: "u_radius_A",
    main: true,
    ..NUMBER
};

/// Declaration of [`covalent_radius`].
pub static COVALENT_RADIUS: Function = Function {
    name: "covalent_radius",
    family: "elements",
    kind: Kind::Scalar,
    since: 1,
    title: "Covalent radius of an element",
    formula: "",
    arguments: &[
        Argument {
            number: 1,
            name: "table",
            label: "table",
            group: "radii",
            default: Some(RADII_CORDERO_2008),
            help: "Table of covalent radii",
            ..SELECTOR
        },
        ELEMENT,
        Argument {
            number: 3,
            name: "state",
            label: "state",
            shape: "row",
            group: "state",
            default: Some(STATE_AS_LISTED),
            help: "Hybridization or spin state where the table has several radii",
            ..SELECTOR
        },
    ],
    results: &[Argument { number: 4, help: "Covalent radius [Å]", ..RADIUS }],
    statuses: LOOK_UP,
    remarks: 0,
    notes: &[
        "As listed is the first entry: in Cordero 2008 sp3 carbon and low-spin manganese, iron and cobalt.",
        "A state that the table does not list for the element has no data.",
        "The uncertainty of Cordero 2008 is the standard deviation of the bonds measured; the others print none.",
        "The Schomaker-Stevenson radii are for the law of that name only.",
    ],
    sources: &[
        "B. Cordero et al., Dalton Trans. 2008, 2832-2838",
        "P. Pyykkö, M. Atsumi, Chem. Eur. J. 2009, 15, 186-197; 2009, 15, 12770-12779",
        "P. Pyykkö, S. Riedel, M. Patzschke, Chem. Eur. J. 2005, 11, 3511-3520",
        "V. Schomaker, D. P. Stevenson, J. Am. Chem. Soc. 1941, 63, 37-40",
    ],
    examples: &[Example {
        given: "table=RADII_CORDERO_2008;atomic_number=6;state=STATE_SP2",
        gives: "radius_A=0.73;u_radius_A=0.02",
        within: 1e-12,
        source: "Cordero et al., Dalton Trans. 2008, 2832, table 2 (two open transcriptions agree)",
    }],
};

/// Declaration of [`vdw_radius`].
pub static VDW_RADIUS: Function = Function {
    name: "vdw_radius",
    title: "Van der Waals radius of an element",
    arguments: &[
        Argument {
            number: 1,
            name: "table",
            label: "table",
            group: "vdw_radii",
            default: Some(VDW_MANTINA_2009),
            help: "Table of van der Waals radii",
            ..SELECTOR
        },
        ELEMENT,
    ],
    results: &[Argument { number: 3, help: "Van der Waals radius [Å]", ..RADIUS }],
    notes: &[
        "Mantina 2009 covers the main group; a metal outside it has no data until Alvarez 2013 is named.",
        "None of the tables prints uncertainties; radii of one element differ by 0.1 to 0.3 Å between tables.",
    ],
    sources: &[
        "A. Bondi, J. Phys. Chem. 1964, 68, 441-451",
        "R. S. Rowland, R. Taylor, J. Phys. Chem. 1996, 100, 7384-7391",
        "M. Mantina et al., J. Phys. Chem. A 2009, 113, 5806-5812",
        "S. Alvarez, Dalton Trans. 2013, 42, 8617-8636",
        "J. Vogt, S. Alvarez, Inorg. Chem. 2014, 53, 9260-9266",
    ],
    examples: &[Example {
        given: "table=VDW_MANTINA_2009;atomic_number=13",
        gives: "radius_A=1.84",
        within: 1e-12,
        source: "Mantina et al., J. Phys. Chem. A 2009, 113, 5806, abstract",
    }],
    ..COVALENT_RADIUS
};

/// Declaration of [`bohr_radius`].
pub static BOHR_RADIUS: Function = Function {
    name: "bohr_radius",
    title: "Radius of a Bohr orbit",
    formula: "r = n^2 a0 / Z",
    arguments: &[
        Argument {
            number: 1,
            name: "shell",
            label: "shell",
            minimum: 1.0,
            help: "Principal quantum number n",
            ..INTEGER
        },
        Argument {
            number: 2,
            name: "nuclear_charge",
            label: "nuclear charge",
            minimum: 1.0,
            help: "Charge of the nucleus Z, in elementary charges",
            ..INTEGER
        },
    ],
    results: &[Argument { number: 3, help: "Radius of the orbit [Å]", ..RADIUS }],
    statuses: &[Code::Missing, Code::OutOfRange],
    notes: &["One electron and a nucleus of infinite mass; shell 1 and nuclear charge 1 give a0."],
    sources: &[
        "N. Bohr, Phil. Mag. 1913, 26, 1-25",
        "P. J. Mohr, D. B. Newell, B. N. Taylor, E. Tiesinga, Rev. Mod. Phys. 2025, 97, 025002 (CODATA 2022)",
    ],
    examples: &[Example {
        given: "shell=1;nuclear_charge=1",
        gives: "radius_A=0.529177210544;u_radius_A=8.2e-11",
        within: 1e-15,
        source: "CODATA 2022: a0 = 5.29177210544(82)e-11 m",
    }],
    ..COVALENT_RADIUS
};

/// Covalent radius [Å] of an element in a table of the group `radii`, for a hybridization or spin state.
///
/// The uncertainty is NaN where the table prints none.
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (arguments 1, 3) · `Missing`, `UnknownElement` (2) · `NoData` (2, or 3 where the
/// element is there but not in this state).
pub fn covalent_radius(table: Selector, atomic_number: i32, state: Selector) -> Result<Quantity, Failure> {
    let table = COVALENT_RADIUS.selector(1, table)?;
    let z = COVALENT_RADIUS.element(2, atomic_number)?;
    let state = COVALENT_RADIUS.selector(3, state)?;
    tables::entry(table, z, state).map(in_angstrom).map_err(|failure| {
        let there = tables::entry(table, z, STATE_AS_LISTED).is_ok();
        failure.argument(if there { 3 } else { 2 })
    })
}

/// Van der Waals radius [Å] of an element in a table of the group `vdw_radii`; its uncertainty is NaN (none printed).
///
/// # Errors
/// `UnknownSelector`, `WrongSelector` (argument 1) · `Missing`, `UnknownElement`, `NoData` (2).
pub fn vdw_radius(table: Selector, atomic_number: i32) -> Result<Quantity, Failure> {
    let table = VDW_RADIUS.selector(1, table)?;
    let z = VDW_RADIUS.element(2, atomic_number)?;
    tables::entry(table, z, STATE_AS_LISTED).map(in_angstrom).map_err(|failure| failure.argument(2))
}

/// Radius [Å] of the Bohr orbit of a shell about a nuclear charge [e]: n² a0/Z. `(1, 1)` gives the Bohr radius.
///
/// # Errors
/// `Missing`, `OutOfRange` (below 1) of arguments 1, 2.
pub fn bohr_radius(shell: i32, nuclear_charge: i32) -> Result<Quantity, Failure> {
    let shell = f64::from(BOHR_RADIUS.integer(1, shell)?);
    let charge = f64::from(BOHR_RADIUS.integer(2, nuclear_charge)?);
    Ok(BOHR_RADIUS_A.scaled(shell * shell / charge))
}

fn in_angstrom(entry: &tables::Entry) -> Quantity {
    Quantity::new(entry.value / PM_PER_ANGSTROM, entry.u / PM_PER_ANGSTROM)
}

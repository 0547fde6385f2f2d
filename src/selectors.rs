//! One numbering for everything that a caller chooses: tables, scales, laws, models, units, states, formats, classes.
//!
//! 0 and the smallest integer never select anything, so an unset variable cannot choose. A number of the wrong kind is
//! told from one that does not exist. Numbers never change their meaning; new ones fill the gaps of their group.

use crate::status::{Code, Failure};

/// A choice, by its number.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Selector(pub i32);

/// What stands behind a number: constant, name, group and words.
#[derive(Clone, Copy, Debug)]
pub struct Choice {
    /// The number.
    pub selector: Selector,
    /// The name that follows `BMOM_` in the header.
    pub name: &'static str,
    /// The kind of thing that it selects.
    pub group: &'static str,
    /// What it is, in a few words; the short word of a class or state.
    pub title: &'static str,
}

macro_rules! selectors {
    ($($group:literal { $($constant:ident = $number:literal, $title:literal;)* })*) => {
        $($(#[doc = $title] pub const $constant: Selector = Selector($number);)*)*

        /// All choices, by group.
        pub const ALL: &[Choice] = &[$($(Choice {
            selector: $constant, name: stringify!($constant), group: $group, title: $title,
        },)*)*];
    };
}

selectors! {
    "column_type" {
        TYPE_NUMBER = 1, "number";
        TYPE_INTEGER = 2, "integer";
        TYPE_TEXT = 3, "text";
    }
    "mark" {
        MARK_VERIFIED = 11, "seen in print";
        MARK_CORROBORATED = 12, "independent transcriptions or numbers agree";
        MARK_TRANSCRIBED = 13, "one open transcription, unchecked";
        MARK_FROM_MEMORY = 14, "from memory, not yet checked against the source";
        MARK_DERIVED = 15, "computed from other entries";
    }
    "state" {
        STATE_AS_LISTED = 21, "the table's first entry";
        STATE_SP3 = 22, "sp3";
        STATE_SP2 = 23, "sp2";
        STATE_SP = 24, "sp";
        STATE_LOW_SPIN = 25, "low spin";
        STATE_HIGH_SPIN = 26, "high spin";
    }
    "radii" {
        RADII_CORDERO_2008 = 101, "covalent radii, Cordero et al. 2008";
        RADII_PYYKKO_SINGLE_2009 = 102, "single-bond covalent radii, Pyykkö and Atsumi 2009";
        RADII_PYYKKO_DOUBLE_2009 = 103, "double-bond covalent radii, Pyykkö and Atsumi 2009";
        RADII_PYYKKO_TRIPLE_2005 = 104, "triple-bond covalent radii, Pyykkö, Riedel and Patzschke 2005";
        RADII_SCHOMAKER_STEVENSON_1941 = 105, "covalent radii of the Schomaker-Stevenson law, 1941";
    }
    "length_law" {
        LENGTH_RADIUS_SUM = 111, "sum of the two radii of one table, for bonds of the order that the table is for";
        LENGTH_SCHOMAKER_STEVENSON_1941 = 112, "radius sum less 0.09 Å times the difference of electronegativity";
        LENGTH_PAULING_ORDER_1960 = 113, "radius sum less 0.71 Å log10 n, covalent bonds, orders 1 to 3";
        LENGTH_PAULING_ORDER_1947 = 114, "radius sum less 0.60 Å log10 n, bonds between metals, orders 0.05 to 1";
        LENGTH_BY_ORDER = 115, "by the bond order: 1 the radii named, 2 and 3 Pyykkö's double and triple radii, 1.5 the mean of 1 and 2";
    }
    "vdw_radii" {
        VDW_BONDI_1964 = 121, "van der Waals radii, Bondi 1964";
        VDW_ROWLAND_TAYLOR_1996 = 122, "van der Waals radii, Rowland and Taylor 1996";
        VDW_MANTINA_2009 = 123, "van der Waals radii of the main group, Mantina et al. 2009";
        VDW_ALVAREZ_2013 = 124, "van der Waals radii, Alvarez 2013";
        VDW_VOGT_ALVAREZ_2014 = 125, "van der Waals radii of the noble gases, Vogt and Alvarez 2014";
    }
    "electronegativity" {
        ELECTRONEGATIVITY_PAULING = 141, "Pauling's scale, handbook column";
        ELECTRONEGATIVITY_PAULING_ALLRED = 142, "Pauling's scale with Allred's revisions of 1961";
        ELECTRONEGATIVITY_ALLEN = 143, "Allen's scale, 1989 and 2000";
        ELECTRONEGATIVITY_ALLRED_ROCHOW = 144, "Allred-Rochow scale, 1958";
        ELECTRONEGATIVITY_MULLIKEN = 145, "Mulliken's mean of ionization energy and electron affinity, in Pauling units";
    }
    "masses" {
        WEIGHTS_STANDARD_2021 = 161, "abridged standard atomic weights, 2021";
        MASSES_ABUNDANT_ISOTOPE_2020 = 162, "mass of the most abundant (else longest-lived) isotope, AME2020";
    }
    "polarizability" {
        POLARIZABILITY_2018 = 171, "static dipole polarizabilities of atoms, 2018 table";
        POLARIZABILITY_2023 = 172, "static dipole polarizabilities of atoms, 2023 update";
    }
    "ionic_law" {
        IONIC_PAULING_1960 = 201, "1 - exp(-(delta chi)^2/4)";
        IONIC_HANNAY_SMYTH_1946 = 202, "16 |delta chi| + 3.5 (delta chi)^2 percent, at most 100";
    }
    "bond_class" {
        CLASS_NON_POLAR = 211, "non-polar";
        CLASS_POLAR = 212, "polar";
        CLASS_IONIC = 213, "ionic";
    }
    "bond_end" {
        END_A = 221, "atom a";
        END_B = 222, "atom b";
        END_NEITHER = 223, "neither";
    }
    "bond_rule" {
        BONDS_ALTERNATING = 231, "aromatic rings as alternating single and double bonds";
        BONDS_AROMATIC = 232, "aromatic rings with bond order 1.5";
    }
    "charges" {
        CHARGES_GIVEN = 241, "the caller's charges";
        CHARGES_PEOE_1980 = 242, "partial equalization of orbital electronegativity, Gasteiger and Marsili 1980";
    }
    "frame" {
        FRAME_AS_GIVEN = 261, "the axes of the input";
    }
    "polarity" {
        POLARITY_POLAR = 271, "polar";
        POLARITY_NON_POLAR = 272, "non-polar";
        POLARITY_UNDECIDED = 273, "undecided";
        POLARITY_CHARGED = 274, "charged";
    }
    "format" {
        FORMAT_BY_CONTENT = 281, "told by the content";
        FORMAT_XYZ = 282, "XYZ, one or many frames";
        FORMAT_CTFILE = 283, "CTfile molfile or SD file";
        FORMAT_CML = 284, "Chemical Markup Language";
    }
    "unit" {
        UNIT_ANGSTROM = 301, "Å";
        UNIT_PM = 302, "pm";
        UNIT_NM = 303, "nm";
        UNIT_M = 304, "m";
        UNIT_BOHR = 305, "bohr (a0, the atomic unit of length)";
        UNIT_DEBYE = 311, "D";
        UNIT_C_M = 312, "C m";
        UNIT_E_ANGSTROM = 313, "e Å";
        UNIT_E_BOHR = 314, "e a0 (the atomic unit of dipole)";
        UNIT_E = 321, "e (elementary charge)";
        UNIT_COULOMB = 322, "C";
        UNIT_KJ_PER_MOL = 331, "kJ/mol";
        UNIT_KCAL_PER_MOL = 332, "kcal/mol (thermochemical, 4.184 kJ/mol)";
        UNIT_EV = 333, "eV";
        UNIT_HARTREE = 334, "hartree (the atomic unit of energy)";
        UNIT_JOULE = 335, "J (of one particle)";
        UNIT_PER_CM = 336, "cm⁻¹ (energy divided by h c)";
        UNIT_KELVIN = 341, "K (temperature, or energy divided by k)";
        UNIT_CELSIUS = 342, "°C";
        UNIT_ANGSTROM3 = 351, "Å³ (of one particle)";
        UNIT_NM3 = 352, "nm³ (of one particle)";
        UNIT_BOHR3 = 353, "a0³ (the atomic unit of polarizability)";
        UNIT_C2_M2_PER_J = 354, "C² m²/J (polarizability times 4 pi epsilon0)";
        UNIT_CM3_PER_MOL = 355, "cm³/mol";
        UNIT_D_ANGSTROM = 361, "D Å";
        UNIT_E_BOHR2 = 362, "e a0² (the atomic unit of quadrupole)";
        UNIT_C_M2 = 363, "C m²";
        UNIT_DALTON = 366, "u (dalton)";
        UNIT_KG = 367, "kg";
        UNIT_ELECTRON_MASS = 368, "electron mass (the atomic unit of mass)";
        UNIT_U_ANGSTROM2 = 371, "u Å²";
        UNIT_KG_M2 = 372, "kg m²";
        UNIT_MHZ = 376, "MHz";
        UNIT_GHZ = 377, "GHz";
        UNIT_DEGREE = 381, "° (angle)";
        UNIT_RADIAN = 382, "rad";
        UNIT_G_PER_CM3 = 386, "g/cm³";
        UNIT_KG_PER_M3 = 387, "kg/m³";
    }
}

impl Selector {
    /// The entry of this number.
    ///
    /// # Errors
    /// `UnknownSelector`.
    pub fn choice(self) -> Result<&'static Choice, Failure> {
        ALL.iter().find(|choice| choice.selector == self).ok_or(Failure::new(Code::UnknownSelector))
    }

    /// This selector, if it belongs to the group.
    ///
    /// # Errors
    /// `UnknownSelector`, `WrongSelector`.
    pub fn of_group(self, group: &str) -> Result<Self, Failure> {
        if self.choice()?.group == group { Ok(self) } else { Err(Failure::new(Code::WrongSelector)) }
    }

    /// The name that follows `BMOM_`, or an empty text.
    pub fn name(self) -> &'static str {
        self.choice().map_or("", |choice| choice.name)
    }

    /// What it is in a few words, or an empty text.
    pub fn title(self) -> &'static str {
        self.choice().map_or("", |choice| choice.title)
    }

    /// The choice of a name, with or without `BMOM_`, in any case and with `-` or blanks for `_`.
    ///
    /// # Errors
    /// `UnknownName`.
    pub fn by_name(name: &str) -> Result<Self, Failure> {
        let plain = |text: &str| -> String {
            text.trim().chars().map(|c| if c == '-' || c == ' ' { '_' } else { c.to_ascii_uppercase() }).collect()
        };
        let wanted = plain(name);
        let wanted = wanted.strip_prefix("BMOM_").unwrap_or(&wanted);
        ALL.iter()
            .find(|choice| choice.name == wanted)
            .map(|choice| choice.selector)
            .ok_or(Failure::new(Code::UnknownName))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_and_names_are_unique_and_positive() {
        for (i, one) in ALL.iter().enumerate() {
            assert!(one.selector.0 > 0, "{}", one.name);
            for other in &ALL[i + 1..] {
                assert_ne!(one.selector, other.selector, "{} and {}", one.name, other.name);
                assert_ne!(one.name, other.name);
            }
        }
    }

    #[test]
    fn wrong_kind_is_told_from_unknown() {
        assert_eq!(RADII_CORDERO_2008.of_group("vdw_radii").unwrap_err().code, Code::WrongSelector);
        assert_eq!(Selector(0).of_group("vdw_radii").unwrap_err().code, Code::UnknownSelector);
        assert_eq!(Selector::by_name("bmom_radii-cordero 2008"), Ok(RADII_CORDERO_2008));
    }
}

//! Why there is no value: status codes, their names and their words.
//!
//! A status is `code + 1000 × argument`, where `argument` is the number that the catalogue gives the argument at fault (0
//! when no single one is). Codes are numbered by hand and never change their meaning; a caller takes an unknown one as
//! a failure.

macro_rules! codes {
    ($($(#[doc = $doc:literal])* $variant:ident = $number:literal, $name:literal, $text:literal;)*) => {
        /// What a call or a row ended with.
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
        #[repr(i32)]
        pub enum Code { $(#[doc = $text] $variant = $number,)* }

        impl Code {
            /// All codes in ascending order.
            pub const ALL: &'static [Code] = &[$(Code::$variant,)*];

            /// The name that follows `BMOM_` in the header.
            pub const fn name(self) -> &'static str {
                match self { $(Code::$variant => $name,)* }
            }

            /// One sentence in plain words.
            pub const fn text(self) -> &'static str {
                match self { $(Code::$variant => $text,)* }
            }

            /// The code of a number, if there is one.
            pub const fn from_number(number: i32) -> Option<Code> {
                match number { $($number => Some(Code::$variant),)* _ => None }
            }
        }
    };
}

codes! {
    Ok = 0, "OK", "all is well";
    SomeRows = 1, "SOME_ROWS", "some rows have no value; their own status says why";
    NoRows = 2, "NO_ROWS", "no row has a value; their own status says why";
    End = 3, "END", "there is nothing more to read";
    // The call: nothing was written.
    NullPointer = 10, "NULL_POINTER", "a pointer that must lead somewhere is NULL";
    NegativeCount = 11, "NEGATIVE_COUNT", "a count or a length is negative";
    TooLarge = 12, "TOO_LARGE", "a count is larger than memory can hold";
    Misaligned = 13, "MISALIGNED", "an array does not start at a multiple of its element's size";
    Overlap = 14, "OVERLAP", "an output array overlaps another array";
    BadOffsets = 15, "BAD_OFFSETS", "offsets must not be negative, decrease or pass the end of their array";
    UnknownSelector = 16, "UNKNOWN_SELECTOR", "no table, law, unit or choice has this number";
    WrongSelector = 17, "WRONG_SELECTOR", "this number selects something of another kind";
    NotAllowed = 18, "NOT_ALLOWED", "this argument or combination is not allowed here";
    BufferTooSmall = 19, "BUFFER_TOO_SMALL", "the result is longer than the room given for it";
    NoMemory = 20, "NO_MEMORY", "memory could not be had";
    NotUtf8 = 21, "NOT_UTF8", "a text is not UTF-8";
    UnknownName = 22, "UNKNOWN_NAME", "nothing has this name";
    WrongType = 23, "WRONG_TYPE", "the column or setting is of another type";
    BadHandle = 24, "BAD_HANDLE", "this is no handle of this library";
    Busy = 25, "BUSY", "another thread is using this handle";
    OtherProcess = 26, "OTHER_PROCESS", "the handle was opened in another process";
    Stopped = 27, "STOPPED", "the job was stopped on request";
    FileMissing = 28, "FILE_MISSING", "there is no such file";
    FileUnreadable = 29, "FILE_UNREADABLE", "the file cannot be read";
    BadFormat = 30, "BAD_FORMAT", "the text or file is in no format that is read here";
    // Any cell.
    Missing = 50, "MISSING", "a value is missing";
    NotFinite = 51, "NOT_FINITE", "a value is infinite";
    OutOfRange = 52, "OUT_OF_RANGE", "a value is outside its range";
    NegativeUncertainty = 53, "NEGATIVE_UNCERTAINTY", "an uncertainty is negative";
    // Elements.
    UnknownElement = 100, "UNKNOWN_ELEMENT", "there is no such element";
    NoData = 101, "NO_DATA", "the chosen table or model has no value for this";
    Charged = 110, "CHARGED", "the charges do not sum to zero, so the dipole depends on the origin";
    // Bonds.
    AtomsTooClose = 200, "ATOMS_TOO_CLOSE", "two atoms are closer than any bond";
    BadBond = 201, "BAD_BOND", "a bond names an atom that is not there, itself, or a pair that is bonded already";
    NoBonds = 202, "NO_BONDS", "the atoms are not bonded to one another";
    // Charges.
    ModelFailed = 300, "MODEL_FAILED", "the charge model has no solution for this molecule";
    // Library.
    BrokenRecord = 800, "BROKEN_RECORD", "the record cannot be read; the detail says what and where";
    FlatDrawing = 801, "FLAT_DRAWING", "the record is a flat drawing without a geometry";
    HydrogensMissing = 802, "HYDROGENS_MISSING", "the record lacks hydrogen atoms";
    NoAtoms = 803, "NO_ATOMS", "the record has no atoms";
    SeveralFragments = 804, "SEVERAL_FRAGMENTS", "the record holds several fragments; the detail lists each one";
    // A fault of the library itself.
    Internal = 990, "INTERNAL", "an internal fault of the library; please report it";
}

/// Why a value could not be given: the code, the number of the argument at fault (0: no single one) and the index of
/// the atom, bond or point at fault within its row (−1: none).
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Failure {
    /// What is wrong.
    pub code: Code,
    /// Catalogue number of the argument at fault, 0 if no single one is.
    pub argument: i32,
    /// Index of the atom, bond or point at fault, −1 if none is.
    pub item: i32,
}

impl Failure {
    /// A failure that no single argument explains.
    pub const fn new(code: Code) -> Self {
        Self { code, argument: 0, item: -1 }
    }

    /// A failure of one argument, by its catalogue number.
    pub const fn of(code: Code, argument: i32) -> Self {
        Self { code, argument, item: -1 }
    }

    /// The same failure, naming an argument.
    pub const fn argument(self, argument: i32) -> Self {
        Self { argument, ..self }
    }

    /// The same failure, naming an atom, bond or point of the row.
    pub fn item(self, item: usize) -> Self {
        Self { item: i32::try_from(item).unwrap_or(-1), ..self }
    }

    /// The number that crosses the C boundary: `code + 1000 × argument`.
    pub const fn status(self) -> i32 {
        self.code as i32 + 1000 * self.argument
    }
}

/// Remarks are no failures: bits of one integer that say what a careful reader should know about a row.
macro_rules! remarks {
    ($($constant:ident = $bit:literal, $text:literal;)*) => {
        /// Remark bits.
        pub mod remark {
            $(#[doc = $text] pub const $constant: i32 = 1 << $bit;)*
            /// All remarks: bit value, name after `BMOM_REMARK_`, words.
            pub const ALL: &[(i32, &str, &str)] = &[$(($constant, stringify!($constant), $text),)*];
        }
    };
}

remarks! {
    CHARGED = 0, "net charge: the dipole is about the centre of mass";
    BONDS_FOUND = 1, "bonds found from the coordinates";
    CHARGES_FOUND = 2, "formal charges derived from the bonds, not stated";
    IMPOSSIBLE_VALENCE = 3, "an atom has more or fewer bonds than its valence allows";
    ORDERS_NOT_ASSIGNED = 4, "some bonds have no order (order 0): bonds to metals, bridging hydrogen";
    BY_SYMMETRY = 5, "the point group forbids a dipole";
    ONE_CONFORMER = 6, "one conformer of a flexible molecule";
    SEVERAL_FRAGMENTS = 7, "several fragments that are not bonded to one another";
    CHARGE_SITES = 8, "net neutral with separated charge sites";
    OPEN_SHELL = 9, "an odd number of electrons";
    MODEL_DISAGREES = 10, "the charge model names another negative end than the electronegativities do";
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_ascend_and_read_back() {
        assert!(Code::ALL.windows(2).all(|pair| pair[0] < pair[1]));
        assert!(Code::ALL.iter().all(|&code| Code::from_number(code as i32) == Some(code)));
        assert_eq!(Code::from_number(4), None);
    }

    #[test]
    fn status_names_the_argument() {
        assert_eq!(Failure::of(Code::OutOfRange, 2).status(), 2052);
    }
}

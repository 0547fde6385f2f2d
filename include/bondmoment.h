/* Bondmoment: bond lengths, bond polarity, partial charges and dipole moments with standard uncertainties.

   Generated from the Rust source; do not edit. DEVELOPERS.md says how it is refreshed. C99 or later, C++98 or later.

   Values in, values out, errors as values
     Every function returns a status, 0 (BMOM_OK) when all is well. A status is code + 1000 x argument: 2052 says that
     argument 2 (its number in the catalogue and in the comments below) is out of range. bmom_status_message words it.
     Codes 10 to 49 concern the call, 50 and above one row. The status decides, never NaN: after a failure results hold
     the quiet NaN 0x7FF8000000000000, INT32_MIN or an empty text; but a call of a column form that fails as a whole
     leaves every array of the caller as it was, row_status included. A status without an argument concerns settings,
     threads (0 to 1024), stop, row_status, row_remarks, row_item, or the call as a whole.
   Scalar, column, molecules
     The plain form answers one row. The _column form answers n rows; a row that fails has its own row_status and never
     stops the others; the call then returns BMOM_SOME_ROWS or BMOM_NO_ROWS. Columns of molecules are flat arrays: the
     atoms of row r are atom_offsets[r] to atom_offsets[r + 1] - 1 of every atom array (the layout of an Arrow list
     column). row_status, row_remarks and row_item may be NULL. n = 0 may come with NULL arrays. row_item is the index of
     the atom, bond or charge within its row that a status or a remark is about, -1 where there is none.
   Uncertainty
     u_x beside x is its standard uncertainty (k = 1). In: NaN (scalar) or NULL (column) is not known, 0 is exact,
     negative is an error. Out: NaN where none can be given; NULL where it is not wanted.
   Units and signs
     length A (angstrom), charge e, dipole D (debye), polarizability A3, mass u or g/mol, everywhere and without options;
     bmom_convert converts. A dipole points from - to +. The negative end of a bond is its more electronegative atom.
     Indices count from 0.
   Choices
     Tables, laws, models, units and states are chosen by one numbering, listed below in groups; 0 never chooses. There
     are no defaults here: the catalogue (bmom_catalogue) names the default of every argument.
   Arrays and texts
     Arrays belong to the caller, are contiguous and aligned, and no output may overlap another array. Texts in are UTF-8
     with their length in bytes, or -1 for a NUL-terminated text (Fortran passes the trimmed length). Texts out: at most
     `capacity` bytes, cut at a character; `needed` (may be NULL) is the full length without NUL. A NUL follows where
     capacity is above needed; capacity 0 with a NULL text asks for the length.
   Handles
     What a _new, _read, _open or table function returns is freed by its _free, which takes NULL. A handle must not be
     freed while a call uses it (request a stop and wait for STOPPED first), nor used afterwards.
   Threads
     Every function may be called from any thread. threads = 1 uses the caller's thread only, 0 all that this process
     may use. Nothing is printed, no signal handler is set, no state is kept between calls except in handles.
*/


#ifndef BONDMOMENT_H
#define BONDMOMENT_H

#include <stdint.h>
/* Versions of this header; compare bmom_abi_version(), bmom_version(), bmom_data_version(). */
#define BMOM_ABI_VERSION 1
#define BMOM_VERSION "0.1.0"
#define BMOM_DATA_VERSION "2026.1"

/* Status: code + 1000 x argument. An unknown code is a failure. */
#define BMOM_OK 0 /* all is well */
#define BMOM_SOME_ROWS 1 /* some rows have no value; their own status says why */
#define BMOM_NO_ROWS 2 /* no row has a value; their own status says why */
#define BMOM_END 3 /* there is nothing more to read */
#define BMOM_NULL_POINTER 10 /* a pointer that must lead somewhere is NULL */
#define BMOM_NEGATIVE_COUNT 11 /* a count or a length is negative */
#define BMOM_TOO_LARGE 12 /* a count is larger than memory can hold */
#define BMOM_MISALIGNED 13 /* an array does not start at a multiple of its element's size */
#define BMOM_OVERLAP 14 /* an output array overlaps another array */
#define BMOM_BAD_OFFSETS 15 /* offsets must not be negative, decrease or pass the end of their array */
#define BMOM_UNKNOWN_SELECTOR 16 /* no table, law, unit or choice has this number */
#define BMOM_WRONG_SELECTOR 17 /* this number selects something of another kind */
#define BMOM_NOT_ALLOWED 18 /* this argument or combination is not allowed here */
#define BMOM_BUFFER_TOO_SMALL 19 /* the result is longer than the room given for it */
#define BMOM_NO_MEMORY 20 /* memory could not be had */
#define BMOM_NOT_UTF8 21 /* a text is not UTF-8 */
#define BMOM_UNKNOWN_NAME 22 /* nothing has this name */
#define BMOM_WRONG_TYPE 23 /* the column or setting is of another type */
#define BMOM_BAD_HANDLE 24 /* this is no handle of this library */
#define BMOM_BUSY 25 /* another thread is using this handle */
#define BMOM_OTHER_PROCESS 26 /* the handle was opened in another process */
#define BMOM_STOPPED 27 /* the job was stopped on request */
#define BMOM_FILE_MISSING 28 /* there is no such file */
#define BMOM_FILE_UNREADABLE 29 /* the file cannot be read */
#define BMOM_BAD_FORMAT 30 /* the text or file is in no format that is read here */
#define BMOM_MISSING 50 /* a value is missing */
#define BMOM_NOT_FINITE 51 /* a value is infinite */
#define BMOM_OUT_OF_RANGE 52 /* a value is outside its range */
#define BMOM_NEGATIVE_UNCERTAINTY 53 /* an uncertainty is negative */
#define BMOM_UNKNOWN_ELEMENT 100 /* there is no such element */
#define BMOM_NO_DATA 101 /* the chosen table or model has no value for this */
#define BMOM_CHARGED 110 /* the charges do not sum to zero, so the dipole depends on the origin */
#define BMOM_ATOMS_TOO_CLOSE 200 /* two atoms are closer than any bond */
#define BMOM_BAD_BOND 201 /* a bond names an atom that is not there, itself, or a pair that is bonded already */
#define BMOM_NO_BONDS 202 /* the atoms are not bonded to one another */
#define BMOM_MODEL_FAILED 300 /* the charge model has no solution for this molecule */
#define BMOM_BROKEN_RECORD 800 /* the record cannot be read; the detail says what and where */
#define BMOM_FLAT_DRAWING 801 /* the record is a flat drawing without a geometry */
#define BMOM_HYDROGENS_MISSING 802 /* the record lacks hydrogen atoms */
#define BMOM_NO_ATOMS 803 /* the record has no atoms */
#define BMOM_SEVERAL_FRAGMENTS 804 /* the record holds several fragments; the detail lists each one */
#define BMOM_INTERNAL 990 /* an internal fault of the library; please report it */

/* Remarks: bits of one integer. No remark is a failure. */
#define BMOM_REMARK_CHARGED 1 /* net charge: the dipole is about the centre of mass */
#define BMOM_REMARK_BONDS_FOUND 2 /* bonds found from the coordinates */
#define BMOM_REMARK_CHARGES_FOUND 4 /* formal charges derived from the bonds, not stated */
#define BMOM_REMARK_IMPOSSIBLE_VALENCE 8 /* an atom has more or fewer bonds than its valence allows */
#define BMOM_REMARK_ORDERS_NOT_ASSIGNED 16 /* some bonds have no order (order 0): bonds to metals, bridging hydrogen */
#define BMOM_REMARK_BY_SYMMETRY 32 /* the point group forbids a dipole */
#define BMOM_REMARK_ONE_CONFORMER 64 /* one conformer of a flexible molecule */
#define BMOM_REMARK_SEVERAL_FRAGMENTS 128 /* several fragments that are not bonded to one another */
#define BMOM_REMARK_CHARGE_SITES 256 /* net neutral with separated charge sites */
#define BMOM_REMARK_OPEN_SHELL 512 /* an odd number of electrons */
#define BMOM_REMARK_MODEL_DISAGREES 1024 /* the charge model names another negative end than the electronegativities do */

/* column type */
#define BMOM_TYPE_NUMBER 1 /* number */
#define BMOM_TYPE_INTEGER 2 /* integer */
#define BMOM_TYPE_TEXT 3 /* text */

/* mark */
#define BMOM_MARK_VERIFIED 11 /* seen in print */
#define BMOM_MARK_CORROBORATED 12 /* independent transcriptions or numbers agree */
#define BMOM_MARK_TRANSCRIBED 13 /* one open transcription, unchecked */
#define BMOM_MARK_FROM_MEMORY 14 /* from memory, not yet checked against the source */
#define BMOM_MARK_DERIVED 15 /* computed from other entries */

/* state */
#define BMOM_STATE_AS_LISTED 21 /* the table's first entry */
#define BMOM_STATE_SP3 22 /* sp3 */
#define BMOM_STATE_SP2 23 /* sp2 */
#define BMOM_STATE_SP 24 /* sp */
#define BMOM_STATE_LOW_SPIN 25 /* low spin */
#define BMOM_STATE_HIGH_SPIN 26 /* high spin */

/* radii */
#define BMOM_RADII_CORDERO_2008 101 /* covalent radii, Cordero et al. 2008 */
#define BMOM_RADII_PYYKKO_SINGLE_2009 102 /* single-bond covalent radii, Pyykko and Atsumi 2009 */
#define BMOM_RADII_PYYKKO_DOUBLE_2009 103 /* double-bond covalent radii, Pyykko and Atsumi 2009 */
#define BMOM_RADII_PYYKKO_TRIPLE_2005 104 /* triple-bond covalent radii, Pyykko, Riedel and Patzschke 2005 */
#define BMOM_RADII_SCHOMAKER_STEVENSON_1941 105 /* covalent radii of the Schomaker-Stevenson law, 1941 */

/* length law */
#define BMOM_LENGTH_RADIUS_SUM 111 /* sum of the two radii of one table, for bonds of the order that the table is for */
#define BMOM_LENGTH_SCHOMAKER_STEVENSON_1941 112 /* radius sum less 0.09 A times the difference of electronegativity */
#define BMOM_LENGTH_PAULING_ORDER_1960 113 /* radius sum less 0.71 A log10 n, covalent bonds, orders 1 to 3 */
#define BMOM_LENGTH_PAULING_ORDER_1947 114 /* radius sum less 0.60 A log10 n, bonds between metals, orders 0.05 to 1 */
#define BMOM_LENGTH_BY_ORDER 115 /* by the bond order: 1 the radii named, 2 and 3 Pyykko's double and triple radii, 1.5 the mean of 1 and 2 */

/* vdw radii */
#define BMOM_VDW_BONDI_1964 121 /* van der Waals radii, Bondi 1964 */
#define BMOM_VDW_ROWLAND_TAYLOR_1996 122 /* van der Waals radii, Rowland and Taylor 1996 */
#define BMOM_VDW_MANTINA_2009 123 /* van der Waals radii of the main group, Mantina et al. 2009 */
#define BMOM_VDW_ALVAREZ_2013 124 /* van der Waals radii, Alvarez 2013 */
#define BMOM_VDW_VOGT_ALVAREZ_2014 125 /* van der Waals radii of the noble gases, Vogt and Alvarez 2014 */

/* electronegativity */
#define BMOM_ELECTRONEGATIVITY_PAULING 141 /* Pauling's scale, handbook column */
#define BMOM_ELECTRONEGATIVITY_PAULING_ALLRED 142 /* Pauling's scale with Allred's revisions of 1961 */
#define BMOM_ELECTRONEGATIVITY_ALLEN 143 /* Allen's scale, 1989 and 2000 */
#define BMOM_ELECTRONEGATIVITY_ALLRED_ROCHOW 144 /* Allred-Rochow scale, 1958 */
#define BMOM_ELECTRONEGATIVITY_MULLIKEN 145 /* Mulliken's mean of ionization energy and electron affinity, in Pauling units */

/* masses */
#define BMOM_WEIGHTS_STANDARD_2021 161 /* abridged standard atomic weights, 2021 */
#define BMOM_MASSES_ABUNDANT_ISOTOPE_2020 162 /* mass of the most abundant (else longest-lived) isotope, AME2020 */

/* polarizability */
#define BMOM_POLARIZABILITY_2018 171 /* static dipole polarizabilities of atoms, 2018 table */
#define BMOM_POLARIZABILITY_2023 172 /* static dipole polarizabilities of atoms, 2023 update */

/* ionic law */
#define BMOM_IONIC_PAULING_1960 201 /* 1 - exp(-(delta chi)^2/4) */
#define BMOM_IONIC_HANNAY_SMYTH_1946 202 /* 16 |delta chi| + 3.5 (delta chi)^2 percent, at most 100 */

/* bond class */
#define BMOM_CLASS_NON_POLAR 211 /* non-polar */
#define BMOM_CLASS_POLAR 212 /* polar */
#define BMOM_CLASS_IONIC 213 /* ionic */

/* bond end */
#define BMOM_END_A 221 /* atom a */
#define BMOM_END_B 222 /* atom b */
#define BMOM_END_NEITHER 223 /* neither */

/* bond rule */
#define BMOM_BONDS_ALTERNATING 231 /* aromatic rings as alternating single and double bonds */
#define BMOM_BONDS_AROMATIC 232 /* aromatic rings with bond order 1.5 */

/* charges */
#define BMOM_CHARGES_GIVEN 241 /* the caller's charges */
#define BMOM_CHARGES_PEOE_1980 242 /* partial equalization of orbital electronegativity, Gasteiger and Marsili 1980 */

/* frame */
#define BMOM_FRAME_AS_GIVEN 261 /* the axes of the input */

/* polarity */
#define BMOM_POLARITY_POLAR 271 /* polar */
#define BMOM_POLARITY_NON_POLAR 272 /* non-polar */
#define BMOM_POLARITY_UNDECIDED 273 /* undecided */
#define BMOM_POLARITY_CHARGED 274 /* charged */

/* format */
#define BMOM_FORMAT_BY_CONTENT 281 /* told by the content */
#define BMOM_FORMAT_XYZ 282 /* XYZ, one or many frames */
#define BMOM_FORMAT_CTFILE 283 /* CTfile molfile or SD file */
#define BMOM_FORMAT_CML 284 /* Chemical Markup Language */

/* unit */
#define BMOM_UNIT_ANGSTROM 301 /* A */
#define BMOM_UNIT_PM 302 /* pm */
#define BMOM_UNIT_NM 303 /* nm */
#define BMOM_UNIT_M 304 /* m */
#define BMOM_UNIT_BOHR 305 /* bohr (a0, the atomic unit of length) */
#define BMOM_UNIT_DEBYE 311 /* D */
#define BMOM_UNIT_C_M 312 /* C m */
#define BMOM_UNIT_E_ANGSTROM 313 /* e A */
#define BMOM_UNIT_E_BOHR 314 /* e a0 (the atomic unit of dipole) */
#define BMOM_UNIT_E 321 /* e (elementary charge) */
#define BMOM_UNIT_COULOMB 322 /* C */
#define BMOM_UNIT_KJ_PER_MOL 331 /* kJ/mol */
#define BMOM_UNIT_KCAL_PER_MOL 332 /* kcal/mol (thermochemical, 4.184 kJ/mol) */
#define BMOM_UNIT_EV 333 /* eV */
#define BMOM_UNIT_HARTREE 334 /* hartree (the atomic unit of energy) */
#define BMOM_UNIT_JOULE 335 /* J (of one particle) */
#define BMOM_UNIT_PER_CM 336 /* cm^-1 (energy divided by h c) */
#define BMOM_UNIT_KELVIN 341 /* K (temperature, or energy divided by k) */
#define BMOM_UNIT_CELSIUS 342 /* deg C */
#define BMOM_UNIT_ANGSTROM3 351 /* A3 (of one particle) */
#define BMOM_UNIT_NM3 352 /* nm3 (of one particle) */
#define BMOM_UNIT_BOHR3 353 /* a03 (the atomic unit of polarizability) */
#define BMOM_UNIT_C2_M2_PER_J 354 /* C^2 m^2/J (polarizability times 4 pi epsilon0) */
#define BMOM_UNIT_CM3_PER_MOL 355 /* cm3/mol */
#define BMOM_UNIT_D_ANGSTROM 361 /* D A */
#define BMOM_UNIT_E_BOHR2 362 /* e a0^2 (the atomic unit of quadrupole) */
#define BMOM_UNIT_C_M2 363 /* C m^2 */
#define BMOM_UNIT_DALTON 366 /* u (dalton) */
#define BMOM_UNIT_KG 367 /* kg */
#define BMOM_UNIT_ELECTRON_MASS 368 /* electron mass (the atomic unit of mass) */
#define BMOM_UNIT_U_ANGSTROM2 371 /* u A^2 */
#define BMOM_UNIT_KG_M2 372 /* kg m^2 */
#define BMOM_UNIT_MHZ 376 /* MHz */
#define BMOM_UNIT_GHZ 377 /* GHz */
#define BMOM_UNIT_DEGREE 381 /* deg  (angle) */
#define BMOM_UNIT_RADIAN 382 /* rad */
#define BMOM_UNIT_G_PER_CM3 386 /* g/cm3 */
#define BMOM_UNIT_KG_PER_M3 387 /* kg/m3 */


/*
 Structures in memory with their bonds. It never changes once it is made and may be shared by threads.
 */
typedef struct bmom_library bmom_library;

/*
 Settings of a run. They freeze at first use and may then be shared by threads. By name (exactly as here; ranges and
 defaults stand in the catalogue under "settings"):
 choices: charge_model, electronegativity, ionic_law, covalent_radii, vdw_radii;
 numbers: polar_from, ionic_from (not below polar_from, checked at first use), polarity_limit_D [D],
 position_uncertainty_A [A];
 texts: name_item, carry_items.
 */
typedef struct bmom_settings bmom_settings;

/*
 A request to stop a long call, from any thread or from a signal handler. Once requested it stays so.
 */
typedef struct bmom_stop bmom_stop;

/*
 A table of results: columns with names and types that never change; it may be shared by threads.
 */
typedef struct bmom_table bmom_table;

/*
 A run through files of structures that hands out the tables batch by batch. One thread uses it at a time.
 */
typedef struct bmom_tabulation bmom_tabulation;

#ifdef __cplusplus
extern "C" {
#endif // __cplusplus

/*
 Version of the ABI of the loaded library; a program built with another BMOM_ABI_VERSION must not go on.
 */
int32_t bmom_abi_version(void);

/*
 Version of the loaded library: static text.
 */
const char *bmom_version(void);

/*
 Version of the embedded tables: static text.
 */
const char *bmom_data_version(void);

/*
 The catalogue of all worksheet functions, choices, statuses and columns: static JSON text (UTF-8).
 */
const char *bmom_catalogue(void);

/*
 Name of the code in a status, such as OUT_OF_RANGE: static text, "UNKNOWN" for a number that is no code.
 */
const char *bmom_status_name(int32_t status);

/*
 The code in a status in one plain sentence: static text.
 */
const char *bmom_status_text(int32_t status);

/*
 Name of a selector without BMOM_: static text, "UNKNOWN" for a number that selects nothing.
 */
const char *bmom_selector_name(int32_t selector);

/*
 The selector of a name, with or without BMOM_, in any case.
 Given: 1 name [text]. Returned: 2 selector.
 Status: UNKNOWN_NAME, NOT_UTF8, NULL_POINTER.
 */
int32_t bmom_selector(const char *name, int64_t name_length, int32_t *selector);

/*
 The words of a status of a function: which argument is at fault, and what is wrong with it.
 Given: 1 function, its name with or without bmom_ and _column, or an empty text [text]; 2 status. Returned: 3 text
 (UTF-8). Status: BUFFER_TOO_SMALL, NOT_UTF8, NULL_POINTER, NEGATIVE_COUNT.
 Notes: the arguments of worksheet functions are named; those of other functions are numbered, as in their comments.
 */
int32_t bmom_status_message(const char *function,
                            int64_t function_length,
                            int32_t status,
                            char *text,
                            int64_t capacity,
                            int64_t *needed);

/*
 What stands behind a table, scale or law: a JSON object with title, author, year, journal, doi, unit, covers,
 uncertainty, mark and remark.
 Given: 1 selector. Returned: 2 text (UTF-8).
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR (no table), BUFFER_TOO_SMALL, NULL_POINTER, NEGATIVE_COUNT.
 */
int32_t bmom_source(int32_t selector, char *text, int64_t capacity, int64_t *needed);

/*
 What stands behind one value of a table: how well it is verified, and its citation with any dispute, as a JSON object
 with table, title, author, year, journal, doi, unit, value, u (in the unit that the publication prints), state, mark and
 note.
 Given: 1 table; 2 atomic_number; 3 state (BMOM_STATE_AS_LISTED where the table has none).
 Returned: 4 mark (BMOM_MARK_...); 5 text (UTF-8).
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, UNKNOWN_ELEMENT, MISSING, NO_DATA, BUFFER_TOO_SMALL, NULL_POINTER.
 */
int32_t bmom_value_source(int32_t table,
                          int32_t atomic_number,
                          int32_t state,
                          int32_t *mark,
                          char *text,
                          int64_t capacity,
                          int64_t *needed);

/*
 Tests the guard of the library in the host: what = 1 panics inside and must return BMOM_INTERNAL; 0 returns BMOM_OK.
 Status: INTERNAL, OUT_OF_RANGE for any other number.
 */
int32_t bmom_self_test(int32_t what);

/*
 A number as text: the fewest digits that read back to the same number, with an exponent below 1e-5 and from 1e16 on; an
 empty text for NaN, 0 for minus zero, inf for infinity. Every host that prints with it prints the same digits.
 Given: 1 value. Returned: 2 text (25 bytes are always enough, NUL included).
 Status: BUFFER_TOO_SMALL, NULL_POINTER, NEGATIVE_COUNT.
 */
int32_t bmom_number_text(double value,
                         char *text,
                         int64_t capacity,
                         int64_t *needed);

/*
 The number in a text, with a decimal point in every locale, correctly rounded; Fortran's exponents (1.0D+02) are read.
 Given: 1 text. Returned: 2 value.
 Status: MISSING (blank or nan), NOT_FINITE (inf, or beyond all doubles), BAD_FORMAT (no number), NOT_UTF8, NULL_POINTER,
 NEGATIVE_COUNT.
 */
int32_t bmom_number_read(const char *text,
                         int64_t text_length,
                         double *value);

/*
 Atomic number of a symbol or English name, in any case, blanks around it ignored; D and T are hydrogen.
 Given: 1 symbol [text]. Returned: 2 atomic_number.
 Status: MISSING (blank), UNKNOWN_ELEMENT, NOT_UTF8, NULL_POINTER, NEGATIVE_COUNT.
 */
int32_t bmom_atomic_number(const char *symbol, int64_t symbol_length, int32_t *atomic_number);

/*
 Column form of bmom_atomic_number: the text of row r is bytes symbol_offsets[r] to symbol_offsets[r + 1] - 1 of
 symbol_bytes. A text that is not UTF-8 is an UNKNOWN_ELEMENT of its row. Status of the call: BAD_OFFSETS.
 */
int32_t bmom_atomic_number_column(int64_t n,
                                  const int64_t *symbol_offsets,
                                  const char *symbol_bytes,
                                  int64_t n_symbol_bytes,
                                  int32_t *atomic_number,
                                  int32_t *row_status);

/*
 Symbol of an element.
 Given: 1 atomic_number (1 to 118). Returned: 2 text (at most 2 bytes).
 Status: MISSING, UNKNOWN_ELEMENT, BUFFER_TOO_SMALL, NULL_POINTER, NEGATIVE_COUNT.
 */
int32_t bmom_symbol(int32_t atomic_number, char *text, int64_t capacity, int64_t *needed);

/*
 Column form of bmom_symbol: the symbols follow one another in text, that of row r from text_offsets[r] on;
 text_offsets has n + 1 entries. Where the room is too small offsets and needed are right and no text is written.
 */
int32_t bmom_symbol_column(int64_t n,
                           const int32_t *atomic_number,
                           int64_t *text_offsets,
                           char *text,
                           int64_t capacity,
                           int64_t *needed,
                           int32_t *row_status);

/*
 Covalent radius of an element.
 Given: 1 table (BMOM_RADII_...); 2 atomic_number; 3 state (BMOM_STATE_AS_LISTED, or SP3 SP2 SP, LOW_SPIN HIGH_SPIN).
 Returned: 4 radius_A, u_radius_A [A]; u is NaN where none is published.
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
 Reference: Cordero et al., Dalton Trans. 2008, 2832; Pyykko and Atsumi, Chem. Eur. J. 2009, 15, 186 and 12770;
 Pyykko, Riedel, Patzschke, Chem. Eur. J. 2005, 11, 3511; Schomaker and Stevenson, J. Am. Chem. Soc. 1941, 63, 37.
 */
int32_t bmom_covalent_radius(int32_t table,
                             int32_t atomic_number,
                             int32_t state,
                             double *radius_A,
                             double *u_radius_A);

/*
 Column form of bmom_covalent_radius. A state that selects nothing is OUT_OF_RANGE (3052) of its row.
 */
int32_t bmom_covalent_radius_column(int32_t table,
                                    int64_t n,
                                    const int32_t *atomic_number,
                                    const int32_t *state,
                                    double *radius_A,
                                    double *u_radius_A,
                                    int32_t *row_status);

/*
 Van der Waals radius of an element.
 Given: 1 table (BMOM_VDW_...); 2 atomic_number. Returned: 3 radius_A, u_radius_A [A]; no table prints u (NaN).
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
 Reference: Bondi, J. Phys. Chem. 1964, 68, 441; Rowland and Taylor, J. Phys. Chem. 1996, 100, 7384; Mantina et al.,
 J. Phys. Chem. A 2009, 113, 5806; Alvarez, Dalton Trans. 2013, 42, 8617; Vogt and Alvarez, Inorg. Chem. 2014, 53, 9260.
 */
int32_t bmom_vdw_radius(int32_t table,
                        int32_t atomic_number,
                        double *radius_A,
                        double *u_radius_A);

/*
 Column form of bmom_vdw_radius.
 */
int32_t bmom_vdw_radius_column(int32_t table,
                               int64_t n,
                               const int32_t *atomic_number,
                               double *radius_A,
                               double *u_radius_A,
                               int32_t *row_status);

/*
 Electronegativity of an element, in Pauling units on every scale.
 Given: 1 scale (BMOM_ELECTRONEGATIVITY_...); 2 atomic_number. Returned: 3 electronegativity, u_electronegativity.
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
 Notes: only Mulliken's scale has u, from ionization energy and electron affinity.
 Reference: see bmom_source for each scale.
 */
int32_t bmom_electronegativity(int32_t scale,
                               int32_t atomic_number,
                               double *electronegativity,
                               double *u_electronegativity);

/*
 Column form of bmom_electronegativity.
 */
int32_t bmom_electronegativity_column(int32_t scale,
                                      int64_t n,
                                      const int32_t *atomic_number,
                                      double *electronegativity,
                                      double *u_electronegativity,
                                      int32_t *row_status);

/*
 Atomic weight, or mass of the most abundant isotope.
 Given: 1 table (BMOM_WEIGHTS_STANDARD_2021 for amounts, BMOM_MASSES_ABUNDANT_ISOTOPE_2020 for inertia);
 2 atomic_number. Returned: 3 atomic_weight_u, u_atomic_weight_u [u].
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA (no standard weight), NULL_POINTER.
 Reference: Prohaska et al., Pure Appl. Chem. 2022, 94, 573; Wang et al., Chinese Phys. C 2021, 45, 030003.
 */
int32_t bmom_atomic_weight(int32_t table,
                           int32_t atomic_number,
                           double *atomic_weight_u,
                           double *u_atomic_weight_u);

/*
 Column form of bmom_atomic_weight.
 */
int32_t bmom_atomic_weight_column(int32_t table,
                                  int64_t n,
                                  const int32_t *atomic_number,
                                  double *atomic_weight_u,
                                  double *u_atomic_weight_u,
                                  int32_t *row_status);

/*
 Static dipole polarizability of a free atom.
 Given: 1 table (BMOM_POLARIZABILITY_...); 2 atomic_number. Returned: 3 polarizability_A3, u_polarizability_A3 [A3].
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
 Reference: Schwerdtfeger and Nagle, Mol. Phys. 2019, 117, 1200, and the authors' 2023 update.
 */
int32_t bmom_polarizability(int32_t table,
                            int32_t atomic_number,
                            double *polarizability_A3,
                            double *u_polarizability_A3);

/*
 Column form of bmom_polarizability.
 */
int32_t bmom_polarizability_column(int32_t table,
                                   int64_t n,
                                   const int32_t *atomic_number,
                                   double *polarizability_A3,
                                   double *u_polarizability_A3,
                                   int32_t *row_status);

/*
 Radius of a Bohr orbit, n^2 a0 / Z; shell 1 and nuclear charge 1 give the Bohr radius a0.
 Given: 1 shell (from 1); 2 nuclear_charge (from 1). Returned: 3 radius_A, u_radius_A [A].
 Status: MISSING, OUT_OF_RANGE, NULL_POINTER. Reference: N. Bohr, Phil. Mag. 1913, 26, 1; CODATA 2022.
 */
int32_t bmom_bohr_radius(int32_t shell, int32_t nuclear_charge, double *radius_A, double *u_radius_A);

/*
 Column form of bmom_bohr_radius.
 */
int32_t bmom_bohr_radius_column(int64_t n,
                                const int32_t *shell,
                                const int32_t *nuclear_charge,
                                double *radius_A,
                                double *u_radius_A,
                                int32_t *row_status);

/*
 A value in another unit of the same kind.
 Given: 1 from_unit; 2 to_unit (BMOM_UNIT_...); 3 value, u_value [from_unit]. Returned: 4 converted, u_converted.
 Status: NOT_ALLOWED (2018: the units are of different kinds), UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, NOT_FINITE,
 NEGATIVE_UNCERTAINTY, OUT_OF_RANGE, NULL_POINTER.
 Notes: the uncertainty of measured constants in the factor is combined. Reference: CODATA 2022.
 */
int32_t bmom_convert(int32_t from_unit,
                     int32_t to_unit,
                     double value,
                     double u_value,
                     double *converted,
                     double *u_converted);

/*
 Column form of bmom_convert.
 */
int32_t bmom_convert_column(int32_t from_unit,
                            int32_t to_unit,
                            int64_t n,
                            const double *value,
                            const double *u_value,
                            double *converted,
                            double *u_converted,
                            int32_t *row_status);

/*
 Expected length of a bond between two elements.
 Given: 1 radii (BMOM_RADII_...); 2 law (BMOM_LENGTH_...); 3 scale (BMOM_ELECTRONEGATIVITY_...; only the
 Schomaker-Stevenson law uses it, but it must be one); 4 atomic_number_a; 5 state_a; 6 atomic_number_b; 7 state_b (BMOM_STATE_...); 8 bond_order.
 Returned: 9 length_A, u_length_A [A].
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, NOT_ALLOWED (law with these radii or this scale), MISSING, NOT_FINITE,
 UNKNOWN_ELEMENT, OUT_OF_RANGE (order, or element outside the law), NO_DATA, NULL_POINTER.
 Notes: LENGTH_RADIUS_SUM takes the order that the table is for; LENGTH_BY_ORDER 1, 1.5, 2, 3; the Schomaker-Stevenson
 law its own radii, a Pauling scale and order 1 (within about 0.05 A; fails for Si-F); Pauling's laws orders 1 to 3
 (1960, non-metals) and 0.05 to 1 (1947, metals). u comes from the radii; laws without a published one give NaN.
 Reference: Schomaker and Stevenson, J. Am. Chem. Soc. 1941, 63, 37; Pauling, ibid. 1947, 69, 542, and The Nature of
 the Chemical Bond, 3rd ed. 1960 (from memory); radii as bmom_covalent_radius.
 */
int32_t bmom_bond_length(int32_t radii,
                         int32_t law,
                         int32_t scale,
                         int32_t atomic_number_a,
                         int32_t state_a,
                         int32_t atomic_number_b,
                         int32_t state_b,
                         double bond_order,
                         double *length_A,
                         double *u_length_A);

/*
 Column form of bmom_bond_length. A state that selects nothing is OUT_OF_RANGE of its row.
 */
int32_t bmom_bond_length_column(int32_t radii,
                                int32_t law,
                                int32_t scale,
                                int64_t n,
                                const int32_t *atomic_number_a,
                                const int32_t *state_a,
                                const int32_t *atomic_number_b,
                                const int32_t *state_b,
                                const double *bond_order,
                                double *length_A,
                                double *u_length_A,
                                int32_t *row_status);

/*
 Polarity of a bond: difference of electronegativity, negative end and class.
 Given: 1 scale (BMOM_ELECTRONEGATIVITY_...); 2 polar_from (usually 0.4); 3 ionic_from (usually 1.7, not below
 polar_from); 4 atomic_number_a; 5 atomic_number_b.
 Returned: 6 delta_chi, u_delta_chi (chi_b - chi_a, above 0 where b is the negative end, Pauling units);
 7 negative_end (BMOM_END_...); 8 bond_class (BMOM_CLASS_...).
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, NOT_FINITE, OUT_OF_RANGE, UNKNOWN_ELEMENT, NO_DATA, NULL_POINTER.
 Notes: below polar_from non-polar; from ionic_from on ionic where one partner is a metal, else polar (HF is polar).
 The limits are common practice, not a standard. The difference is rounded to six decimals.
 Reference: Pauling, The Nature of the Chemical Bond, 3rd ed. 1960 (from memory).
 */
int32_t bmom_bond_polarity(int32_t scale,
                           double polar_from,
                           double ionic_from,
                           int32_t atomic_number_a,
                           int32_t atomic_number_b,
                           double *delta_chi,
                           double *u_delta_chi,
                           int32_t *negative_end,
                           int32_t *bond_class);

/*
 Column form of bmom_bond_polarity.
 */
int32_t bmom_bond_polarity_column(int32_t scale,
                                  double polar_from,
                                  double ionic_from,
                                  int64_t n,
                                  const int32_t *atomic_number_a,
                                  const int32_t *atomic_number_b,
                                  double *delta_chi,
                                  double *u_delta_chi,
                                  int32_t *negative_end,
                                  int32_t *bond_class,
                                  int32_t *row_status);

/*
 Ionic character of a bond from its difference of electronegativity.
 Given: 1 law (BMOM_IONIC_PAULING_1960 or BMOM_IONIC_HANNAY_SMYTH_1946); 2 delta_chi, u_delta_chi (Pauling units).
 Returned: 3 ionic_percent, u_ionic_percent [%].
 Status: UNKNOWN_SELECTOR, WRONG_SELECTOR, MISSING, NOT_FINITE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
 Notes: Hannay and Smyth's formula passes 100 % above |delta_chi| = 3.53; there the answer is clamped to 100 and its u
 is NaN. u is that of delta_chi alone. Reference: Pauling 1960 (from memory); Hannay and Smyth, J. Am. Chem. Soc.
 1946, 68, 171.
 */
int32_t bmom_ionic_character(int32_t law,
                             double delta_chi,
                             double u_delta_chi,
                             double *ionic_percent,
                             double *u_ionic_percent);

/*
 Column form of bmom_ionic_character.
 */
int32_t bmom_ionic_character_column(int32_t law,
                                    int64_t n,
                                    const double *delta_chi,
                                    const double *u_delta_chi,
                                    double *ionic_percent,
                                    double *u_ionic_percent,
                                    int32_t *row_status);

/*
 Which atoms of each molecule are bonded, and with what order, from elements and coordinates.
 Given: 1 rule (BMOM_BONDS_ALTERNATING or BMOM_BONDS_AROMATIC); settings (NULL: defaults); threads (1: the caller's, 0:
 all); 2 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e] (NULL: derived), xyz_A [A] (3 an
 atom). Returned, ragged: found_offsets (n + 1: first bond of each row, and the end); 3 found_atoms (2 a bond, counted
 from 0 within the molecule); 4 found_order (0 where none is assigned: metals, bridging hydrogen); 5 found_length_A
 [A]; 6 found_formal_charge [e] (an atom each, at the index of its atom; NULL: not wanted).
 capacity: room in bonds; needed: bonds found. Where the room is too small (BUFFER_TOO_SMALL) found_offsets, needed and
 the rows' ends are right and no bond is written. row_item: the atom at fault or that a remark is about.
 Status of a row: MISSING, NOT_FINITE, OUT_OF_RANGE, UNKNOWN_ELEMENT, NO_ATOMS, ATOMS_TOO_CLOSE.
 Remarks: IMPOSSIBLE_VALENCE, ORDERS_NOT_ASSIGNED, CHARGES_FOUND, OPEN_SHELL, BONDS_FOUND, SEVERAL_FRAGMENTS.
 capacity 0 with NULL arrays asks for the number alone.
 Notes: time is linear in the atoms, up to 10^6 in one molecule. The method is our own; radii as bmom_covalent_radius.
 */
int32_t bmom_find_bonds_column(int32_t rule,
                               const struct bmom_settings *settings,
                               int32_t threads,
                               int64_t n,
                               const int64_t *atom_offsets,
                               int64_t n_atoms,
                               const int32_t *atomic_number,
                               const int32_t *formal_charge,
                               const double *xyz_A,
                               int64_t *found_offsets,
                               int32_t *found_atoms,
                               double *found_order,
                               double *found_length_A,
                               int32_t *found_formal_charge,
                               int64_t capacity,
                               int64_t *needed,
                               int32_t *row_remarks,
                               int32_t *row_item,
                               int32_t *row_status);

/*
 One molecule: as bmom_find_bonds_column with one row, default settings and the caller's thread. found_atoms has room for 2 x capacity integers, found_order and
 found_length_A for capacity numbers; needed is the number of bonds.
 */
int32_t bmom_find_bonds(int32_t rule,
                        int64_t n_atoms,
                        const int32_t *atomic_number,
                        const int32_t *formal_charge,
                        const double *xyz_A,
                        int32_t *found_atoms,
                        double *found_order,
                        double *found_length_A,
                        int32_t *found_formal_charge,
                        int64_t capacity,
                        int64_t *needed,
                        int32_t *remarks,
                        int32_t *item);

/*
 Charge from a bond dipole: q = mu / (e d).
 Given: 1 dipole_D, u_dipole_D [D]; 2 length_A, u_length_A [A], above 0. Returned: 3 charge_e, u_charge_e [e].
 Status: MISSING, NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
 Notes: inputs count as independent; the charge has the sign of the dipole.
 Reference: C. P. Smyth, Dielectric Behavior and Structure, 1955 (from memory).
 */
int32_t bmom_charge_from_dipole(double dipole_D,
                                double u_dipole_D,
                                double length_A,
                                double u_length_A,
                                double *charge_e,
                                double *u_charge_e);

/*
 Column form of bmom_charge_from_dipole; one entry a row in every array.
 */
int32_t bmom_charge_from_dipole_column(int64_t n,
                                       const double *dipole_D,
                                       const double *u_dipole_D,
                                       const double *length_A,
                                       const double *u_length_A,
                                       double *charge_e,
                                       double *u_charge_e,
                                       int32_t *row_status);

/*
 Bond dipole from a charge: mu = e q d.
 Given: 1 charge_e, u_charge_e [e]; 2 length_A, u_length_A [A], above 0. Returned: 3 dipole_D, u_dipole_D [D].
 Status: MISSING, NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
 Notes: inputs count as independent. Reference: as bmom_charge_from_dipole.
 */
int32_t bmom_dipole_from_charge(double charge_e,
                                double u_charge_e,
                                double length_A,
                                double u_length_A,
                                double *dipole_D,
                                double *u_dipole_D);

/*
 Column form of bmom_dipole_from_charge; one entry a row in every array.
 */
int32_t bmom_dipole_from_charge_column(int64_t n,
                                       const double *charge_e,
                                       const double *u_charge_e,
                                       const double *length_A,
                                       const double *u_length_A,
                                       double *dipole_D,
                                       double *u_dipole_D,
                                       int32_t *row_status);

/*
 Distance of two opposite charges from a dipole: d = mu / (e q).
 Given: 1 dipole_D, u_dipole_D [D]; 2 charge_e, u_charge_e [e], not 0 and of the sign of the dipole.
 Returned: 3 length_A, u_length_A [A].
 Status: MISSING, NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY, NULL_POINTER.
 Notes: inputs count as independent. Reference: as bmom_charge_from_dipole.
 */
int32_t bmom_length_from_dipole(double dipole_D,
                                double u_dipole_D,
                                double charge_e,
                                double u_charge_e,
                                double *length_A,
                                double *u_length_A);

/*
 Column form of bmom_length_from_dipole; one entry a row in every array.
 */
int32_t bmom_length_from_dipole_column(int64_t n,
                                       const double *dipole_D,
                                       const double *u_dipole_D,
                                       const double *charge_e,
                                       const double *u_charge_e,
                                       double *length_A,
                                       double *u_length_A,
                                       int32_t *row_status);

/*
 Partial charges of the atoms of each molecule.
 Given: 1 model (BMOM_CHARGES_..., not GIVEN); settings (NULL: defaults); threads (1: the caller's, 0: all);
 2 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e] (NULL: derived), xyz_A [A] (3 an atom);
 3 bonds: bond_offsets (n + 1; NULL: found), n_bonds, bond_atoms (2 a bond, counted from 0 within the molecule),
 bond_order. Returned: 4 charge_e, u_charge_e [e], an atom each at the index of its atom; u is NaN for a model without.
 row_item: the bond at fault where the status names argument 3, else the atom; -1: none.
 Status of a row: NO_DATA (1101: the model has no parameters for an atom as it is bonded), BAD_BOND, ATOMS_TOO_CLOSE, NO_ATOMS,
 UNKNOWN_ELEMENT, MISSING, NOT_FINITE, OUT_OF_RANGE. Of the call: NOT_ALLOWED (GIVEN), BAD_OFFSETS, ...
 Remarks: BONDS_FOUND, CHARGES_FOUND, IMPOSSIBLE_VALENCE, ORDERS_NOT_ASSIGNED, SEVERAL_FRAGMENTS.
 Notes: PEOE is a sigma model with six sweeps; delocalised formal charge (carboxylate) is shared first, and opposite
 formal charges of bonded atoms (nitro) cancel. It fails
 for pi systems (C=O, NO2 and CN come out far too small) and for the sign of carbon monoxide.
 Reference: Gasteiger and Marsili, Tetrahedron 1980, 36, 3219 (parameters from memory, partly corroborated).
 */
int32_t bmom_partial_charges_column(int32_t model,
                                    const struct bmom_settings *settings,
                                    int32_t threads,
                                    int64_t n,
                                    const int64_t *atom_offsets,
                                    int64_t n_atoms,
                                    const int32_t *atomic_number,
                                    const int32_t *formal_charge,
                                    const double *xyz_A,
                                    const int64_t *bond_offsets,
                                    int64_t n_bonds,
                                    const int32_t *bond_atoms,
                                    const double *bond_order,
                                    double *charge_e,
                                    double *u_charge_e,
                                    int32_t *row_remarks,
                                    int32_t *row_item,
                                    int32_t *row_status);

/*
 One molecule: as bmom_partial_charges_column with one row, default settings and the caller's thread. bond_atoms NULL
 with n_bonds 0: bonds are found.
 */
int32_t bmom_partial_charges(int32_t model,
                             int64_t n_atoms,
                             const int32_t *atomic_number,
                             const int32_t *formal_charge,
                             const double *xyz_A,
                             int64_t n_bonds,
                             const int32_t *bond_atoms,
                             const double *bond_order,
                             double *charge_e,
                             double *u_charge_e,
                             int32_t *remarks,
                             int32_t *item);

/*
 Dipole vector of each molecule, from - to +, about the centre of mass.
 Given: 1 model (BMOM_CHARGES_...); 2 frame (BMOM_FRAME_AS_GIVEN); settings (NULL: defaults; position_uncertainty_A);
 threads (1: the caller's, 0: all); 3 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e]
 (NULL: derived), xyz_A [A] (3 an atom); 4 bonds: bond_offsets (n + 1; NULL: found), n_bonds, bond_atoms (2 a bond),
 bond_order; 5 charge_e, u_charge_e [e] (an atom each, with BMOM_CHARGES_GIVEN and only with it).
 Returned: 6 dipole_D [D] (3 a row), covariance_D2 [D^2] (9 a row; NaN where not known; NULL: not wanted);
 7 magnitude_D, u_magnitude_D [D]; 8 origin_A [A] (3 a row; NULL: not wanted). row_item:
 the bond at fault where the status names argument 4, else the atom; -1: none.
 Status of a row: NO_DATA (1101: the model has no parameters for an atom as it is bonded), BAD_BOND, ATOMS_TOO_CLOSE, NO_ATOMS, UNKNOWN_ELEMENT, MISSING,
 NOT_FINITE, OUT_OF_RANGE, NEGATIVE_UNCERTAINTY. Of the call: NOT_ALLOWED (charge_e and model), BAD_OFFSETS, ...
 Remarks: CHARGED (the dipole depends on the origin), BONDS_FOUND, CHARGES_FOUND, IMPOSSIBLE_VALENCE, ...
 Notes: the net charge is exact, so the uncertainties of the charges are conditioned on it. PEOE states no uncertainty:
 its covariance_D2 and u_magnitude_D are NaN; given charges have them where u_charge_e is given. PEOE fails for pi systems; see bmom_partial_charges_column.
 Reference: E. R. Cohen et al., Quantities, Units and Symbols in Physical Chemistry, 3rd ed., IUPAC 2007 (from memory).
 */
int32_t bmom_dipole_column(int32_t model,
                           int32_t frame,
                           const struct bmom_settings *settings,
                           int32_t threads,
                           int64_t n,
                           const int64_t *atom_offsets,
                           int64_t n_atoms,
                           const int32_t *atomic_number,
                           const int32_t *formal_charge,
                           const double *xyz_A,
                           const int64_t *bond_offsets,
                           int64_t n_bonds,
                           const int32_t *bond_atoms,
                           const double *bond_order,
                           const double *charge_e,
                           const double *u_charge_e,
                           double *dipole_D,
                           double *covariance_D2,
                           double *magnitude_D,
                           double *u_magnitude_D,
                           double *origin_A,
                           int32_t *row_remarks,
                           int32_t *row_item,
                           int32_t *row_status);

/*
 One molecule: as bmom_dipole_column with one row, default settings and the caller's thread. bond_atoms NULL with n_bonds
 0: bonds are found.
 */
int32_t bmom_dipole(int32_t model,
                    int32_t frame,
                    int64_t n_atoms,
                    const int32_t *atomic_number,
                    const int32_t *formal_charge,
                    const double *xyz_A,
                    int64_t n_bonds,
                    const int32_t *bond_atoms,
                    const double *bond_order,
                    const double *charge_e,
                    const double *u_charge_e,
                    double *dipole_D,
                    double *covariance_D2,
                    double *magnitude_D,
                    double *u_magnitude_D,
                    double *origin_A,
                    int32_t *remarks,
                    int32_t *item);

/*
 Dipole vector of point charges about the given origin, from - to +.
 Given: 1 n_atoms, charge_e, u_charge_e [e] (NULL: not known); 2 xyz_A [A] (3 a charge), u_xyz_A [A] (one a charge, alike
 in all directions; NULL: not known). Returned: 3 dipole_D [D] (3), covariance_D2 [D^2] (9; NULL: not wanted);
 4 magnitude_D, u_magnitude_D [D].
 Status: CHARGED (the charges do not sum to zero within 1e-6 e), NO_ATOMS, MISSING, NOT_FINITE, OUT_OF_RANGE,
 NEGATIVE_UNCERTAINTY, NULL_POINTER, NEGATIVE_COUNT.
 Notes: all inputs count as independent, C = k^2 (sum u_q^2 r r' + sum q^2 u_x^2 1) with k = 4.80320471 D/(e A).
 Reference: JCGM 100:2008; E. R. Cohen et al., IUPAC 2007 (from memory).
 */
int32_t bmom_dipole_of_charges(int64_t n_atoms,
                               const double *charge_e,
                               const double *u_charge_e,
                               const double *xyz_A,
                               const double *u_xyz_A,
                               double *dipole_D,
                               double *covariance_D2,
                               double *magnitude_D,
                               double *u_magnitude_D);

/*
 Column form of bmom_dipole_of_charges: settings (NULL; none applies); threads; n; the charges of row r are
 atom_offsets[r] to atom_offsets[r + 1] - 1 of charge_e, u_charge_e, u_xyz_A (one each) and xyz_A (three each).
 row_item: the charge at fault.
 */
int32_t bmom_dipole_of_charges_column(const struct bmom_settings *settings,
                                      int32_t threads,
                                      int64_t n,
                                      const int64_t *atom_offsets,
                                      int64_t n_atoms,
                                      const double *charge_e,
                                      const double *u_charge_e,
                                      const double *xyz_A,
                                      const double *u_xyz_A,
                                      double *dipole_D,
                                      double *covariance_D2,
                                      double *magnitude_D,
                                      double *u_magnitude_D,
                                      int32_t *row_remarks,
                                      int32_t *row_item,
                                      int32_t *row_status);

/*
 Polar, non-polar or undecided, from a dipole vector and its covariance.
 Given: 1 limit_D [D] (usually 0.2); 2 dipole_D [D] (3), covariance_D2 [D^2] (9).
 Returned: 3 polarity (BMOM_POLARITY_...).
 Status: MISSING (also for a covariance that is NaN, as that of PEOE dipoles is), NOT_FINITE, OUT_OF_RANGE (limit; or a
 matrix that is no covariance), NULL_POINTER (covariance_D2 must be given).
 Notes: polar where |mu| - 2 u > limit; non-polar where |mu| + 2.8 sqrt(largest eigenvalue of the covariance) <= limit
 (2.8 is the 95 % radius of a normal distribution in three dimensions); else undecided. One conformer is not the
 molecule: the polarity table also bounds what turning about bonds can do.
 */
int32_t bmom_dipole_polarity(double limit_D,
                             const double *dipole_D,
                             const double *covariance_D2,
                             int32_t *polarity);

/*
 Column form of bmom_dipole_polarity: dipole_D has 3 numbers a row, covariance_D2 9.
 */
int32_t bmom_dipole_polarity_column(double limit_D,
                                    int64_t n,
                                    const double *dipole_D,
                                    const double *covariance_D2,
                                    int32_t *polarity,
                                    int32_t *row_status);

/*
 New settings with the defaults. Free them with bmom_settings_free.
 Status: NULL_POINTER.
 */
int32_t bmom_settings_new(struct bmom_settings **settings);

/*
 Sets a number.
 Given: 1 settings; 2 name [text]; 3 value [unit of the setting].
 Status: UNKNOWN_NAME, WRONG_TYPE, OUT_OF_RANGE, MISSING, NOT_ALLOWED (already in use), BUSY, BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_settings_number(struct bmom_settings *settings,
                             const char *name,
                             int64_t name_length,
                             double value);

/*
 Makes a choice.
 Given: 1 settings; 2 name [text]; 3 selector.
 Status: as bmom_settings_number, and UNKNOWN_SELECTOR, WRONG_SELECTOR.
 */
int32_t bmom_settings_choice(struct bmom_settings *settings,
                             const char *name,
                             int64_t name_length,
                             int32_t selector);

/*
 Sets a text.
 Given: 1 settings; 2 name [text]; 3 value [text].
 Status: as bmom_settings_number, and NOT_UTF8.
 */
int32_t bmom_settings_text(struct bmom_settings *settings,
                           const char *name,
                           int64_t name_length,
                           const char *value,
                           int64_t value_length);

/*
 Frees settings; NULL is allowed. Jobs that use them keep their own copy.
 */
void bmom_settings_free(struct bmom_settings *settings);

/*
 A new stop handle, not yet requested. Free it with bmom_stop_free when no call uses it any more.
 Status: NULL_POINTER.
 */
int32_t bmom_stop_new(struct bmom_stop **stop);

/*
 Asks every call that holds this handle to end with STOPPED. One atomic store: fit for a signal handler.
 */
void bmom_stop_request(struct bmom_stop *stop);

/*
 Frees a stop handle; NULL is allowed.
 */
void bmom_stop_free(struct bmom_stop *stop);

/*
 Reads a file of structures, or all files of a folder, into memory, and tells their bonds.
 Given: 1 format (BMOM_FORMAT_...); settings (NULL: defaults); threads (1: the caller's, 0: all); stop (NULL: none);
 2 path [text; raw bytes on Unix]. Returned: 3 library, NULL after any failure; free it with bmom_library_free.
 Status: FILE_MISSING, FILE_UNREADABLE, BAD_FORMAT, UNKNOWN_SELECTOR, WRONG_SELECTOR, STOPPED, BAD_HANDLE, BUSY,
 NULL_POINTER. Notes: a broken record keeps its place; its row says what is wrong. Of a folder, a file that cannot be read
 as structures is one broken record if its name ends in .xyz, .sdf, .sd, .mol or .cml (also .gz), and is left out otherwise.
 Reference: CTfile Formats, the published specification (molfiles and SD files, V2000 and V3000); Chemical Markup Language,
 Murray-Rust, Rzepa 1999; gzip (any of them, told by the content), RFC 1952; XYZ is common practice.
 */
int32_t bmom_library_read(int32_t format,
                          const struct bmom_settings *settings,
                          int32_t threads,
                          const struct bmom_stop *stop,
                          const char *path,
                          int64_t path_length,
                          struct bmom_library **library);

/*
 Reads structures from a text in memory, as bmom_library_read does from a file; the rows call it "text".
 Given: 1 format; settings; threads; stop; 2 content [bytes]. Returned: 3 library.
 Status: as bmom_library_read, without those of files.
 */
int32_t bmom_library_parse(int32_t format,
                           const struct bmom_settings *settings,
                           int32_t threads,
                           const struct bmom_stop *stop,
                           const char *content,
                           int64_t content_length,
                           struct bmom_library **library);

/*
 Takes structures as the caller holds them.
 Given: 1 molecules: n, atom_offsets (n + 1), n_atoms, atomic_number, formal_charge [e] (NULL: derived), xyz_A [A]
 (3 an atom); 2 bonds: bond_offsets (n + 1; NULL: found), n_bonds, bond_atoms (2 a bond), bond_order; 3 charge_e,
 u_charge_e [e] (an atom each; NULL: none; used where the setting charge_model is CHARGES_GIVEN); 4 names: name_offsets
 (n + 1; NULL: none), name_bytes (UTF-8), n_name_bytes. Returned: 5 library, NULL after any failure.
 Status: NULL_POINTER, NEGATIVE_COUNT, TOO_LARGE, MISALIGNED, BAD_OFFSETS, NOT_UTF8. What is wrong with one molecule is
 told in its row of the tables.
 */
int32_t bmom_library_from_arrays(int64_t n,
                                 const int64_t *atom_offsets,
                                 int64_t n_atoms,
                                 const int32_t *atomic_number,
                                 const int32_t *formal_charge,
                                 const double *xyz_A,
                                 const int64_t *bond_offsets,
                                 int64_t n_bonds,
                                 const int32_t *bond_atoms,
                                 const double *bond_order,
                                 const double *charge_e,
                                 const double *u_charge_e,
                                 const int64_t *name_offsets,
                                 const char *name_bytes,
                                 int64_t n_name_bytes,
                                 struct bmom_library **library);

/*
 Number of records, atoms and bonds. A broken record has no atoms; one whose bonds cannot be told has no bonds.
 Given: 1 library. Returned: 2 molecules; 3 atoms; 4 bonds. Status: BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_library_size(const struct bmom_library *library,
                          int64_t *molecules,
                          int64_t *atoms,
                          int64_t *bonds);

/*
 Copies the structures out in the layout of a column of molecules; sizes by bmom_library_size; each array may be NULL.
 Given: 1 library. Returned: 2 atom_offsets (molecules + 1); 3 atomic_number; 4 formal_charge [e] (stated or derived);
 5 xyz_A [A] (3 an atom); 6 bond_offsets (molecules + 1); 7 bond_atoms (2 a bond); 8 bond_order; row_status (a record
 that is broken or whose bonds cannot be told).
 Status: SOME_ROWS, NO_ROWS, MISALIGNED, OVERLAP, BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_library_arrays(const struct bmom_library *library,
                            int64_t *atom_offsets,
                            int32_t *atomic_number,
                            int32_t *formal_charge,
                            double *xyz_A,
                            int64_t *bond_offsets,
                            int32_t *bond_atoms,
                            double *bond_order,
                            int32_t *row_status);

/*
 The three tables of some records of a library. Columns, by name (types, units and meanings stand in the catalogue under
 "tables"):
 polarity: record, compound, formula, atoms, net_charge, fragments, charge_sites, structure_kind, dipole_D, u_dipole_D,
 dipole_x_D, dipole_y_D, dipole_z_D, cov_xx_D2, cov_yy_D2, cov_zz_D2, cov_xy_D2, cov_xz_D2, cov_yz_D2, polarity,
 strongest_bond, delta_chi, negative_end, strongest_bond_charge_e, charge_model, data_version, status, detail, then data_...;
 bonds: record, compound, atom_a, atom_b, element_a, element_b, order, length_A, expected_A, u_expected_A, deviation_A,
 delta_chi, negative_end, ionic_percent, bond_charge_e, class;
 atoms: record, compound, atom, element, x_A, y_A, z_A, charge_e, u_charge_e, covalent_radius_A, vdw_radius_A.
 Given: 1 library; 2 measured (NULL: no measured dipoles are compared in this version); settings (NULL: defaults);
 threads; stop (NULL: none); 3 first (from 0); 4 n. Returned: 5 polarity; 6 bonds; 7 atoms: NULL where that table is not
 wanted; NULL is written after any failure. Free each with bmom_table_free.
 Status: NOT_ALLOWED (measured is not NULL), OUT_OF_RANGE, STOPPED, BAD_HANDLE, BUSY, NULL_POINTER.
 */
int32_t bmom_polarity_table(const struct bmom_library *library,
                            const struct bmom_table *measured,
                            const struct bmom_settings *settings,
                            int32_t threads,
                            const struct bmom_stop *stop,
                            int64_t first,
                            int64_t n,
                            struct bmom_table **polarity,
                            struct bmom_table **bonds,
                            struct bmom_table **atoms);

/*
 Frees a library; NULL is allowed.
 */
void bmom_library_free(struct bmom_library *library);

/*
 Opens a run through a file of structures or all files of a folder, in the order of their names; memory stays bounded
 whatever their size.
 Given: 1 measured (NULL: no measured dipoles are compared in this version); 2 format (BMOM_FORMAT_...); settings (NULL:
 defaults); threads; 3 path [text]; 4 resume_from [text of bmom_tabulation_position, or empty].
 Returned: 5 tabulation, NULL after any failure; free it with bmom_tabulation_free.
 Status: NOT_ALLOWED (measured; or resume_from of another run, 4018), FILE_MISSING, FILE_UNREADABLE, BAD_FORMAT,
 UNKNOWN_SELECTOR, WRONG_SELECTOR, OUT_OF_RANGE (threads or settings), NOT_UTF8, BAD_HANDLE, BUSY, NULL_POINTER.
 Notes: of a folder, a file that cannot be read as structures is one broken record if its name ends in .xyz, .sdf, .sd,
 .mol or .cml (also .gz), and is left out otherwise.
 */
int32_t bmom_tabulation_open(const struct bmom_table *measured,
                             int32_t format,
                             const struct bmom_settings *settings,
                             int32_t threads,
                             const char *path,
                             int64_t path_length,
                             const char *resume_from,
                             int64_t resume_from_length,
                             struct bmom_tabulation **tabulation);

/*
 The tables of the next records of a run.
 Given: 1 tabulation; stop (NULL: none); 2 max_molecules (from 1). Returned: 3 polarity; 4 bonds; 5 atoms: NULL where that
 table is not wanted; NULL is written after any failure. Free each with bmom_table_free.
 Status: END (no record is left), STOPPED (the next call, with another stop handle, goes on with the same records), FILE_MISSING, FILE_UNREADABLE,
 BAD_FORMAT (a file has changed), OUT_OF_RANGE, BUSY, OTHER_PROCESS, BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_tabulation_next(struct bmom_tabulation *tabulation,
                             const struct bmom_stop *stop,
                             int64_t max_molecules,
                             struct bmom_table **polarity,
                             struct bmom_table **bonds,
                             struct bmom_table **atoms);

/*
 How far a run has come, in whole batches; any thread may ask at any time, also while another is in
 bmom_tabulation_next.
 Given: 1 tabulation. Returned: 2 molecules_done; 3 bytes_done; 4 bytes_total (0: not known); each may be NULL.
 Status: BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_tabulation_progress(const struct bmom_tabulation *tabulation,
                                 int64_t *molecules_done,
                                 int64_t *bytes_done,
                                 int64_t *bytes_total);

/*
 Where a run goes on after the last batch, as a text for resume_from of bmom_tabulation_open.
 Given: 1 tabulation. Returned: 2 text. Status: BUFFER_TOO_SMALL, BUSY, OTHER_PROCESS, BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_tabulation_position(const struct bmom_tabulation *tabulation,
                                 char *text,
                                 int64_t capacity,
                                 int64_t *needed);

/*
 Ends a run and frees it; NULL is allowed.
 */
void bmom_tabulation_free(struct bmom_tabulation *tabulation);

/*
 Number of rows and columns.
 Given: 1 table. Returned: 2 rows; 3 columns. Status: BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_table_size(const struct bmom_table *table, int64_t *rows, int32_t *columns);

/*
 Name of a column, with its unit.
 Given: 1 table; 2 column (from 0). Returned: 3 text. Status: OUT_OF_RANGE, BUFFER_TOO_SMALL, BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_table_name(const struct bmom_table *table,
                        int32_t column,
                        char *text,
                        int64_t capacity,
                        int64_t *needed);

/*
 Index and type of the column of a name.
 Given: 1 table; 2 name [text]. Returned: 3 column (from 0, good for this table); 4 type (BMOM_TYPE_...).
 Status: UNKNOWN_NAME, NOT_UTF8, BAD_HANDLE, NULL_POINTER.
 */
int32_t bmom_table_column(const struct bmom_table *table,
                          const char *name,
                          int64_t name_length,
                          int32_t *column,
                          int32_t *type_);

/*
 Numbers of a column of type NUMBER, NaN where a cell has no value. The call is OK though every cell be without one:
 cell_status says why.
 Given: 1 table; 2 column (from 0); 3 first (row, from 0); 4 n. Returned: 5 values (n); 6 cell_status (n; NULL: not
 wanted). Status: WRONG_TYPE, OUT_OF_RANGE, NEGATIVE_COUNT, BAD_HANDLE, NULL_POINTER, OVERLAP.
 */
int32_t bmom_table_numbers(const struct bmom_table *table,
                           int32_t column,
                           int64_t first,
                           int64_t n,
                           double *values,
                           int32_t *cell_status);

/*
 Integers of a column of type INTEGER, INT32_MIN where a cell has no value. Otherwise as bmom_table_numbers.
 */
int32_t bmom_table_integers(const struct bmom_table *table,
                            int32_t column,
                            int64_t first,
                            int64_t n,
                            int32_t *values,
                            int32_t *cell_status);

/*
 Cells of a column of any type as text, numbers in the library's digits, empty where a cell has no value.
 Given: 1 table; 2 column (from 0); 3 first (row, from 0); 4 n. Returned: 5 text_offsets (n + 1), text (UTF-8, no NUL);
 6 cell_status (n; NULL: not wanted). Where the room is too small offsets and needed are right and no text is written.
 Status: BUFFER_TOO_SMALL, OUT_OF_RANGE, NEGATIVE_COUNT, BAD_HANDLE, NULL_POINTER, OVERLAP.
 */
int32_t bmom_table_texts(const struct bmom_table *table,
                         int32_t column,
                         int64_t first,
                         int64_t n,
                         int64_t *text_offsets,
                         char *text,
                         int64_t capacity,
                         int64_t *needed,
                         int32_t *cell_status);

/*
 Frees a table; NULL is allowed.
 */
void bmom_table_free(struct bmom_table *table);

#ifdef __cplusplus
}  // extern "C"
#endif  // __cplusplus

#endif  /* BONDMOMENT_H */

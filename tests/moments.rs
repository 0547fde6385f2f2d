//! The moments family: dipoles against published resultants (tests/published/moments.csv), point groups, flexibility and
//! verdicts.

#[path = "moments/dipoles.rs"]
mod dipoles;
#[path = "moments/flexibility.rs"]
mod flexibility;
#[path = "moments/hostile.rs"]
mod hostile;
#[path = "moments/open_set.rs"]
mod open_set;
#[path = "moments/point_groups.rs"]
mod point_groups;
#[path = "moments/random.rs"]
mod random;
#[path = "moments/rotors.rs"]
mod rotors;
#[path = "published/structures.rs"]
mod structures;
#[path = "moments/verdicts.rs"]
mod verdicts;

//! What the periodic table says about bonding: groups, valence electrons, ordinary valences.

/// Coarse kind of an element.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Kind {
    /// Hydrogen.
    Hydrogen,
    /// Non-metals and half-metals of groups 13 to 16.
    NonMetal,
    /// Group 17.
    Halogen,
    /// Group 18.
    NobleGas,
    /// Groups 1 and 2 without hydrogen.
    SBlock,
    /// Groups 12 to 16: the metals there, whose bonds have ordinary valences.
    MainMetal,
    /// Groups 3 to 11, lanthanoids, actinoids and what follows them: no bond order is assigned.
    Transition,
}

/// Atomic numbers of the noble gases with 0 before them.
const NOBLE: [i32; 8] = [0, 2, 10, 18, 36, 54, 86, 118];

/// Group 1 to 18 of the periodic table; 0 for the f block (lanthanoids 57 to 70, actinoids 89 to 102).
pub(super) fn group(z: i32) -> i32 {
    let Some(shell) = NOBLE.windows(2).position(|pair| z > pair[0] && z <= pair[1]) else { return 0 };
    let (first, last) = (NOBLE[shell], NOBLE[shell + 1]);
    let (from_left, from_right) = (z - first, last - z);
    match shell {
        0 => {
            if z == 1 {
                1
            } else {
                18
            }
        }
        1 | 2 => {
            if from_left <= 2 {
                from_left
            } else {
                18 - from_right
            }
        }
        3 | 4 => from_left,
        _ if from_left <= 2 => from_left,
        _ if from_left <= 16 => 0,
        _ => 18 - from_right,
    }
}

/// Coarse kind of an element.
pub(super) fn kind(z: i32) -> Kind {
    match (z, group(z)) {
        (1, _) => Kind::Hydrogen,
        (5 | 6 | 7 | 8 | 14 | 15 | 16 | 32 | 33 | 34 | 51 | 52, _) => Kind::NonMetal,
        (_, 17) => Kind::Halogen,
        (_, 18) => Kind::NobleGas,
        (_, 1 | 2) => Kind::SBlock,
        (_, 12..=16) if z <= 86 => Kind::MainMetal,
        _ => Kind::Transition,
    }
}

/// True for metals of any block as far as bonding is concerned.
pub(super) fn is_metallic(z: i32) -> bool {
    matches!(kind(z), Kind::SBlock | Kind::MainMetal | Kind::Transition)
}

/// Atoms that share hydrogen or halogen atoms in bridges, and boron clusters: boron and the metals.
pub(super) fn is_electron_poor(z: i32) -> bool {
    z == 5 || is_metallic(z)
}

/// Valence electrons of a main-group element; group 12 counts 2, transition elements 0.
pub(super) fn valence_electrons(z: i32) -> i32 {
    match (kind(z), group(z)) {
        (Kind::Transition, _) => 0,
        (Kind::NobleGas, _) => {
            if z == 2 {
                2
            } else {
                8
            }
        }
        (_, 12) => 2,
        (_, g @ 13..=17) => g - 10,
        (_, g) => g,
    }
}

/// Valence without charge and without expansion: H 1, C 4, N 3, O 2, F 1, Na 1, Mg 2, Al 3.
pub(super) fn ordinary_valence(z: i32) -> i32 {
    match valence_electrons(z) {
        e @ 0..=4 => {
            if kind(z) == Kind::NobleGas {
                0
            } else {
                e
            }
        }
        e => 8 - e,
    }
}

/// Highest common positive charge of a metal (common practice, from memory).
pub(super) fn highest_charge(z: i32) -> i32 {
    match kind(z) {
        Kind::SBlock | Kind::MainMetal => valence_electrons(z),
        Kind::Transition => match (z, group(z)) {
            (27, _) => 4,
            (28 | 46, _) => 4,
            (29 | 47, _) => 3,
            (57..=70, _) => 4,
            (89..=102, _) => 7,
            (_, g @ 3..=8) => g,
            _ => 6,
        },
        _ => 0,
    }
}

/// Bonded partners that may be kept: those that are neither boron nor metal, and all together.
pub(super) fn most_partners(z: i32) -> (usize, usize) {
    match (kind(z), z) {
        // Hydrogen has a rule of its own.
        (Kind::Hydrogen, _) => (24, 24),
        (Kind::NobleGas, 2 | 10 | 18) => (0, 0),
        (Kind::NobleGas, _) => (8, 8),
        (Kind::Halogen, 9) => (1, 6),
        (Kind::Halogen, _) => (7, 7),
        (_, 5) => (4, 8),
        (_, 6 | 7) => (4, 8),
        (_, 8) => (3, 8),
        (_, 14 | 15 | 16 | 32 | 33 | 34) => (6, 10),
        (_, 51 | 52) => (8, 12),
        _ => (16, 24),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn groups_of_the_periodic_table() {
        for (z, expected) in [
            (1, 1),
            (2, 18),
            (3, 1),
            (4, 2),
            (5, 13),
            (9, 17),
            (12, 2),
            (13, 13),
            (19, 1),
            (21, 3),
            (26, 8),
            (30, 12),
            (31, 13),
            (35, 17),
            (47, 11),
            (54, 18),
            (56, 2),
            (57, 0),
            (70, 0),
            (71, 3),
            (72, 4),
            (80, 12),
            (82, 14),
            (86, 18),
            (92, 0),
            (103, 3),
            (117, 17),
            (118, 18),
        ] {
            assert_eq!(group(z), expected, "element {z}");
        }
        assert_eq!(kind(26), Kind::Transition);
        assert_eq!(kind(30), Kind::MainMetal);
        assert_eq!(ordinary_valence(7), 3);
        assert_eq!(ordinary_valence(13), 3);
    }
}

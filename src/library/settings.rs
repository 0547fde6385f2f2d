//! The settings of a run: what may be chosen, its default, and what it means.
//!
//! One list declares them; the catalogue, the C ABI and the command line take names, defaults and limits from it.

use crate::selectors::{self, Selector};
use crate::status::{Code, Failure};

/// What a setting holds, with its default.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Holds {
    /// A number: default, smallest, largest.
    Number(f64, f64, f64),
    /// A choice from a group of selectors: group, default, allowed ones (empty: the whole group).
    Choice(&'static str, Selector, &'static [Selector]),
    /// A text: default.
    Text(&'static str),
}

/// Declaration of one setting.
#[derive(Clone, Copy, Debug)]
pub struct Setting {
    /// Name, with the unit.
    pub name: &'static str,
    /// What it holds.
    pub holds: Holds,
    /// Unit, empty for none.
    pub unit: &'static str,
    /// Meaning, at most 80 characters.
    pub help: &'static str,
}

/// All settings.
pub static SETTINGS: &[Setting] = &[
    Setting {
        name: "charge_model",
        holds: Holds::Choice("charges", selectors::CHARGES_PEOE_1980, &[]),
        unit: "",
        help: "Model of the partial charges",
    },
    Setting {
        name: "electronegativity",
        holds: Holds::Choice("electronegativity", selectors::ELECTRONEGATIVITY_PAULING, &[]),
        unit: "",
        help: "Scale of electronegativity",
    },
    Setting {
        name: "ionic_law",
        holds: Holds::Choice("ionic_law", selectors::IONIC_PAULING_1960, &[]),
        unit: "",
        help: "Law of the ionic character of a bond",
    },
    Setting {
        name: "covalent_radii",
        holds: Holds::Choice(
            "radii",
            selectors::RADII_CORDERO_2008,
            &[selectors::RADII_CORDERO_2008, selectors::RADII_PYYKKO_SINGLE_2009],
        ),
        unit: "",
        help: "Covalent radii of single bonds",
    },
    Setting {
        name: "vdw_radii",
        holds: Holds::Choice("vdw_radii", selectors::VDW_MANTINA_2009, &[]),
        unit: "",
        help: "Van der Waals radii",
    },
    Setting {
        name: "polar_from",
        holds: Holds::Number(0.4, 0.0, 10.0),
        unit: "",
        help: "A bond is polar from this difference of electronegativity on",
    },
    Setting {
        name: "ionic_from",
        holds: Holds::Number(1.7, 0.0, 10.0),
        unit: "",
        help: "A bond to a metal is ionic from this difference of electronegativity on",
    },
    Setting {
        name: "polarity_limit_D",
        holds: Holds::Number(0.2, 1e-9, 1e6),
        unit: "D",
        help: "A molecule is polar above this dipole [D]",
    },
    Setting {
        name: "position_uncertainty_A",
        holds: Holds::Number(0.0, 0.0, 100.0),
        unit: "Å",
        help: "Standard uncertainty of coordinates [Å]; used with charges that have uncertainty",
    },
    Setting {
        name: "name_item",
        holds: Holds::Text(""),
        unit: "",
        help: "Data item that names the compound where a record has no title",
    },
    Setting {
        name: "carry_items",
        holds: Holds::Text(""),
        unit: "",
        help: "Data items to carry into columns data_..., separated by commas",
    },
];

/// The declaration of a setting.
///
/// # Errors
/// `UnknownName`.
pub fn setting(name: &str) -> Result<&'static Setting, Failure> {
    SETTINGS.iter().find(|setting| setting.name == name).ok_or(Failure::new(Code::UnknownName))
}

/// The settings of a run. The default is that of [`SETTINGS`].
#[derive(Clone, Debug, PartialEq)]
pub struct Settings {
    /// Model of the partial charges.
    pub charge_model: Selector,
    /// Scale of electronegativity.
    pub electronegativity: Selector,
    /// Law of the ionic character.
    pub ionic_law: Selector,
    /// Covalent radii of single bonds.
    pub covalent_radii: Selector,
    /// Van der Waals radii.
    pub vdw_radii: Selector,
    /// Δχ from which a bond is polar.
    pub polar_from: f64,
    /// Δχ from which a bond to a metal is ionic.
    pub ionic_from: f64,
    /// Dipole above which a molecule is polar [D].
    pub polarity_limit_d: f64,
    /// Standard uncertainty of every coordinate [Å].
    pub position_uncertainty_a: f64,
    /// Data item that names the compound of a record without a title.
    pub name_item: String,
    /// Data items carried into columns, separated by commas.
    pub carry_items: String,
}

impl Default for Settings {
    fn default() -> Self {
        Self {
            charge_model: selectors::CHARGES_PEOE_1980,
            electronegativity: selectors::ELECTRONEGATIVITY_PAULING,
            ionic_law: selectors::IONIC_PAULING_1960,
            covalent_radii: selectors::RADII_CORDERO_2008,
            vdw_radii: selectors::VDW_MANTINA_2009,
            polar_from: 0.4,
            ionic_from: 1.7,
            polarity_limit_d: 0.2,
            position_uncertainty_a: 0.0,
            name_item: String::new(),
            carry_items: String::new(),
        }
    }
}

impl Settings {
    /// Sets a number.
    ///
    /// # Errors
    /// `UnknownName`, `WrongType`, `Missing`, `NotFinite`, `OutOfRange`.
    pub fn set_number(&mut self, name: &str, value: f64) -> Result<(), Failure> {
        let Holds::Number(_, minimum, maximum) = setting(name)?.holds else {
            return Err(Failure::new(Code::WrongType));
        };
        if value.is_nan() {
            return Err(Failure::new(Code::Missing));
        }
        if value.is_infinite() {
            return Err(Failure::new(Code::NotFinite));
        }
        if !(minimum..=maximum).contains(&value) {
            return Err(Failure::new(Code::OutOfRange));
        }
        match name {
            "polar_from" => self.polar_from = value,
            "ionic_from" => self.ionic_from = value,
            "polarity_limit_D" => self.polarity_limit_d = value,
            "position_uncertainty_A" => self.position_uncertainty_a = value,
            _ => return Err(Failure::new(Code::UnknownName)),
        }
        Ok(())
    }

    /// Makes a choice.
    ///
    /// # Errors
    /// `UnknownName`, `WrongType`, `UnknownSelector`, `WrongSelector`, `NotAllowed` (of the right kind, but not here).
    pub fn set_choice(&mut self, name: &str, choice: Selector) -> Result<(), Failure> {
        let Holds::Choice(group, _, allowed) = setting(name)?.holds else {
            return Err(Failure::new(Code::WrongType));
        };
        let choice = choice.of_group(group)?;
        if !allowed.is_empty() && !allowed.contains(&choice) {
            return Err(Failure::new(Code::NotAllowed));
        }
        match name {
            "charge_model" => self.charge_model = choice,
            "electronegativity" => self.electronegativity = choice,
            "ionic_law" => self.ionic_law = choice,
            "covalent_radii" => self.covalent_radii = choice,
            "vdw_radii" => self.vdw_radii = choice,
            _ => return Err(Failure::new(Code::UnknownName)),
        }
        Ok(())
    }

    /// Sets a text.
    ///
    /// # Errors
    /// `UnknownName`, `WrongType`.
    pub fn set_text(&mut self, name: &str, value: &str) -> Result<(), Failure> {
        if !matches!(setting(name)?.holds, Holds::Text(_)) {
            return Err(Failure::new(Code::WrongType));
        }
        match name {
            "name_item" => self.name_item = value.trim().to_owned(),
            "carry_items" => self.carry_items = value.to_owned(),
            _ => return Err(Failure::new(Code::UnknownName)),
        }
        Ok(())
    }

    /// Sets anything from text, as a command line has it: a number, the name of a choice, or the text itself.
    ///
    /// # Errors
    /// `UnknownName` (of the setting or of the choice) and those of the three others.
    pub fn set_from_text(&mut self, name: &str, value: &str) -> Result<(), Failure> {
        match setting(name)?.holds {
            Holds::Number(..) => self.set_number(name, super::table::number_read(value)?),
            Holds::Choice(..) => self.set_choice(name, Selector::by_name(value)?),
            Holds::Text(_) => self.set_text(name, value),
        }
    }

    /// The value of a setting as text: the digits of a number, the name of a choice.
    ///
    /// # Errors
    /// `UnknownName`.
    pub fn text_of(&self, name: &str) -> Result<String, Failure> {
        Ok(match name {
            "charge_model" => self.charge_model.name().to_owned(),
            "electronegativity" => self.electronegativity.name().to_owned(),
            "ionic_law" => self.ionic_law.name().to_owned(),
            "covalent_radii" => self.covalent_radii.name().to_owned(),
            "vdw_radii" => self.vdw_radii.name().to_owned(),
            "polar_from" => super::table::number_text(self.polar_from),
            "ionic_from" => super::table::number_text(self.ionic_from),
            "polarity_limit_D" => super::table::number_text(self.polarity_limit_d),
            "position_uncertainty_A" => super::table::number_text(self.position_uncertainty_a),
            "name_item" => self.name_item.clone(),
            "carry_items" => self.carry_items.clone(),
            _ => return Err(Failure::new(Code::UnknownName)),
        })
    }

    /// Checks what no single setting shows.
    ///
    /// # Errors
    /// `OutOfRange` where `ionic_from` is below `polar_from`.
    pub fn check(&self) -> Result<(), Failure> {
        if self.ionic_from < self.polar_from { Err(Failure::new(Code::OutOfRange)) } else { Ok(()) }
    }

    /// The data items to carry, each once and in order, as (name of the item, name of its column). A column is named
    /// `data_` and the item, with `_` for what is neither letter nor digit; names that would be alike in lower case are
    /// told apart by `_2`, `_3`, …
    pub fn carried(&self) -> Vec<(String, String)> {
        let mut carried: Vec<(String, String)> = Vec::new();
        for item in self.carry_items.split(',').map(str::trim).filter(|item| !item.is_empty()) {
            if carried.iter().any(|(known, _)| known == item) {
                continue;
            }
            let plain: String = item.chars().map(|c| if c.is_alphanumeric() { c } else { '_' }).collect();
            let mut column = format!("data_{plain}");
            let mut count = 1;
            while carried.iter().any(|(_, known)| known.to_lowercase() == column.to_lowercase()) {
                count += 1;
                column = format!("data_{plain}_{count}");
            }
            carried.push((item.to_owned(), column));
        }
        carried
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_default_is_the_declared_one_and_every_setting_can_be_set() {
        let defaults = Settings::default();
        for setting in SETTINGS {
            let mut settings = Settings::default();
            assert!(setting.help.chars().count() <= 80, "{}", setting.name);
            let text = defaults.text_of(setting.name).unwrap();
            match setting.holds {
                Holds::Number(default, ..) => {
                    assert_eq!(text, super::super::table::number_text(default));
                    settings.set_number(setting.name, 0.25).unwrap();
                    assert_eq!(settings.text_of(setting.name).unwrap(), "0.25");
                }
                Holds::Choice(group, default, _) => {
                    assert_eq!(text, default.name());
                    assert_eq!(default.of_group(group), Ok(default));
                    settings.set_choice(setting.name, default).unwrap();
                }
                Holds::Text(default) => {
                    assert_eq!(text, default);
                    settings.set_text(setting.name, "x").unwrap();
                    assert_eq!(settings.text_of(setting.name).unwrap(), "x");
                }
            }
        }
    }

    #[test]
    fn what_cannot_be_set_says_why() {
        let mut settings = Settings::default();
        assert_eq!(settings.set_number("no_such", 1.0).unwrap_err().code, Code::UnknownName);
        assert_eq!(settings.set_number("vdw_radii", 1.0).unwrap_err().code, Code::WrongType);
        assert_eq!(settings.set_number("polarity_limit_D", 0.0).unwrap_err().code, Code::OutOfRange);
        assert_eq!(settings.set_choice("polar_from", selectors::VDW_BONDI_1964).unwrap_err().code, Code::WrongType);
        let wrong = settings.set_choice("vdw_radii", selectors::RADII_CORDERO_2008);
        assert_eq!(wrong.unwrap_err().code, Code::WrongSelector);
        let double = settings.set_choice("covalent_radii", selectors::RADII_PYYKKO_DOUBLE_2009);
        assert_eq!(double.unwrap_err().code, Code::NotAllowed);
        assert_eq!(settings, Settings::default());
    }

    #[test]
    fn carried_items_never_share_a_column() {
        let mut settings = Settings::default();
        settings.set_text("carry_items", " batch, Sample ,,batch,sample,boiling point,boiling_point").unwrap();
        let columns: Vec<String> = settings.carried().into_iter().map(|(_, column)| column).collect();
        let expected = ["data_batch", "data_Sample", "data_sample_2", "data_boiling_point", "data_boiling_point_2"];
        assert_eq!(columns, expected);
    }
}

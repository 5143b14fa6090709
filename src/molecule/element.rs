//! Elements a compound may hold, and the facts of each that no rule may change.
//!
//! Hydrogen is not among them: hydrogens are counts on their atoms (see
//! [`Atom`](super::Atom)), so a graph never holds one.
//!
//! # Source
//! Standard atomic weights: IUPAC Commission on Isotopic Abundances and Atomic Weights,
//! abridged to five figures, Pure Appl. Chem. 94, 573 (2022). Masses of the lightest
//! abundant isotopes: Atomic Mass Evaluation 2020, Chinese Phys. C 45, 030003 (2021).

use std::fmt;

/// One of the elements of chemistry's halogenated corner, in order of atomic number.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[allow(missing_docs)]
pub enum Element {
    B,
    C,
    N,
    O,
    F,
    Si,
    P,
    S,
    Cl,
    Br,
    I,
}

/// A halogen, in order of atomic number. Its number `as usize` indexes arrays of four.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
#[allow(missing_docs)]
pub enum Halogen {
    F,
    Cl,
    Br,
    I,
}

/// Standard atomic weight of hydrogen, g/mol.
pub const HYDROGEN_MOLAR_MASS_G_PER_MOL: f64 = 1.008;
/// Mass of 1H, u.
pub const HYDROGEN_MONOISOTOPIC_MASS_U: f64 = 1.007_825_031_9;

impl Element {
    /// Every element, in order of atomic number.
    pub const ALL: [Element; 11] = [
        Element::B,
        Element::C,
        Element::N,
        Element::O,
        Element::F,
        Element::Si,
        Element::P,
        Element::S,
        Element::Cl,
        Element::Br,
        Element::I,
    ];

    /// The symbol as IUPAC writes it.
    pub fn symbol(self) -> &'static str {
        match self {
            Element::B => "B",
            Element::C => "C",
            Element::N => "N",
            Element::O => "O",
            Element::F => "F",
            Element::Si => "Si",
            Element::P => "P",
            Element::S => "S",
            Element::Cl => "Cl",
            Element::Br => "Br",
            Element::I => "I",
        }
    }

    /// The element with this symbol, case and all.
    pub fn from_symbol(symbol: &str) -> Option<Element> {
        Element::ALL.into_iter().find(|e| e.symbol() == symbol)
    }

    /// Atomic number.
    pub fn atomic_number(self) -> u8 {
        match self {
            Element::B => 5,
            Element::C => 6,
            Element::N => 7,
            Element::O => 8,
            Element::F => 9,
            Element::Si => 14,
            Element::P => 15,
            Element::S => 16,
            Element::Cl => 17,
            Element::Br => 35,
            Element::I => 53,
        }
    }

    /// The element's name in running text, lower case.
    pub fn name(self) -> &'static str {
        match self {
            Element::B => "boron",
            Element::C => "carbon",
            Element::N => "nitrogen",
            Element::O => "oxygen",
            Element::F => "fluorine",
            Element::Si => "silicon",
            Element::P => "phosphorus",
            Element::S => "sulfur",
            Element::Cl => "chlorine",
            Element::Br => "bromine",
            Element::I => "iodine",
        }
    }

    /// Standard atomic weight, g/mol, five figures.
    pub fn molar_mass_g_per_mol(self) -> f64 {
        match self {
            Element::B => 10.81,
            Element::C => 12.011,
            Element::N => 14.007,
            Element::O => 15.999,
            Element::F => 18.998,
            Element::Si => 28.085,
            Element::P => 30.974,
            Element::S => 32.06,
            Element::Cl => 35.45,
            Element::Br => 79.904,
            Element::I => 126.90,
        }
    }

    /// Mass of the lightest abundant isotope (of boron: the most abundant), u.
    pub fn monoisotopic_mass_u(self) -> f64 {
        match self {
            Element::B => 11.009_305_17,
            Element::C => 12.0,
            Element::N => 14.003_074_004_25,
            Element::O => 15.994_914_619_26,
            Element::F => 18.998_403_162_07,
            Element::Si => 27.976_926_534_42,
            Element::P => 30.973_761_997_68,
            Element::S => 31.972_071_173_54,
            Element::Cl => 34.968_852_694,
            Element::Br => 78.918_337_601,
            Element::I => 126.904_471_9,
        }
    }

    /// The halogen this element is, if it is one.
    pub fn halogen(self) -> Option<Halogen> {
        match self {
            Element::F => Some(Halogen::F),
            Element::Cl => Some(Halogen::Cl),
            Element::Br => Some(Halogen::Br),
            Element::I => Some(Halogen::I),
            _ => None,
        }
    }
}

impl Halogen {
    /// The four halogens, lightest first.
    pub const ALL: [Halogen; 4] = [Halogen::F, Halogen::Cl, Halogen::Br, Halogen::I];

    /// The halogen as an element.
    pub fn element(self) -> Element {
        match self {
            Halogen::F => Element::F,
            Halogen::Cl => Element::Cl,
            Halogen::Br => Element::Br,
            Halogen::I => Element::I,
        }
    }

    /// Name of the halide ion, lower case.
    pub fn ion_name(self) -> &'static str {
        match self {
            Halogen::F => "fluoride",
            Halogen::Cl => "chloride",
            Halogen::Br => "bromide",
            Halogen::I => "iodide",
        }
    }
}

impl fmt::Display for Element {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.symbol())
    }
}

impl fmt::Display for Halogen {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.element().symbol())
    }
}

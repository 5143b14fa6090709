//! Molecular formula in Hill order, and the masses that follow from it.
//!
//! # Source
//! Hill order: E. A. Hill, J. Am. Chem. Soc. 22, 478 (1900). Masses: see [`element`](super::element).

use std::fmt;

use super::element::{Element, HYDROGEN_MOLAR_MASS_G_PER_MOL, HYDROGEN_MONOISOTOPIC_MASS_U};
use super::graph::Molecule;

/// Counts of atoms by element, and the charge.
#[derive(Debug, Clone, PartialEq, Eq, Hash, Default)]
pub struct Formula {
    counts: [u32; Element::ALL.len()],
    n_hydrogens: u32,
    charge: i32,
}

impl Molecule {
    /// Formula of the molecule.
    pub fn formula(&self) -> Formula {
        let mut formula = Formula::default();
        for atom in self.atoms() {
            formula.counts[atom.element as usize] += 1;
            formula.n_hydrogens += u32::from(atom.n_hydrogens);
            formula.charge += i32::from(atom.charge);
        }
        formula
    }
}

impl Formula {
    /// Number of atoms of an element.
    pub fn count(&self, element: Element) -> u32 {
        self.counts[element as usize]
    }

    /// Number of hydrogens.
    pub fn n_hydrogens(&self) -> u32 {
        self.n_hydrogens
    }

    /// Net charge in elementary charges.
    pub fn charge(&self) -> i32 {
        self.charge
    }

    /// Molar mass, g/mol, from abridged standard atomic weights.
    pub fn molar_mass_g_per_mol(&self) -> f64 {
        self.sum(HYDROGEN_MOLAR_MASS_G_PER_MOL, Element::molar_mass_g_per_mol)
    }

    /// Mass of the molecule made of the lightest abundant isotopes, u.
    pub fn monoisotopic_mass_u(&self) -> f64 {
        self.sum(HYDROGEN_MONOISOTOPIC_MASS_U, Element::monoisotopic_mass_u)
    }

    fn sum(&self, hydrogen: f64, of: impl Fn(Element) -> f64) -> f64 {
        let heavy: f64 = Element::ALL.iter().map(|&e| f64::from(self.count(e)) * of(e)).sum();
        heavy + f64::from(self.n_hydrogens) * hydrogen
    }

    /// Symbols and counts in Hill order: carbon, hydrogen, then the rest by alphabet; without
    /// carbon, all by alphabet.
    fn hill(&self) -> Vec<(&'static str, u32)> {
        let mut parts: Vec<(&'static str, u32)> = Element::ALL.iter().map(|&e| (e.symbol(), self.count(e))).collect();
        parts.push(("H", self.n_hydrogens));
        parts.retain(|&(_, n)| n > 0);
        let has_carbon = self.count(Element::C) > 0;
        parts.sort_by_key(|&(symbol, _)| match symbol {
            "C" if has_carbon => (0, symbol),
            "H" if has_carbon => (1, symbol),
            _ => (2, symbol),
        });
        parts
    }
}

impl fmt::Display for Formula {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        for (symbol, n) in self.hill() {
            if n == 1 { write!(f, "{symbol}")? } else { write!(f, "{symbol}{n}")? }
        }
        match self.charge {
            0 => Ok(()),
            1 => f.write_str("+"),
            -1 => f.write_str("-"),
            n if n > 0 => write!(f, "+{n}"),
            n => write!(f, "{n}"),
        }
    }
}

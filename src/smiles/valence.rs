//! Valences: the hydrogens that an atom without brackets implies, and which atoms are sound.
//!
//! Sound means a closed shell. A charged atom takes the valences of the uncharged atom with
//! as many valence electrons (N+ those of carbon, O- that of fluorine). An uncharged carbon
//! with two bonds is a carbene, and sound as well.
//!
//! # Source
//! Implied hydrogens: OpenSMILES 1.0, section 3.1.5 (the smallest normal valence that is not
//! below the bonds written). Closed shells: the octet rule, with 10 and 12 electrons for
//! elements of the third period and below.

use crate::molecule::{Atom, Element, Molecule};

use super::error::ReadErrorKind;

/// All the hydrogens that an atom has if it is written without brackets and `n_written`
/// hydrogens as `[H]`, its other bonds kept; none if it cannot be written so.
pub(super) fn implied_hydrogens(molecule: &Molecule, atom: usize, n_written: u8) -> Option<u8> {
    let Atom { element, charge, n_hydrogens, .. } = molecule.atom(atom);
    if charge != 0 {
        return None;
    }
    let bonds = molecule.valence_used(atom).checked_sub(u32::from(n_hydrogens))?;
    let used = bonds + u32::from(n_written);
    let valence = normal_valences(element).iter().find(|&&v| v >= used)?;
    u8::try_from(valence - bonds).ok()
}

/// Valences of uncharged atoms that need no brackets.
fn normal_valences(element: Element) -> &'static [u32] {
    match element {
        Element::B => &[3],
        Element::C => &[4],
        Element::N | Element::P => &[3, 5],
        Element::O => &[2],
        Element::S => &[2, 4, 6],
        Element::F | Element::Cl | Element::Br | Element::I => &[1],
        Element::Si => &[],
    }
}

/// Says what is wrong with the number of bonds and the charge of an atom.
///
/// # Errors
/// * no closed shell has so many bonds at this charge
pub(super) fn check(molecule: &Molecule, atom: usize) -> Result<(), ReadErrorKind> {
    let Atom { element, charge, .. } = molecule.atom(atom);
    let bonds = molecule.valence_used(atom);
    let sound = sound_valences(element, charge);
    let Some(&most) = sound.last() else { return Err(ReadErrorKind::Charge { element, charge }) };
    if sound.contains(&bonds) || molecule.is_carbene(atom) {
        return Ok(());
    }
    Err(if bonds > most {
        ReadErrorKind::TooManyBonds { element, bonds, charge }
    } else {
        ReadErrorKind::TooFewBonds { element, bonds, charge }
    })
}

/// Valences of closed shells, ascending; none if the charge is out of reach.
fn sound_valences(element: Element, charge: i8) -> &'static [u32] {
    let (electrons, holds_octet) = match element {
        Element::B => (3, true),
        Element::C => (4, true),
        Element::N => (5, true),
        Element::O => (6, true),
        Element::F => (7, true),
        Element::Si => (4, false),
        Element::P => (5, false),
        Element::S => (6, false),
        Element::Cl | Element::Br | Element::I => (7, false),
    };
    match (electrons - charge, holds_octet) {
        (3, _) | (5, true) => &[3],
        (4, _) => &[4],
        (5, false) => &[3, 5],
        (6, true) => &[2],
        (6, false) => &[2, 4, 6],
        (7, true) => &[1],
        (7, false) => &[1, 3, 5, 7],
        (8, _) => &[0],
        _ => &[],
    }
}

//! Molecules for tests, drawn in a few letters and independent of the program's own reader.
//!
//! Uncharged atoms with implied hydrogens, branches, one-digit rings, `=` and `#`; no
//! configuration. Six-rings are made aromatic as the program does.

use haloshed::molecule::aromatic::perceive;
use haloshed::molecule::{Atom, BondOrder, Element, Identity, Molecule};

/// The molecule of a drawing such as `ClC=C(Cl)C1CC1`.
pub(crate) fn draw(drawing: &str) -> Molecule {
    let mut molecule = Molecule::new();
    let (mut stack, mut last, mut order) = (Vec::new(), None, BondOrder::Single);
    let mut rings: Vec<(char, usize, BondOrder)> = Vec::new();
    let mut letters = drawing.chars().peekable();
    while let Some(c) = letters.next() {
        match c {
            '(' => stack.push(last),
            ')' => last = stack.pop().unwrap(),
            '=' => order = BondOrder::Double,
            '#' => order = BondOrder::Triple,
            '1'..='9' => {
                let here = last.unwrap();
                match rings.iter().position(|&(digit, _, _)| digit == c) {
                    Some(open) => {
                        let (_, there, opened) = rings.remove(open);
                        molecule.add_bond(there, here, order.max(opened));
                    }
                    None => rings.push((c, here, order)),
                }
                order = BondOrder::Single;
            }
            _ => {
                let symbol = letters.next_if(|l| l.is_lowercase()).map_or(c.to_string(), |l| format!("{c}{l}"));
                let atom = molecule.add_atom(Atom::neutral(Element::from_symbol(&symbol).unwrap(), 0));
                if let Some(before) = last {
                    molecule.add_bond(before, atom, order);
                }
                (last, order) = (Some(atom), BondOrder::Single);
            }
        }
    }
    add_hydrogens(&mut molecule);
    perceive(&mut molecule);
    molecule
}

fn add_hydrogens(molecule: &mut Molecule) {
    for atom in 0..molecule.n_atoms() {
        let valence = match molecule.atom(atom).element {
            Element::C | Element::Si => 4,
            Element::N | Element::P | Element::B => 3,
            Element::O | Element::S => 2,
            _ => 1,
        };
        let hydrogens = valence - molecule.valence_used(atom);
        molecule.atom_mut(atom).n_hydrogens = u8::try_from(hydrogens).unwrap();
    }
}

/// The isomers of a drawing, in the order of their codes.
pub(crate) fn isomers(drawing: &str, identity: Identity) -> Vec<Molecule> {
    draw(drawing).isomers(identity, 4096).unwrap()
}

//! Condensed structural formulas of acyclic molecules: `cis-CHCl=CHCl`, `CH3CH(CH3)CH2Cl`.
//!
//! The longest carbon chain with most halogens is written from the end with fewer foreign
//! groups and more hydrogens; of texts that are still alike the last by alphabet is taken.
//! Halogens follow the alphabet. A carbene has a colon for its lone pair. Geometry stands in
//! front: cis or trans where each end of the only stereo double bond holds one hydrogen, else E
//! and Z in chain order, Z before E where the chain reads alike from both ends.
//!
//! Invariant: the formula does not depend on the order of atoms, and holds every atom.

use std::cmp::{Ordering, Reverse};
use std::fmt::Write;

use super::element::Element;
use super::graph::{BondOrder, Geometry, Ligand, Molecule};
use super::priority::compare;

/// Most atoms, hydrogens not counted, of a formula that is still read.
const MOST_ATOMS: usize = 80;

/// The condensed formula; none for rings, for charges but those of a nitro group, for more than
/// 80 atoms besides hydrogen, and where E and Z cannot be told by atomic numbers alone or would
/// stand on side chains.
///
/// # Example
/// ```
/// use haloshed::molecule::condensed::condensed;
///
/// let cis = haloshed::smiles::read(r"Cl/C=C\Cl")?;
/// assert_eq!(condensed(&cis).as_deref(), Some("cis-CHCl=CHCl"));
/// # Ok::<(), haloshed::smiles::ReadError>(())
/// ```
pub fn condensed(molecule: &Molecule) -> Option<String> {
    let is_carbon = |atom: usize| molecule.atom(atom).element == Element::C;
    let carbons: Vec<usize> = (0..molecule.n_atoms()).filter(|&a| is_carbon(a)).collect();
    let n_atoms = molecule.n_atoms();
    if n_atoms > MOST_ATOMS || molecule.n_bonds() >= n_atoms || carbons.is_empty() {
        return None;
    }
    if let Some(name) = one_carbon_oxide(molecule) {
        return Some(name.to_owned());
    }
    if !(0..n_atoms).all(|atom| molecule.atom(atom).charge == 0 || is_in_nitro(molecule, atom)) {
        return None;
    }
    let chains = carbons.iter().flat_map(|&start| longest_chains(molecule, start, None));
    let rank = |chain: &[usize]| {
        let n_halogens: usize = chain.iter().map(|&atom| n_halogens(molecule, atom)).sum();
        let hydrogens: Vec<u8> = chain.iter().map(|&atom| molecule.atom(atom).n_hydrogens).collect();
        (chain.len(), n_halogens, Reverse(n_foreign(molecule, chain[0])), hydrogens, text(molecule, chain, None))
    };
    let (_, best) = chains.fold((None, Vec::new()), |(best_rank, mut best), chain| {
        let rank = Some(rank(&chain));
        match rank.cmp(&best_rank) {
            Ordering::Less => (best_rank, best),
            Ordering::Equal => {
                best.push(chain);
                (best_rank, best)
            }
            Ordering::Greater => (rank, vec![chain]),
        }
    });
    // Chains that read alike may differ in geometry: Z is written before E.
    let prefix = best.iter().filter_map(|chain| geometry(molecule, chain)).max()?;
    Some(prefix + &text(molecule, best.first()?, None))
}

fn one_carbon_oxide(molecule: &Molecule) -> Option<&'static str> {
    let formula = molecule.formula();
    match (molecule.n_atoms(), formula.to_string().as_str()) {
        (2, "CO") => Some("CO"),
        (2, "CH2O") => Some("HCHO"),
        _ => None,
    }
}

fn is_in_nitro(molecule: &Molecule, atom: usize) -> bool {
    let is_nitrogen = |n: usize| molecule.atom(n).element == Element::N && molecule.atom(n).charge == 1;
    match molecule.atom(atom).element {
        Element::N => nitro_oxygens(molecule, atom) == 2,
        Element::O => molecule.neighbours(atom).any(|(n, _, _)| is_nitrogen(n) && nitro_oxygens(molecule, n) == 2),
        _ => false,
    }
}

fn nitro_oxygens(molecule: &Molecule, nitrogen: usize) -> usize {
    let is_bare = |n: usize| molecule.atom(n).element == Element::O && molecule.degree(n) == 1;
    let is_nitrogen = molecule.atom(nitrogen).charge == 1;
    molecule.neighbours(nitrogen).filter(|&(n, _, _)| is_bare(n) && is_nitrogen).count()
}

/// Neighbours that are neither carbon nor a halogen that could leave.
fn n_foreign(molecule: &Molecule, atom: usize) -> usize {
    let foreign = |n: usize| molecule.atom(n).element != Element::C && molecule.leaving_halogen(n).is_none();
    molecule.neighbours(atom).filter(|&(n, _, _)| foreign(n)).count()
}

fn n_halogens(molecule: &Molecule, atom: usize) -> usize {
    molecule.neighbours(atom).filter(|&(n, _, _)| molecule.leaving_halogen(n).is_some()).count()
}

/// The longest carbon chains that start at an atom and lead away from `from`.
fn longest_chains(molecule: &Molecule, start: usize, from: Option<usize>) -> Vec<Vec<usize>> {
    let onward = molecule.neighbours(start).map(|(n, _, _)| n);
    let carbons = onward.filter(|&n| Some(n) != from && molecule.atom(n).element == Element::C);
    let tails: Vec<Vec<usize>> = carbons.flat_map(|n| longest_chains(molecule, n, Some(start))).collect();
    let longest = tails.iter().map(Vec::len).max().unwrap_or(0);
    if longest == 0 {
        return vec![vec![start]];
    }
    let kept = tails.into_iter().filter(|tail| tail.len() == longest);
    kept.map(|tail| [vec![start], tail].concat()).collect()
}

/// A chain with its branches. `from` is the atom it hangs on.
fn text(molecule: &Molecule, chain: &[usize], from: Option<usize>) -> String {
    let mut out = String::new();
    for (index, &atom) in chain.iter().enumerate() {
        let before = if index == 0 { from } else { Some(chain[index - 1]) };
        let after = chain.get(index + 1).copied();
        if let (true, Some(before)) = (index > 0, before) {
            out.push_str(symbol(order_between(molecule, before, atom)));
        }
        out.push_str(&atom_text(molecule, atom, [before, after], index == 0 && from.is_none()));
    }
    out
}

fn order_between(molecule: &Molecule, a: usize, b: usize) -> BondOrder {
    molecule.bond_between(a, b).map_or(BondOrder::Single, |bond| molecule.bond(bond).2)
}

fn symbol(order: BondOrder) -> &'static str {
    match order {
        BondOrder::Double => "=",
        BondOrder::Triple => "≡",
        BondOrder::Single | BondOrder::Aromatic => "",
    }
}

/// An atom with its hydrogens, halogens and branches.
fn atom_text(molecule: &Molecule, atom: usize, besides: [Option<usize>; 2], is_first: bool) -> String {
    let is_carbene = molecule.is_carbene(atom);
    let mut out =
        if is_carbene && is_first { ":C".to_owned() } else { molecule.atom(atom).element.symbol().to_owned() };
    push_counted(&mut out, "H", usize::from(molecule.atom(atom).n_hydrogens));
    let around: Vec<(usize, BondOrder)> = molecule
        .neighbours(atom)
        .filter(|&(n, _, _)| !besides.contains(&Some(n)))
        .map(|(n, order, _)| (n, order))
        .collect();
    let is_last = besides[1].is_none();
    push_counted(&mut out, "O", around.iter().filter(|&&(n, order)| is_oxo(molecule, n, order)).count());
    for element in [Element::Br, Element::Cl, Element::F, Element::I] {
        let n = around
            .iter()
            .filter(|&&(n, _)| molecule.leaving_halogen(n).map(super::element::Halogen::element) == Some(element))
            .count();
        push_counted(&mut out, element.symbol(), n);
    }
    let mut branches: Vec<String> = around
        .iter()
        .filter(|&&(n, order)| molecule.leaving_halogen(n).is_none() && !is_oxo(molecule, n, order))
        .map(|&(n, order)| branch_text(molecule, n, atom, order))
        .collect();
    branches.sort_by_key(|b| (b.len(), b.clone()));
    push_branches(&mut out, &branches, is_last);
    if is_carbene && !is_first {
        out.push(':');
    }
    out
}

fn is_oxo(molecule: &Molecule, atom: usize, order: BondOrder) -> bool {
    molecule.atom(atom).element == Element::O && order == BondOrder::Double
}

/// A branch from its first atom on, with the bond that leads to it.
fn branch_text(molecule: &Molecule, start: usize, from: usize, order: BondOrder) -> String {
    if molecule.atom(start).element == Element::N && order == BondOrder::Triple {
        return "N".to_owned();
    }
    if molecule.atom(start).element == Element::N && nitro_oxygens(molecule, start) == 2 {
        return "NO2".to_owned();
    }
    let body = if molecule.atom(start).element == Element::C {
        let chains = longest_chains(molecule, start, Some(from));
        chains.iter().map(|chain| text(molecule, chain, Some(from))).max().unwrap_or_default()
    } else {
        atom_text(molecule, start, [Some(from), None], false)
    };
    format!("{}{body}", symbol(order))
}

/// Adds branches, equal ones counted; one at the end of a chain needs no parentheses.
fn push_branches(out: &mut String, branches: &[String], is_end: bool) {
    let mut next = 0;
    while next < branches.len() {
        let n = branches[next..].iter().take_while(|b| **b == branches[next]).count();
        let is_plain = is_end && next + n == branches.len() && n == 1;
        if is_plain {
            out.push_str(&branches[next]);
        } else {
            out.push('(');
            out.push_str(&branches[next]);
            push_counted(out, ")", n);
        }
        next += n;
    }
}

fn push_counted(out: &mut String, what: &str, n: usize) {
    match n {
        0 => {}
        1 => out.push_str(what),
        _ => drop(write!(out, "{what}{n}")),
    }
}

/// The prefix that tells the geometry; none if it can't be told, or if one of several stereo
/// double bonds is off the chain, as a row of letters would not say which is which.
fn geometry(molecule: &Molecule, chain: &[usize]) -> Option<String> {
    let place = |bond: usize| {
        let (a, b, _) = molecule.bond(bond);
        let at = |atom: usize| chain.iter().position(|&c| c == atom).unwrap_or(usize::MAX);
        (at(a).min(at(b)), at(a).max(at(b)))
    };
    let mut given: Vec<usize> = (0..molecule.n_bonds()).filter(|&b| molecule.geometry(b).is_some()).collect();
    given.sort_by_key(|&bond| place(bond));
    match given.as_slice() {
        [] => Some(String::new()),
        [only] if ends_hold_one_hydrogen(molecule, *only) => {
            let (a, b, _) = molecule.bond(*only);
            let at_a = molecule.reference_ligand(a, b)?;
            let at_b = molecule.reference_ligand(b, a)?;
            let cis = molecule.geometry_between(*only, at_a, at_b)? == Geometry::Cis;
            Some(if cis { "cis-" } else { "trans-" }.to_owned())
        }
        several if several.len() > 1 && several.iter().any(|&bond| place(bond).1 == usize::MAX) => None,
        several => {
            let letters: Option<Vec<&str>> = several.iter().map(|&bond| e_or_z(molecule, bond)).collect();
            Some(format!("({})-", letters?.join(",")))
        }
    }
}

fn ends_hold_one_hydrogen(molecule: &Molecule, bond: usize) -> bool {
    let (a, b, _) = molecule.bond(bond);
    molecule.atom(a).n_hydrogens == 1 && molecule.atom(b).n_hydrogens == 1
}

fn e_or_z(molecule: &Molecule, bond: usize) -> Option<&'static str> {
    let (a, b, _) = molecule.bond(bond);
    let (at_a, at_b) = (higher_ligand(molecule, a, b)?, higher_ligand(molecule, b, a)?);
    Some(if molecule.geometry_between(bond, at_a, at_b)? == Geometry::Cis { "Z" } else { "E" })
}

/// The higher-ranking ligand of a double bond's end.
fn higher_ligand(molecule: &Molecule, end: usize, other: usize) -> Option<Ligand> {
    let ligands: Vec<Ligand> = molecule.ligands(end).into_iter().filter(|&l| l != Ligand::Neighbour(other)).collect();
    match ligands.as_slice() {
        [one] => Some(*one),
        [one, two] => match compare(molecule, end, *one, *two) {
            Ordering::Greater => Some(*one),
            Ordering::Less => Some(*two),
            Ordering::Equal => None,
        },
        _ => None,
    }
}

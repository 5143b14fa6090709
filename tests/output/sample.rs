//! Networks to write: real structures and steps, **invented** energies.
//!
//! Compounds and steps come from the enumeration; names are few; energies follow a made-up
//! rule, so that the writers can be tested without the thermochemistry. No number here is
//! chemistry, but E' follows from E° by Nernst.

use haloshed::molecule::{BondOrder, Element, Formula, Geometry, Identity, Ligand, Molecule};
use haloshed::network::{Limits, Network, Outcome, enumerate};
use haloshed::output::record::{
    self, ByHalogen, Caution, Compound, Conditions, FORMAT, GibbsOrigin, Header, Program, Step,
};
use haloshed::rules::RuleSet;
use haloshed::rules::library::Selection;
use haloshed::smiles;

/// The network of a compound by the default rules.
pub(crate) fn network_of(parent: &str) -> record::Network {
    limited_network_of(parent, &Selection::default(), Limits::default())
}

/// The network of a compound by chosen rules within limits.
pub(crate) fn limited_network_of(parent: &str, selection: &Selection, limits: Limits) -> record::Network {
    let rules = RuleSet::shipped().select(selection).unwrap();
    let parent = smiles::read(parent).unwrap();
    let network = enumerate(&[parent], &rules, Identity::Geometric, limits, 1).unwrap();
    let names: Vec<String> = rules.iter().map(|rule| rule.name.clone()).collect();
    let is_complete = network.outcome() == Outcome::Complete;
    let warnings = if is_complete { vec![] } else { vec!["a limit was reached (invented wording)".to_owned()] };
    let halide_mol_per_litre = ByHalogen { fluorine: 1e-3, chlorine: 1e-3, bromine: 1e-3, iodine: 1e-3 };
    let molecules: Vec<Molecule> = (0..network.n_compounds() as u32).map(|id| network.molecule(id)).collect();
    let compounds = molecules.iter().enumerate().map(|(i, m)| compound(&network, i as u32, m)).collect();
    let steps = network.steps().map(|s| {
        let molecules_in = if names[s.rule] == "coupling" { 2 } else { 1 };
        step(&s, &names[s.rule], molecules_in, &molecules)
    });
    record::Network {
        header: Header {
            format: FORMAT.to_owned(),
            program: Program { name: "haloshed".to_owned(), version: "0.0.0-sample".to_owned() },
            parents: network.parents().map(|id| id + 1).collect(),
            identity: record::Identity::Geometric,
            conditions: Conditions { temperature_kelvin: 298.15, ph: 7.0, halide_mol_per_litre },
            rules: names.clone(),
            complete: is_complete,
            warnings,
        },
        steps: steps.collect(),
        compounds,
    }
}

fn compound(network: &Network, id: u32, molecule: &Molecule) -> Compound {
    let smiles = smiles::write(molecule);
    let formula = molecule.formula();
    let n_halogens: u32 = molecule.halogens().iter().sum();
    let known = KNOWN.iter().find(|(known, ..)| smiles::write(&smiles::read(known).unwrap()) == smiles);
    let text = |t: Option<&&str>| t.filter(|t| !t.is_empty()).map(|t| (*t).to_owned()).into_iter().collect();
    let is_expanded = network.is_expanded(id);
    Compound {
        id: id + 1,
        condensed: condensed(molecule).unwrap_or_else(|| smiles.clone()),
        names: text(known.map(|(_, name, _)| name)),
        abbreviations: text(known.map(|(_, _, short)| short)),
        cas: None,
        generation: network.generation_of(id) as u32,
        is_parent: network.parents().contains(&id),
        is_end_product: is_expanded && network.steps_from(id).len() == 0,
        transient: (0..molecule.n_atoms()).any(|atom| molecule.is_carbene(atom)),
        halogens: halogens(molecule),
        molar_mass_g_per_mol: formula.molar_mass_g_per_mol(),
        monoisotopic_mass_u: formula.monoisotopic_mass_u(),
        formula: formula.to_string(),
        gibbs_aq_kj_per_mol: Some(60.0 - 21.5 * f64::from(n_halogens) - 0.1 * f64::from(id)),
        gibbs_sd_kj_per_mol: Some(if known.is_some() { 1.2 } else { 3.7 }),
        gibbs_origin: if known.is_some() { GibbsOrigin::Measured } else { GibbsOrigin::Estimated },
        gibbs_source: "invented for tests".to_owned(),
        cautions: if smiles == "C=CCl" {
            vec![Caution { text: "causes cancer in humans".to_owned(), source: "IARC, Group 1".to_owned() }]
        } else {
            vec![]
        },
        smiles,
    }
}

fn halogens(molecule: &Molecule) -> ByHalogen<u32> {
    let [fluorine, chlorine, bromine, iodine] = molecule.halogens();
    ByHalogen { fluorine, chlorine, bromine, iodine }
}

/// A step, its reagents from the difference of the formulas.
fn step(step: &haloshed::network::Step, rule: &str, molecules_in: u32, molecules: &[Molecule]) -> Step {
    let (from, to) = (&molecules[step.from as usize], &molecules[step.to as usize]);
    let lost = |n: u32, m: u32| n * molecules_in - m;
    let (a, b) = (halogens(from), halogens(to));
    let released = ByHalogen {
        fluorine: lost(a.fluorine, b.fluorine),
        chlorine: lost(a.chlorine, b.chlorine),
        bromine: lost(a.bromine, b.bromine),
        iodine: lost(a.iodine, b.iodine),
    };
    let n_released = released.pairs().iter().map(|&(_, n)| n.cast_signed()).sum::<i32>();
    let gained = |count: fn(&Formula) -> u32| {
        count(&to.formula()).cast_signed() - molecules_in.cast_signed() * count(&from.formula()).cast_signed()
    };
    let water = gained(|f| f.count(Element::O));
    let protons = gained(Formula::n_hydrogens) - 2 * water;
    let electrons = protons + n_released;
    let has_potential = electrons != 0;
    let e_standard = 0.45 + 0.07 * f64::from(n_released) + 0.013 * f64::from(step.index as u32 % 11);
    let shift = 0.05916 / 2.0 * (3.0 * f64::from(n_released) - 7.0 * f64::from(protons));
    let sd = 0.018 + 0.004 * f64::from(step.index as u32 % 5);
    Step {
        id: step.index as u32 + 1,
        from: step.from + 1,
        to: step.to + 1,
        rule: rule.to_owned(),
        degeneracy: step.degeneracy.to_f64(),
        molecules: molecules_in,
        electrons,
        protons,
        water,
        released,
        e_standard_volt: has_potential.then_some(e_standard),
        e_volt: has_potential.then_some(e_standard + shift),
        e_sd_volt: has_potential.then_some(sd),
        e_missing: (!has_potential).then(|| "no electron is transferred".to_owned()),
        gibbs_step_kj_per_mol: (!has_potential).then_some(-150.0 - f64::from(step.index as u32)),
        gibbs_step_sd_kj_per_mol: (!has_potential).then_some(6.0),
    }
}

/// A condensed formula of an open chain of carbons with halogens and hydrogens; none for others.
fn condensed(molecule: &Molecule) -> Option<String> {
    let carbons: Vec<usize> = (0..molecule.n_atoms()).filter(|&a| molecule.atom(a).element == Element::C).collect();
    let next = |a: usize| molecule.neighbours(a).filter(|(n, _, _)| carbons.contains(n)).map(|(n, ..)| n);
    let is_plain = molecule.atoms().all(|a| a.element == Element::C || a.element.halogen().is_some());
    if !is_plain || carbons.iter().any(|&a| next(a).count() > 2) {
        return None;
    }
    let mut chain = vec![*carbons.iter().find(|&&a| next(a).count() <= 1)?];
    while let Some(n) = next(*chain.last()?).find(|n| !chain.contains(n)) {
        chain.push(n);
    }
    let mut text = String::new();
    for (i, &atom) in chain.iter().enumerate() {
        if i > 0 {
            let bond = molecule.bond_between(chain[i - 1], atom)?;
            let (order, (a, b, _)) = (molecule.bond(bond).2, molecule.bond(bond));
            if molecule.geometry(bond).is_some() {
                text = format!("{}{text}", side(molecule, bond, a, b)?);
            }
            text.push_str(match order {
                BondOrder::Double => "=",
                BondOrder::Triple => "≡",
                _ => "",
            });
        }
        text.push_str(&group(molecule, atom));
    }
    Some(text)
}

fn side(molecule: &Molecule, bond: usize, a: usize, b: usize) -> Option<&'static str> {
    let of = |end: usize| molecule.neighbours(end).map(|(n, ..)| n).find(|&n| n != a && n != b).map(Ligand::Neighbour);
    let together = molecule.geometry_between(bond, of(a)?, of(b)?)? == Geometry::Cis;
    let n_ligands = molecule.neighbours(a).count() + molecule.neighbours(b).count();
    (n_ligands == 4).then_some(if together { "cis-" } else { "trans-" })
}

fn group(molecule: &Molecule, atom: usize) -> String {
    let mut text = "C".to_owned();
    let count = |symbol: &str, n: usize, text: &mut String| match n {
        0 => {}
        1 => text.push_str(symbol),
        n => text.extend([symbol.to_owned(), n.to_string()]),
    };
    count("H", molecule.atom(atom).n_hydrogens.into(), &mut text);
    for element in [Element::F, Element::Cl, Element::Br, Element::I] {
        let n = molecule.neighbours(atom).filter(|&(n, ..)| molecule.atom(n).element == element).count();
        count(element.symbol(), n, &mut text);
    }
    text
}

/// SMILES, name and abbreviation of a few compounds.
const KNOWN: [(&str, &str, &str); 24] = [
    ("ClC(Cl)=C(Cl)Cl", "tetrachloroethene", "PCE"),
    ("ClC=C(Cl)Cl", "trichloroethene", "TCE"),
    (r"Cl/C=C\Cl", "cis-1,2-dichloroethene", "cDCE"),
    ("Cl/C=C/Cl", "trans-1,2-dichloroethene", "tDCE"),
    ("C=C(Cl)Cl", "1,1-dichloroethene", "11DCE"),
    ("C=CCl", "chloroethene", "VC"),
    ("C=C", "ethene", ""),
    ("CC", "ethane", ""),
    ("C#C", "ethyne", ""),
    ("ClC#C", "chloroethyne", ""),
    ("ClC#CCl", "dichloroethyne", ""),
    ("ClC(Cl)C(Cl)Cl", "1,1,2,2-tetrachloroethane", "1122TeCA"),
    ("ClCC(Cl)Cl", "1,1,2-trichloroethane", "112TCA"),
    ("ClCCCl", "1,2-dichloroethane", "12DCA"),
    ("CC(Cl)Cl", "1,1-dichloroethane", "11DCA"),
    ("CCCl", "chloroethane", "CA"),
    ("ClCC(Cl)CCl", "1,2,3-trichloropropane", "TCP"),
    ("CC(Cl)CCl", "1,2-dichloropropane", "12DCP"),
    ("ClCCCCl", "1,3-dichloropropane", "13DCP"),
    ("C=CCCl", "3-chloroprop-1-ene", "allyl chloride"),
    ("CCC", "propane", ""),
    ("CC=C", "propene", ""),
    ("CCCCl", "1-chloropropane", ""),
    ("CC(C)Cl", "2-chloropropane", ""),
];

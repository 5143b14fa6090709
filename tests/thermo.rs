//! The fit and the potentials that come of it.

use std::path::{Path, PathBuf};
use std::sync::OnceLock;

use haloshed::frame::{Canonicaliser, Frame, Layout};
use haloshed::molecule::{Halogen, Identity};
use haloshed::network::{Limits, enumerate};
use haloshed::rules::{RuleSet, Selection};
use haloshed::smiles;
use haloshed::thermo::data::Quantity;
use haloshed::thermo::estimate::{Estimator, sum, symmetry_entropy};
use haloshed::thermo::features::FrameFacts;
use haloshed::thermo::{Conditions, Node, Refitted, Sources, energies, potential, refit, shipped};

fn data(file: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("data").join(file)
}

fn refitted() -> &'static Refitted {
    static FITTED: OnceLock<Refitted> = OnceLock::new();
    FITTED.get_or_init(fit_anew)
}

fn fit_anew() -> Refitted {
    let read = |file: &str| std::fs::read_to_string(data(file)).unwrap();
    let (gas, henry, priors) = (read("gas.csv"), read("henry.csv"), read("priors.csv"));
    refit(Sources { gas: &gas, henry: &henry, priors: &priors }).unwrap()
}

/// Cells that hold numbers agree to the digits printed; all others to the letter.
fn assert_same_table(name: &str, committed: &str, fitted: &str) {
    let cells = |text: &str| -> Vec<String> { text.split([',', '\n']).map(str::to_owned).collect() };
    let (a, b) = (cells(committed), cells(fitted));
    assert_eq!(a.len(), b.len(), "{name} has another shape");
    for (x, y) in a.iter().zip(&b) {
        match (x.parse::<f64>(), y.parse::<f64>()) {
            (Ok(p), Ok(q)) => {
                let close = (p - q).abs() <= 0.002 + 0.011 * p.abs().max(q.abs());
                assert!(close, "{name}: {p} is committed, {q} is fitted");
            }
            _ => assert_eq!(x, y, "{name}"),
        }
    }
}

#[test]
#[allow(clippy::disallowed_methods, reason = "blessing rewrites the tables in place")]
fn committed_tables_are_what_the_fit_gives() {
    let fitted = refitted();
    let bless = std::env::var_os("HALOSHED_BLESS").is_some();
    for (file, text) in &fitted.files {
        let path = data("fitted").join(file);
        if bless {
            std::fs::write(&path, text).unwrap();
        } else {
            assert_same_table(file, &std::fs::read_to_string(&path).unwrap(), text);
        }
    }
}

/// E' of the step between two compounds at the usual conditions, with its uncertainty, V.
fn e_volt(from: &str, to: &str) -> (f64, f64) {
    let parent = smiles::read(from).unwrap();
    let rules = RuleSet::shipped().select(&Selection::default()).unwrap();
    let network = enumerate(&[parent], &rules, Identity::Geometric, Limits::default(), 1).unwrap();
    let energies = energies(&network, shipped(), 1);
    let product = network.find(&smiles::read(to).unwrap()).unwrap();
    let step = network.steps_from(0).find(|step| step.to == product).unwrap();
    let reaction = network.half_reaction(0, step.to, 1);
    let ends = (0, step.to);
    let found = potential(&network, &energies, shipped(), &Conditions::default(), ends, &reaction).unwrap();
    let volts = found.volts.unwrap();
    (volts.at_conditions, volts.sd)
}

#[test]
fn potentials_from_handbook_rows_are_met() {
    // Computed from handbook enthalpies, entropies and Henry constants at pH 7, 1 mmol/L
    // chloride, 25 °C; the choice of source moves them by up to 30 mV.
    for (from, to, expected) in [
        ("ClC(Cl)=C(Cl)Cl", "ClC=C(Cl)Cl", 0.60),
        ("ClCCCl", "CCCl", 0.46),
        ("ClCCCl", "C=C", 0.73),
        ("ClC(Cl)C(Cl)Cl", r"Cl/C=C\Cl", 0.96),
        ("ClC(Cl)(Cl)Cl", "ClC(Cl)Cl", 0.67),
        ("ClC(Cl)(Cl)C(Cl)(Cl)Cl", "ClC(Cl)=C(Cl)Cl", 1.12),
    ] {
        let (found, sd) = e_volt(from, to);
        assert!((found - expected).abs() < 0.030, "{from} to {to}: {found:.3} V, expected {expected}");
        assert!(sd > 0.002 && sd < 0.06, "{from} to {to}: sd {sd:.3} V");
    }
}

#[test]
fn elimination_of_perchloroethene_stands_below_its_hydrogenolysis() {
    // With the ATcT enthalpy of dichloroethyne: +0.50 against +0.59 V. The solubility of
    // dichloroethyne was never measured, so the value is held to its own uncertainty.
    let (elimination, sd) = e_volt("ClC(Cl)=C(Cl)Cl", "ClC#CCl");
    let (hydrogenolysis, _) = e_volt("ClC(Cl)=C(Cl)Cl", "ClC=C(Cl)Cl");
    assert!(elimination < hydrogenolysis, "{elimination:.3} V against {hydrogenolysis:.3} V");
    assert!((elimination - 0.50).abs() < 2.0 * sd && sd < 0.05, "{elimination:.3} +- {sd:.3} V");
}

/// Standard entropy by the scheme alone, symmetry included, J/mol/K.
fn estimated_entropy(text: &str) -> f64 {
    let molecule = smiles::read(text).unwrap();
    let frame = Frame::of(&molecule);
    let facts = FrameFacts::of(&frame);
    let state = frame.decompose(&molecule);
    let layout = Layout::new(&frame, &Halogen::ALL, Identity::Geometric).unwrap();
    let canonicaliser = Canonicaliser::new(&frame, &layout);
    let (mut row, mut candidates) = (vec![0; layout.n_words()], vec![0; layout.n_words()]);
    layout.pack(&state, &mut row);
    layout.candidates(&frame, &state, &mut candidates);
    let symmetry = symmetry_entropy(&frame, &state, &canonicaliser.stabiliser(&row, &candidates));
    sum(shipped(), Quantity::Entropy, &Estimator::new(&frame, &facts, true).groups(&state)) - symmetry
}

/// Deviations of left-out measurements, as the report of the fit words them.
fn left_out_median(report: &str, quantity: &str, class: &str) -> f64 {
    let is_of = |line: &&str| line.starts_with(quantity) && line.contains(&format!("), {class}:"));
    let line = report.lines().find(is_of).unwrap();
    let (_, tail) = line.split_once("median ").unwrap();
    tail.split(',').next().unwrap().parse().unwrap()
}

#[test]
fn unseen_compounds_are_foretold_as_well_as_before() {
    // What the scheme foretells of compounds it has not seen; a change of groups or data that
    // makes it worse must be noticed. kJ/mol, J/mol/K and decades.
    for (quantity, class, most) in [
        ("Enthalpy", "no halogen", 3.0),
        ("Enthalpy", "chlorine only", 3.5),
        ("Enthalpy", "bromine only", 3.0),
        ("Enthalpy", "fluorine only", 10.0),
        ("Entropy", "no halogen", 3.0),
        ("Entropy", "chlorine only", 2.0),
        ("Solubility", "no halogen", 0.12),
        ("Solubility", "chlorine only", 0.15),
    ] {
        let median = left_out_median(&refitted().report, quantity, class);
        assert!(median < most, "{quantity} of compounds with {class}: {median} left out, expected below {most}");
    }
}

#[test]
fn no_measured_entropy_stands_far_off_the_scheme() {
    // What a wrong row does to a potential: 30 J/mol/K are 46 mV of a two-electron step. Rows
    // that prove wrong are set aside in data/gas.csv with the reason; strained and crowded
    // compounds may stand off in enthalpy, entropies do not.
    let mut far = Vec::new();
    for row in &shipped().measured {
        let Some(measured) = row.values[Quantity::Entropy as usize] else { continue };
        let excess = measured.mean - estimated_entropy(&row.smiles);
        if excess.abs() > 30.0 {
            far.push(format!("{} {excess:.0}", row.smiles));
        }
    }
    assert!(far.is_empty(), "{far:?}");
}

#[test]
fn benzene_is_measured_and_its_kin_are_estimated_closely() {
    // Gibbs energies in water, kJ/mol: Shock and Helgeson, Geochim. Cosmochim. Acta 54, 915
    // (1990): benzene 133.9 (from memory). Cyclohexane networks end here.
    let explained = |text: &str| {
        let network = enumerate(
            &[smiles::read(text).unwrap()],
            &RuleSet::shipped().select(&Selection::default()).unwrap(),
            Identity::Geometric,
            Limits::default(),
            1,
        )
        .unwrap();
        let found = energies(&network, shipped(), 1);
        (found.gibbs_kj_per_mol(0).unwrap(), Node::of(&network, &found, shipped(), 0).sd_kj_per_mol(shipped()))
    };
    let (gibbs, sd) = explained("c1ccccc1");
    assert!((gibbs - 133.9).abs() < 2.0 && sd < 1.0, "{gibbs:.1} +- {sd:.1} kJ/mol");
    let (_, sd) = explained("Brc1ccc(I)cc1");
    assert!(sd < 12.0, "an aryl halide that was never measured: +- {sd:.1} kJ/mol");
}

/// Where the energies of a parent's isomers come from at full identity.
fn origins_at_full_identity(text: &str) -> Vec<&'static str> {
    let parents = smiles::read(text).unwrap().isomers(Identity::Full, 64).unwrap();
    let rules = RuleSet::shipped().select(&Selection::default()).unwrap();
    let network = enumerate(&parents, &rules, Identity::Full, Limits::default(), 1).unwrap();
    let found = energies(&network, shipped(), 1);
    let ids = parents.iter().map(|parent| network.find(parent).unwrap());
    ids.map(|id| Node::of(&network, &found, shipped(), id).origin().text()).collect()
}

#[test]
fn mirror_images_share_a_measurement_and_diastereomers_do_not() {
    assert_eq!(origins_at_full_identity("CC(Cl)CCl"), ["partly measured"; 2]);
    // Meso and threo 2,3-dichlorobutane are two substances; the measured row names neither.
    assert_eq!(origins_at_full_identity("CC(Cl)C(C)Cl"), ["estimated"; 3]);
}

//! Enumeration: whole networks, and what a compound and a step cost in time and memory.

#![allow(missing_docs, clippy::print_stderr, reason = "a bench tells what it found")]
//!
//! `cargo bench --bench enumerate`; compare lines of one run only.

use criterion::{Criterion, Throughput, criterion_group, criterion_main};
use haloshed::molecule::{Identity, Molecule};
use haloshed::network::{Limits, Network, enumerate};
use haloshed::rules::{Rule, RuleSet, Selection};
use haloshed::thermo::{energies, shipped};

fn rules(names: Option<&str>) -> Vec<Rule> {
    let only = names.map(|names| names.split(',').map(str::to_owned).collect());
    RuleSet::shipped().select(&Selection { only, with: Vec::new() }).expect("shipped names")
}

fn molecule(smiles: &str) -> Molecule {
    haloshed::smiles::read(smiles).expect("a bench's own SMILES")
}

fn perchloro_alkane(n: usize) -> Molecule {
    let inner: String = (2..n).map(|_| "C(Cl)(Cl)").collect();
    molecule(&format!("ClC(Cl)(Cl){inner}C(Cl)(Cl)Cl"))
}

fn run(parent: &Molecule, rules: &[Rule], identity: Identity) -> Network {
    let limits = Limits { max_compounds: 10_000_000, ..Limits::default() };
    enumerate(std::slice::from_ref(parent), rules, identity, limits, 1).expect("within limits")
}

fn small_networks(c: &mut Criterion) {
    let default = rules(None);
    let mut group = c.benchmark_group("default rules");
    group.sample_size(20);
    for (name, smiles) in [
        ("perchloroethene", "ClC(Cl)=C(Cl)Cl"),
        ("1,2,3-trichloropropane", "ClCC(Cl)CCl"),
        ("hexachlorobutadiene", "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl"),
    ] {
        let parent = molecule(smiles);
        group.bench_function(name, |b| b.iter(|| run(&parent, &default, Identity::Geometric)));
    }
    group.finish();
}

fn perchloro_octane(c: &mut Criterion) {
    let parent = perchloro_alkane(8);
    let core = rules(Some("core"));
    let mut group = c.benchmark_group("perchloro-n-octane, core rules, constitutional");
    group.sample_size(10);
    let network = run(&parent, &core, Identity::Constitutional);
    let (compound_bytes, step_bytes) = network.n_bytes();
    eprintln!(
        "{} compounds, {} steps; {:.0} bytes a compound, {:.1} bytes a step",
        network.n_compounds(),
        network.n_steps(),
        compound_bytes as f64 / network.n_compounds() as f64,
        step_bytes as f64 / network.n_steps() as f64
    );
    group.throughput(Throughput::Elements(network.n_compounds() as u64));
    group.bench_function("network", |b| b.iter(|| run(&parent, &core, Identity::Constitutional)));
    group.bench_function("network and energies", |b| {
        b.iter(|| {
            let network = run(&parent, &core, Identity::Constitutional);
            energies(&network, shipped(), 1)
        });
    });
    group.finish();
}

criterion_group!(benches, small_networks, perchloro_octane);
criterion_main!(benches);

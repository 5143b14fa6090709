//! Figures for Graphviz, kept where `.ci/run` renders them.

use haloshed::output::Writer;
use haloshed::output::dot::Dot;
use haloshed::output::record::Network;

use super::sample::network_of;

fn text(network: &Network) -> String {
    let mut text = Vec::new();
    Dot.write(network, &mut text).unwrap();
    String::from_utf8(text).unwrap()
}

#[test]
fn draft() {
    for (name, smiles) in [
        ("pce", "ClC(Cl)=C(Cl)Cl"),
        ("teca", "ClC(Cl)C(Cl)Cl"),
        ("tcp", "ClCC(Cl)CCl"),
        ("edb", "BrCCBr"),
        ("hca", "ClC(Cl)(Cl)C(Cl)(Cl)Cl"),
        ("hcbd", "ClC(Cl)=C(Cl)C(Cl)=C(Cl)Cl"),
        ("halothane", "FC(F)(F)C(Cl)Br"),
        ("hch", "ClC1C(Cl)C(Cl)C(Cl)C(Cl)C1Cl"),
        ("amide", "O=C(N)C(Cl)(Cl)Br"),
        ("ct", "ClC(Cl)(Cl)Cl"),
        ("tca", "CC(Cl)(Cl)Cl"),
        ("dbcp", "ClCC(Br)CBr"),
        ("tetra", "CC(Cl)C(Cl)C(Cl)Cl"),
        ("pca", "ClC(Cl)C(Cl)(Cl)Cl"),
        ("freon113", "FC(F)(Cl)C(F)(Cl)Cl"),
        ("tnal", "OC(=O)C(Cl)(Cl)Cl"),
        ("chp", "ClC=C(Cl)CCl"),
        ("ring", "ClC1CCC1Cl"),
    ] {
        let n = network_of(smiles);
        eprintln!("{name}: {} compounds {} steps", n.compounds.len(), n.steps.len());
        std::fs::create_dir_all("target/tmp").unwrap();
        std::io::Write::write_all(
            &mut std::fs::OpenOptions::new()
                .create(true)
                .write(true)
                .truncate(true)
                .open(format!("target/tmp/{name}.dot"))
                .unwrap(),
            text(&n).as_bytes(),
        )
        .unwrap();
    }
}

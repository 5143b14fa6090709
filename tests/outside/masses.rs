//! Formulas and masses against other programs' tables of isotopes and atomic weights.
//!
//! Each row of `masses.csv` names the program and the table behind it.

use haloshed::smiles::read;

#[test]
fn formulas_and_masses_agree_with_other_tables() {
    let mut reader = csv::Reader::from_reader(include_str!("masses.csv").as_bytes());
    let mut n_rows = 0;
    for row in reader.records() {
        let row = row.unwrap();
        let formula = read(&row[1]).unwrap().formula();
        assert_eq!(formula.to_string(), hill(&row[0]), "{}", &row[1]);
        let found = match &row[2] {
            "molar mass" => formula.molar_mass_g_per_mol(),
            "monoisotopic mass" => formula.monoisotopic_mass_u(),
            other => panic!("{other}"),
        };
        let (value, tolerance): (f64, f64) = (row[3].parse().unwrap(), row[4].parse().unwrap());
        assert!((found - value).abs() <= tolerance, "{} of {}: {found}, expected {value}", &row[2], &row[0]);
        n_rows += 1;
    }
    assert_eq!(n_rows, 46);
}

/// A formula with carbon, hydrogen and then the rest by alphabet, as the table gives it but for
/// the order of halogens.
fn hill(formula: &str) -> String {
    let starts: Vec<usize> = formula.match_indices(char::is_uppercase).map(|(at, _)| at).collect();
    let ends = starts.iter().skip(1).copied().chain([formula.len()]);
    let mut parts: Vec<&str> = starts.iter().zip(ends).map(|(&start, end)| &formula[start..end]).collect();
    let symbol = |part: &str| part.trim_end_matches(|c: char| c.is_ascii_digit()).to_owned();
    parts.sort_by_key(|part| match symbol(part).as_str() {
        "C" => (0, String::new()),
        "H" => (1, String::new()),
        other => (2, other.to_owned()),
    });
    parts.concat()
}

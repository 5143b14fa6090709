//! The catalogue: every row right, every text found, every mistake met with help.

use std::collections::BTreeSet;

use haloshed::catalogue::folding::fold;
use haloshed::catalogue::{Entry, LookupError, Reading, by_smiles, cas, cautions, entries, find, resolve};
use haloshed::molecule::Identity;
use haloshed::smiles::{read, write};

fn check(text: &str, name: &str) {
    match find(text) {
        Ok(entry) => assert_eq!(entry.name, name, "{text}"),
        Err(error) => panic!("{text}: {error}"),
    }
}

fn check_error(text: &str, message: &str, hint: &str) {
    let error = resolve(text).map(|resolved| write(&resolved.molecule)).unwrap_err();
    assert_eq!((error.to_string().as_str(), error.hint().as_deref()), (message, Some(hint)), "{text}");
}

#[test]
fn every_row_is_canonical() {
    for entry in entries() {
        let molecule = read(&entry.smiles).unwrap_or_else(|error| panic!("{}: {error}", entry.smiles));
        assert_eq!(write(&molecule), entry.smiles, "{}", entry.name);
        assert_eq!(by_smiles(&entry.smiles), Some(entry));
    }
}

#[test]
fn every_configuration_in_the_table_is_real() {
    for entry in entries() {
        let mut molecule = read(&entry.smiles).unwrap();
        molecule.keep_real_units(Identity::Full);
        assert_eq!(write(&molecule), entry.smiles, "{}", entry.name);
    }
}

#[test]
fn every_cas_number_has_its_check_digit_and_its_own_row() {
    assert!(entries().len() >= 150);
    let numbers: BTreeSet<&str> = entries().iter().map(|entry| entry.cas.as_str()).collect();
    assert_eq!(numbers.len(), entries().len());
    for entry in entries() {
        assert_eq!(cas::shaped(&entry.cas).as_ref(), Some(&entry.cas), "{}", entry.name);
        let (expected, found) = cas::check_digits(&entry.cas);
        assert_eq!(expected, found, "{} of {}", entry.cas, entry.name);
        assert_eq!(find(&entry.cas), Ok(entry));
    }
}

#[test]
fn every_text_of_the_table_finds_its_row() {
    for entry in entries() {
        for text in entry.texts() {
            check(text, &entry.name);
            check(&text.to_uppercase(), &entry.name);
        }
    }
}

#[test]
fn trade_abbreviations_are_read() {
    // Topic `abbreviation` of the published checks: usage from memory, CAS and structure
    // verified against chemicals 1.5.2.
    let table = csv::Reader::from_reader(include_str!("outside/abbreviations.csv").as_bytes()).into_records();
    let rows: Vec<csv::StringRecord> = table.map(Result::unwrap).collect();
    assert!(rows.len() >= 34, "{} rows", rows.len());
    for row in &rows {
        let entry = find(&row[0]).unwrap_or_else(|error| panic!("{}: {error}", &row[0]));
        assert_eq!(entry.smiles, write(&read(&row[1]).unwrap()), "{}", &row[0]);
        assert_eq!(entry.cas, row[2], "{}", &row[0]);
    }
}

#[test]
fn the_common_names_of_another_table_find_their_rows() {
    // Left out by hand: nine names that are trade marks, another isomer's, or too loose for one compound.
    let table = csv::Reader::from_reader(include_str!("outside/names.csv").as_bytes()).into_records();
    let rows: Vec<csv::StringRecord> = table.map(Result::unwrap).collect();
    assert!(rows.len() >= 280, "{} rows", rows.len());
    for row in &rows {
        let entry = find(&row[0]).unwrap_or_else(|error| panic!("{}: {error}", &row[0]));
        assert_eq!(entry.cas, row[1], "{}", &row[0]);
    }
}

#[test]
fn case_spaces_hyphens_and_primes_do_not_matter() {
    check("pce", "tetrachloroethene");
    check("1,1 dichloro-ethylene", "1,1-dichloroethene");
    check("Cis 1,2-DCE", "cis-1,2-dichloroethene");
    check("11DCE", "1,1-dichloroethene");
    check("2,3-dichloro-1-propene", "2,3-dichloroprop-1-ene");
    check("γ-HCH", "gamma-1,2,3,4,5,6-hexachlorocyclohexane");
    check("p,p′-DDT", "1,1,1-trichloro-2,2-bis(4-chlorophenyl)ethane");
    check("1,3-butadiene", "buta-1,3-diene");
    check("hexachloro-1,3-butadiene", "hexachlorobuta-1,3-diene");
    check(" CAS 127-18-4 ", "tetrachloroethene");
    check("cfc 113", "1,1,2-trichloro-1,2,2-trifluoroethane");
}

#[test]
fn older_and_inverted_names_are_read() {
    check("Trichlorethylene", "trichloroethene");
    check("perchlorethylene", "tetrachloroethene");
    check("dichlormethane", "dichloromethane");
    check("chloracetic acid", "chloroacetic acid");
    check("Ethene, tetrachloro-", "tetrachloroethene");
    check("ETHENE, 1,2-DICHLORO-, (E)-", "trans-1,2-dichloroethene");
    check("Ethane, 1,1,2-trichloro-", "1,1,2-trichloroethane");
    check("Benzene, 1,4-dichloro-", "1,4-dichlorobenzene");
    check("dichloroethylene, cis-1,2-", "cis-1,2-dichloroethene");
}

#[test]
fn no_name_shared_with_another_halogen_or_parent_is_taken() {
    // One letter apart and both real: none may fall on the other.
    for (text, name) in [
        ("trichloroethane, 1,1,1-", "1,1,1-trichloroethane"),
        ("1,2-dichloroethane", "1,2-dichloroethane"),
        ("1,2-dichloroethene", "1,2-dichloroethene"),
        ("ethylene chloride", "1,2-dichloroethane"),
        ("ethylidene chloride", "1,1-dichloroethane"),
        ("vinylidene chloride", "1,1-dichloroethene"),
        ("acetylene dichloride", "1,2-dichloroethene"),
        ("methyl chloride", "chloromethane"),
        ("methylene chloride", "dichloromethane"),
        ("methyl chloroform", "1,1,1-trichloroethane"),
        ("propylene dichloride", "1,2-dichloropropane"),
        ("propyl chloride", "1-chloropropane"),
        ("propenyl chloride", "1-chloroprop-1-ene"),
        ("propargyl chloride", "3-chloroprop-1-yne"),
        ("cyclohexene", "cyclohexene"),
        ("cyclohexane", "cyclohexane"),
    ] {
        check(text, name);
    }
}

#[test]
fn an_ambiguous_abbreviation_is_refused_with_its_choices() {
    check_error(
        "DCE",
        "`DCE` is ambiguous: cDCE (cis-1,2-dichloroethene), tDCE (trans-1,2-dichloroethene) or 1,1-DCE (1,1-dichloroethene)",
        "give one of these, a CAS number or a SMILES",
    );
    // An ethane to some, the ethenes to others.
    check_error(
        "1,2-DCE",
        "`1,2-DCE` is ambiguous: cDCE (cis-1,2-dichloroethene), tDCE (trans-1,2-dichloroethene), 1,2-dichloroethene or \
         1,2-DCA (1,2-dichloroethane)",
        "give one of these, a CAS number or a SMILES",
    );
    for text in ["tca", "DCA", "TeCA", "PCA", "dichloroethylene", "DCP", "1,3-DCP", "HFO-1234ze", "2-butene", "MC"] {
        assert!(resolve(text).unwrap_err().to_string().contains("is ambiguous"), "{text}");
    }
}

#[test]
fn a_misspelt_name_gets_the_nearest() {
    check_error(
        "tetracloroethylene",
        "no compound named `tetracloroethylene` is known",
        "did you mean `tetrachloroethene`, `tetrachloroethane` or `tetrafluoroethene`? any other compound can be given \
         as a SMILES",
    );
    check_error(
        "chlorofrom",
        "no compound named `chlorofrom` is known",
        "did you mean `chloroform`? any other compound can be given as a SMILES",
    );
    check_error(
        "unobtainium bromide",
        "no compound named `unobtainium bromide` is known",
        "give a SMILES such as ClC=C(Cl)Cl: any compound can be given so",
    );
}

#[test]
fn a_wrong_cas_number_says_what_is_wrong() {
    check_error(
        "127-18-5",
        "the CAS number 127-18-5 has the check digit 5, but its other digits call for 4",
        "look for two digits that changed places",
    );
    for text in ["79-01-60", "79016", "1-79-01-6"] {
        let message = format!("`{text}` is not a CAS number");
        let hint = "a CAS number has two to seven digits, two digits and one, with hyphens between: 79-01-6";
        check_error(text, &message, hint);
    }
    let unknown = format!("the CAS number 58-08-2 is not in the table of {} compounds", entries().len());
    check_error("58-08-2", &unknown, "give the compound as a SMILES");
}

#[test]
fn a_wrong_smiles_keeps_its_own_error() {
    for text in ["ClC(Cl)(Cl)(Cl)Cl", "C1CC", "CC)C", "CCX", "[Na+].CC", "C/C=C(/C)\\C(", "Cl=Cl"] {
        let own = read(text).unwrap_err();
        assert_eq!(resolve(text).unwrap_err().to_string(), own.to_string(), "{text}");
    }
    check_error("", "the compound is empty", "give a SMILES such as ClC=C(Cl)Cl, a name, or a CAS number");
}

#[test]
fn a_known_name_that_is_a_smiles_too_tells_the_other_reading() {
    let chloroform = resolve("CF").unwrap();
    assert!(matches!(chloroform.reading, Reading::Name(Entry { cas, .. }) if cas == "67-66-3"));
    assert_eq!(chloroform.other_reading.as_deref(), Some("CF"));
    let note = "`CF` is taken as trichloromethane, not as the SMILES of fluoromethane; write C-F for fluoromethane";
    assert_eq!(chloroform.note("CF").as_deref(), Some(note));
    assert_eq!(write(&resolve("FC").unwrap().molecule), "CF");
    for drawn in ["C(F)", "C-F", "[CH3]F"] {
        let fluoromethane = resolve(drawn).unwrap();
        assert_eq!(
            (write(&fluoromethane.molecule).as_str(), fluoromethane.reading),
            ("CF", Reading::Smiles),
            "{drawn}"
        );
    }
    let note = "`CO` is taken as carbon monoxide, not as the SMILES of methanol; write C-O for methanol";
    assert_eq!(resolve("CO").unwrap().note("CO").as_deref(), Some(note));
    let pce = resolve("PCE").unwrap();
    assert_eq!((pce.note("PCE"), pce.other_reading), (None, None));
    // All texts of the table that are a SMILES of something else.
    let both = entries().iter().flat_map(Entry::texts).filter(|text| resolve(text).unwrap().other_reading.is_some());
    assert_eq!(both.collect::<Vec<_>>(), ["CF", "CO"]);
}

#[test]
fn every_text_resolves_to_its_row() {
    for entry in entries() {
        for text in entry.texts() {
            let resolved = resolve(text).unwrap_or_else(|error| panic!("{text}: {error}"));
            assert_eq!(resolved.reading, Reading::Name(entry), "{text}");
            assert_eq!(write(&resolved.molecule), entry.smiles);
        }
        assert_eq!(resolve(&entry.cas).unwrap().reading, Reading::Cas(entry));
        let drawn = resolve(&entry.smiles).unwrap();
        let is_itself = write(&drawn.molecule) == entry.smiles;
        assert!(is_itself || drawn.other_reading.as_ref() == Some(&entry.smiles), "{}", entry.smiles);
    }
}

fn caution_texts(smiles: &str) -> Vec<&'static str> {
    let molecule = read(smiles).unwrap();
    cautions(&molecule, &write(&molecule)).iter().map(|caution| caution.text.as_str()).collect()
}

#[test]
fn dangerous_products_carry_a_caution() {
    for known in
        ["C=CCl", "C=O", "[C-]#[O+]", "O=C(Cl)Cl", "BrCCBr", "ClCC(Cl)CCl", "C=CC=C", "c1ccccc1", "ClCC(Br)CBr"]
    {
        assert!(!caution_texts(known).is_empty(), "{known}");
    }
    assert_eq!(caution_texts("BrC#CC(F)F"), ["treat as explosive when concentrated or in air; never isolate"]);
    assert_eq!(caution_texts("F[C]Br"), ["lives for a moment only; water turns it into poisonous carbon monoxide"]);
    for harmless in ["CC", "C=C", "CCO", "FCC(F)(F)F"] {
        assert_eq!(caution_texts(harmless), [""; 0], "{harmless}");
    }
}

#[test]
fn a_caution_without_configuration_is_for_every_isomer() {
    let open = caution_texts("ClC=CCCl");
    assert!(!open.is_empty());
    assert_eq!(caution_texts(r"Cl/C=C\CCl"), open);
    assert_eq!(caution_texts("Cl/C=C/CCl"), open);
}

#[test]
fn a_caution_for_one_isomer_stands_for_it_alone() {
    let lindane = caution_texts(&find("lindane").unwrap().smiles);
    let beta = caution_texts(&find("beta-HCH").unwrap().smiles);
    assert!(lindane[0].contains("IARC group 1;"), "{lindane:?}");
    assert!(beta[0].contains("IARC group 2B"), "{beta:?}");
}

#[test]
fn folding_a_key_changes_nothing() {
    for text in entries().iter().flat_map(Entry::texts) {
        let key = fold(text);
        assert_eq!(fold(&key), key, "{text}");
    }
}

proptest::proptest! {
    #[test]
    fn no_text_is_too_strange(text in ".{0,40}") {
        // Whatever comes out, it came out; an error has a sentence.
        if let Err(error) = resolve(&text) {
            proptest::prop_assert!(!error.to_string().is_empty());
        }
    }

    #[test]
    fn one_changed_digit_of_a_cas_number_is_seen(row in 0usize..150, at in 0usize..10, digit in 0u8..10) {
        let entry = &entries()[row];
        let mut number = entry.cas.clone().into_bytes();
        let at = at % number.len();
        proptest::prop_assume!(number[at].is_ascii_digit() && number[at] != b'0' + digit);
        let difference = number[at].abs_diff(b'0' + digit);
        number[at] = b'0' + digit;
        // The check digit has weight one, the others their place before it.
        let place = number[at..].iter().filter(|byte| byte.is_ascii_digit()).count() - 1;
        let weight = place.max(1) as u8;
        let found = find(std::str::from_utf8(&number).unwrap());
        // One check digit can't see a change that its weight makes a multiple of ten.
        let is_hidden = (difference * weight).is_multiple_of(10);
        proptest::prop_assert_eq!(!is_hidden, matches!(found, Err(LookupError::CheckDigit { .. })));
        proptest::prop_assert!(found != Ok(entry));
    }
}

//! The grammar file and the parser say the same.

use haloshed::smiles;
use proptest::prelude::*;

use crate::sentences::sentences;

const GRAMMAR: &str = include_str!("../../grammar/smiles.abnf");

/// Whatever is wrong, it is told about a piece of the text.
fn points_inside(text: &str) -> Result<(), TestCaseError> {
    if let Err(error) = smiles::read(text) {
        let span = error.span.clone();
        prop_assert!(span.start <= span.end && span.end <= text.len(), "{text:?}: {error:?}");
        prop_assert!(text.get(span.clone()).is_some(), "{text:?}: {error:?} is not on character boundaries");
        prop_assert!(text.is_empty() || span.start < span.end, "{text:?}: {error:?} points at nothing");
        prop_assert!(!error.to_string().is_empty() && !error.label().is_empty());
    }
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(1500))]

    #[test]
    fn every_sentence_of_the_grammar_is_parsed(sentence in sentences(GRAMMAR, "smiles")) {
        prop_assert!(smiles::parse(&sentence).is_ok(), "{sentence}: {:?}", smiles::parse(&sentence));
        points_inside(&sentence)?;
    }

    #[test]
    fn a_changed_character_never_panics(
        sentence in sentences(GRAMMAR, "smiles"),
        at in any::<prop::sample::Index>(),
        change in prop_oneof![any::<char>(), proptest::char::range(' ', '~')],
        removes in any::<bool>(),
    ) {
        let mut characters: Vec<char> = sentence.chars().collect();
        let at = at.index(characters.len());
        if removes { characters.remove(at); } else { characters[at] = change; }
        points_inside(&characters.into_iter().collect::<String>())?;
    }

    #[test]
    fn arbitrary_text_never_panics(text in any::<String>()) {
        points_inside(&text)?;
    }

    #[test]
    fn smiles_like_text_never_panics(text in "[BCNOPSFIHclnobrsi()\\[\\]0-9%=#/\\\\@+:.*$ -]{0,24}") {
        points_inside(&text)?;
    }
}

#[test]
fn long_and_deep_texts_are_read_or_refused() {
    for text in [
        "C".repeat(10_000),
        "C".repeat(10_001),
        "é".repeat(5_001),
        "(".repeat(10_000),
        "C(".repeat(5_000),
        format!("{}C{}", "C(".repeat(100), ")".repeat(100)),
        format!("{}C{}", "C(".repeat(101), ")".repeat(101)),
        "[".repeat(10_000),
        "C1".repeat(5_000),
        "/C=C".repeat(2_500),
    ] {
        points_inside(&text).unwrap();
    }
    assert!(smiles::read(&"C".repeat(10_000)).is_ok());
    assert!(smiles::read(&format!("{}C{}", "C(".repeat(100), ")".repeat(100))).is_ok());
}

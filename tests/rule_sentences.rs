//! The rule grammar and the rule parser held together: what `grammar/rules.abnf` makes, the
//! parser accepts.

use haloshed::rules::parse::rule_file;
use proptest::prelude::*;

use crate::sentences::sentences;

const GRAMMAR: &str = include_str!("../grammar/rules.abnf");

proptest! {
    #![proptest_config(ProptestConfig::with_cases(300))]

    #[test]
    fn sentences_of_the_grammar_are_accepted(text in sentences(GRAMMAR, "rule-file")) {
        let (_, errors) = rule_file(&text);
        prop_assert!(errors.is_empty(), "{text}\n{errors:#?}");
    }

    #[test]
    fn a_changed_character_is_no_panic(text in sentences(GRAMMAR, "rule-file"), at in any::<prop::sample::Index>(), new in any::<char>()) {
        let mut letters: Vec<char> = text.chars().collect();
        if !letters.is_empty() {
            let place = at.index(letters.len());
            letters[place] = new;
        }
        let changed: String = letters.into_iter().collect();
        for error in rule_file(&changed).1 {
            prop_assert!(error.span.end <= changed.len(), "{changed}\n{error:?}");
        }
    }
}

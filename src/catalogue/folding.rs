//! When two texts are one name: both fold to the same key.
//!
//! A key is lower case without spaces, hyphens, commas, brackets and primes; Greek letters are
//! spelt out; `ethylene`, `propylene` and `acetylene` become `ethene`, `propene` and `ethyne`;
//! `1-propene` and `prop-1-ene` become `propene`, whose double bond can be nowhere else;
//! `2-butene` becomes `but-2-ene`; `trichlorethylene` gets the `o` that older texts leave out.
//! So `1,1-Dichlor ethylene` and `1,1-dichloroethene` are one.
//!
//! Invariant: folding a key changes nothing, and no two rows of the catalogue share a key.

/// Greek letters that stand before names of isomers.
const GREEK: [(char, &str); 5] = [('α', "alpha"), ('β', "beta"), ('γ', "gamma"), ('δ', "delta"), ('ε', "epsilon")];

/// Parts of names that mean the same, the one to keep second. All hold `ene`.
const EXCHANGED: [(&str, &str); 8] = [
    ("ethylene", "ethene"),
    ("propylene", "propene"),
    ("butylene", "butene"),
    ("acetylene", "ethyne"),
    ("prop1ene", "propene"),
    ("13butadiene", "buta13diene"),
    ("1butene", "but1ene"),
    ("2butene", "but2ene"),
];

/// Halogen stems that older texts write without an `o` before a parent.
const SHORT_STEMS: [&str; 3] = ["chlor", "brom", "fluor"];

/// Parents before which they do so.
const PARENTS: [&str; 6] = ["meth", "eth", "prop", "but", "benz", "acet"];

/// The key of a name.
pub fn fold(text: &str) -> String {
    let mut key = String::with_capacity(text.len());
    for c in text.chars().filter(|&c| !is_idle(c)).flat_map(char::to_lowercase) {
        match GREEK.iter().find(|(letter, _)| *letter == c) {
            Some((_, spelt)) => key.push_str(spelt),
            None => key.push(c),
        }
    }
    let mut key = with_full_stems(key);
    if !key.contains("ene") {
        return key;
    }
    for (from, to) in EXCHANGED {
        if key.contains(from) {
            key = key.replace(from, to);
        }
    }
    without_propene_locant(key)
}

/// `trichlorethene` as `trichloroethene`.
fn with_full_stems(mut key: String) -> String {
    for stem in SHORT_STEMS.into_iter().filter(|stem| key.contains(stem)).collect::<Vec<_>>() {
        for parent in PARENTS {
            key = key.replace(&format!("{stem}{parent}"), &format!("{stem}o{parent}"));
        }
    }
    key
}

/// Characters that tell no two names apart.
fn is_idle(c: char) -> bool {
    let is_space = matches!(c, ' ' | '\t' | '\u{a0}' | ',' | '.' | ';' | '_');
    let is_dash = matches!(c, '-' | '\u{2010}'..='\u{2014}' | '\u{2212}');
    let is_bracket = matches!(c, '(' | ')' | '[' | ']' | '{' | '}');
    let is_prime = matches!(c, '\'' | '"' | '`' | '’' | '‘' | '′');
    is_space || is_dash || is_bracket || is_prime
}

/// `3chloro1propene` without its `1`: the digit stands alone before `propene`.
fn without_propene_locant(key: String) -> String {
    let Some(at) = key.find("1propene") else { return key };
    if key[..at].ends_with(|c: char| c.is_ascii_digit()) {
        return key;
    }
    format!("{}{}", &key[..at], &key[at + 1..])
}

#[cfg(test)]
mod tests {
    use super::*;

    fn check(texts: &[&str], key: &str) {
        for text in texts {
            assert_eq!(fold(text), key, "{text}");
        }
        assert_eq!(fold(key), key);
    }

    #[test]
    fn ethylene_is_ethene() {
        check(&["1,1-dichloroethene", "1,1-Dichloro ethylene", " 1.1 - dichloroethylene"], "11dichloroethene");
        check(&["Acetylene", "ethyne"], "ethyne");
    }

    #[test]
    fn a_stem_without_its_o_is_read() {
        check(&["Trichlorethylen", "trichlorethylen"], "trichloroethylen");
        check(&["trichlorethylene", "trichloroethene"], "trichloroethene");
        check(&["Dichlormethane"], "dichloromethane");
        check(&["chloracetic acid", "chloroacetic acid"], "chloroaceticacid");
        check(&["methoxychlor"], "methoxychlor");
    }

    #[test]
    fn the_locant_of_propene_is_idle() {
        check(&["3-chloro-1-propene", "3-chloroprop-1-ene", "3-chloropropylene"], "3chloropropene");
        check(&["1,1-dichloropropene"], "11dichloropropene");
    }

    #[test]
    fn greek_letters_and_primes_are_read() {
        check(&["α-HCH", "alpha-HCH", "Alpha HCH"], "alphahch");
        check(&["p,p'-DDT", "p,p′-DDT", "pp-DDT"], "ppddt");
    }
}

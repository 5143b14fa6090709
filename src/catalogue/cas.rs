//! CAS registry numbers: their shape and their check digit.
//!
//! A number has two to seven digits, two digits, and a check digit, with hyphens between. The
//! check digit is the sum of the other digits, each times its place counted from the right
//! (from 1), modulo 10.
//!
//! # Source
//! CAS, "Check digit verification of CAS registry numbers" (from memory).

/// The CAS number in a text of that shape, right or wrong: plain hyphens, no spaces, no `CAS` in front.
pub fn shaped(text: &str) -> Option<String> {
    let text = text.trim();
    let bare = ["CAS RN", "CAS No.", "CAS no.", "CAS", "cas"].iter().find_map(|mark| text.strip_prefix(mark));
    let bare = bare.unwrap_or(text).trim_start_matches([' ', ':']);
    let plain: String = bare.chars().map(plain_hyphen).filter(|c| *c != ' ').collect();
    let groups: Vec<&str> = plain.split('-').collect();
    let [first, second, check] = groups[..] else { return None };
    let is_number = groups.iter().all(|g| g.bytes().all(|b| b.is_ascii_digit()));
    let is_shaped = is_number && (2..=7).contains(&first.len()) && second.len() == 2 && check.len() == 1;
    is_shaped.then_some(plain)
}

/// Whether a text can only be meant as a CAS number: digits and hyphens, at least five digits.
pub fn is_meant(text: &str) -> bool {
    let is_number = text.chars().all(|c| c.is_ascii_digit() || plain_hyphen(c) == '-' || c == ' ');
    is_number && text.bytes().filter(u8::is_ascii_digit).count() >= LEAST_DIGITS
}

/// Digits of the shortest CAS number.
const LEAST_DIGITS: usize = 5;

fn plain_hyphen(c: char) -> char {
    match c {
        '\u{2010}' | '\u{2011}' | '\u{2012}' | '–' | '—' | '\u{2212}' => '-',
        other => other,
    }
}

/// The check digit that a number should have, and the one it has.
///
/// `number` is of the shape that [`shaped`] returns; digits alone are looked at.
pub fn check_digits(number: &str) -> (u32, u32) {
    let digits: Vec<u32> = number.chars().filter_map(|c| c.to_digit(10)).collect();
    let Some((&found, others)) = digits.split_last() else { return (0, 0) };
    let sum: u32 = others.iter().rev().zip(1..).map(|(digit, place)| digit * place).sum();
    (sum % 10, found)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn shapes_are_told_from_names() {
        for text in ["127-18-4", " 127-18-4 ", "127–18–4", "CAS 127-18-4", "CAS RN: 127-18-4", "127 - 18 - 4"] {
            assert_eq!(shaped(text).as_deref(), Some("127-18-4"), "{text}");
        }
        for text in ["1,1-dichloroethane", "127-184", "127-18-44", "1-18-4", "ClCCl", "", "12a-18-4", "CFC-11-4"] {
            assert_eq!(shaped(text), None, "{text}");
        }
    }

    #[test]
    fn a_number_of_another_shape_is_still_meant_as_one() {
        for text in ["79-01-60", "79016", "79016-0", "79 01 6", "79–01–60", "79-016"] {
            assert!(is_meant(text) && shaped(text).is_none(), "{text}");
        }
        for text in ["", "1-1", "1,1,2,2-1", "C1-2-3-4-5", "11223a"] {
            assert!(!is_meant(text), "{text}");
        }
    }

    #[test]
    fn a_wrong_digit_is_seen() {
        // Tetrachloroethene: 8*1 + 1*2 + 7*3 + 2*4 + 1*5 = 44.
        assert_eq!(check_digits("127-18-4"), (4, 4));
        assert_eq!(check_digits("127-18-5"), (4, 5));
        assert_eq!(check_digits("172-18-4"), (9, 4));
    }
}

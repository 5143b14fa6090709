//! Reading rule files: what is shipped, and what is said of mistakes.

use haloshed::rules::check::read_rules;
use haloshed::rules::error::{SelectionError, line_column};
use haloshed::rules::library::{RuleSet, SHIPPED, Selection};
use haloshed::rules::parse::rule_file;
use proptest::prelude::*;

/// The mistakes of a file: `line:column: sentence | what is underlined | hint`.
fn mistakes(text: &str) -> Vec<String> {
    let Err(error) = read_rules("test.rules", text) else { return Vec::new() };
    let shown = error.errors.iter().map(|e| {
        let (line, column) = line_column(text, e.span.start);
        let hint = e.hint.clone().unwrap_or_else(|| "-".to_owned());
        format!("{line}:{column}: {e} | {} | {hint}", &text[e.span.clone()])
    });
    shown.collect()
}

/// Holds the mistakes of a file against those expected, each whole.
fn check(text: &str, expected: &[&str]) {
    assert_eq!(mistakes(text), expected, "in\n{text}");
}

/// A rule with these lines under `find`, under `edit` and below.
fn rule(find: &[&str], edit: &[&str], below: &[&str]) -> String {
    let lines = |of: &[&str]| of.iter().flat_map(|l| ["    ", l, "\n"]).collect::<String>();
    format!("rule a\n  says \"x\"\n  find\n{}  edit\n{}{}", lines(find), lines(edit), lines(below))
}

const ORDER: &str =
    "a rule has these parts, in this order: rule, says, settings, (case,) find, where, edit, uses or gives";

#[test]
fn shipped_files_are_read() {
    for (file, text) in SHIPPED {
        assert_eq!(mistakes(text), Vec::<String>::new(), "in {file}");
    }
    let set = RuleSet::shipped();
    let shown: Vec<String> =
        set.rules().iter().map(|r| format!("{} {}", r.name, if r.on_by_default { "on" } else { "off" })).collect();
    assert_eq!(
        shown,
        [
            "hydrogenolysis on",
            "aryl-hydrogenolysis off",
            "vicinal-elimination on",
            "geminal-elimination on",
            "conjugate-elimination off",
            "vinylidene-elimination off",
            "dehydrohalogenation off",
            "alkyne-hydrogenation on",
            "alkene-hydrogenation on",
            "carbene-hydration on",
            "carbene-shift on",
            "hydrolysis off",
            "coupling off",
        ]
    );
}

#[test]
fn only_rules_that_change_the_skeleton_leave_the_frame() {
    let set = RuleSet::shipped();
    let leaving = set.rules().iter().filter(|r| !r.cases.iter().all(haloshed::rules::Case::is_in_frame));
    assert_eq!(leaving.map(|r| r.name.as_str()).collect::<Vec<_>>(), ["carbene-hydration", "hydrolysis", "coupling"]);
}

#[test]
fn three_mistakes_show_three() {
    check(
        "rule a\n  says \"x\"\n  fnid\n    site A\n    halogen X on A\n  edit\n    relaese X\n    add hydrogen to A\n  \
         uses 2 electrons\n  uses 1 protn\n",
        &[
            "3:3: `fnid` begins no line of a rule | fnid | did you mean `find`?",
            "7:5: `relaese` begins no line of a rule | relaese | did you mean `release`?",
            "10:10: expected `electron`, `proton` or `water`, found `protn` | protn | did you mean `proton`?",
        ],
    );
}

#[test]
fn mistakes_of_reading_and_of_meaning_show_together() {
    let wrong_sum = rule(&["site A", "halogen X on A"], &["release X", "add hydrogen to A"], &["uses 1 electron"]);
    let text = format!("{wrong_sum}rule b\n  say \"y\"\n");
    check(
        &text,
        &[
            "6:3: hydrogen does not balance: expected `uses 1 proton`, found no protons | edit | add `uses 1 proton` below the edits",
            "9:5: charge does not balance: expected `uses 2 electrons`, found `uses 1 electron` | uses 1 electron | write `uses 2 electrons`",
            "11:3: `say` begins no line of a rule | say | did you mean `says`?",
        ],
    );
}

#[test]
fn words_are_corrected_where_they_stand() {
    check(
        &rule(
            &["site a", "site A saturatd", "halogen X on AB", "bond A-B single or duoble", "A has many hydrogens"],
            &["release", "charge A 3", "new helium H"],
            &["uses x electrons"],
        ),
        &[
            "4:10: expected a label (one capital letter, or one and a digit), found `a` | a | -",
            "5:12: expected `saturated`, `vinyl`, `cumulated`, `acetylenic` or the end of the line, found `saturatd` | saturatd | did you mean `saturated`?",
            "6:18: expected a label (one capital letter, or one and a digit), found `AB` | AB | -",
            "7:24: expected `single`, `double` or `triple`, found `duoble` | duoble | did you mean `double`?",
            "8:11: expected `no`, `at` or a number up to 999, found `many` | many | -",
            "10:12: expected more on this line, found the end of the line |  | -",
            "11:14: expected `+` or `-`, found `3` | 3 | -",
            "12:9: expected `boron`, `carbon`, `nitrogen`, `oxygen`, `fluorine`, `silicon`, `phosphorus`, `sulfur`, `chlorine`, `bromine` or `iodine`, found `helium` | helium | -",
            "13:10: expected a number up to 999, found `x` | x | -",
        ],
    );
    check(
        "rule Big\n  says nothing\n",
        &[
            "1:6: expected a name (lower-case words joined by hyphens), found `Big` | Big | -",
            "2:8: expected a text in double quotes, found `nothing` | nothing | -",
        ],
    );
}

#[test]
fn blocks_are_asked_for_in_their_order() {
    check("rule a\n", &[&format!("1:7: expected `says`, found the end of the file |  | {ORDER}")]);
    check(
        "site A\nrule a\n  says \"x\"\n  find\n  edit\n    release X\n  find\n",
        &[
            &format!("1:1: expected `rule`, found something to find | site A | {ORDER}"),
            "4:3: nothing stands under `find` | find | -",
            &format!("7:3: expected the next rule, found `find` | find | {ORDER}"),
        ],
    );
}

#[test]
fn settings_make_sense() {
    check(
        &rule(
            &["site A", "halogen X on A"],
            &["release X", "add hydrogen to A"],
            &["uses 2 electrons", "uses 1 proton"],
        )
        .replace("  find", "  group b\n  group b\n  copies 3\n  generations 2 to 1\n  find"),
        &[
            "4:3: `group` is given twice | group b | leave one of the lines out",
            "5:3: a rule takes 1 or 2 copies, found 3 | copies 3 | write `copies 2`, or leave the line out",
            "6:3: generations 2 to 1 are none | generations 2 to 1 | write `generations 1 to 2`; parents are generation 0",
        ],
    );
}

#[test]
fn labels_are_known_and_fit() {
    check(
        &rule(&["site A", "halogen X on B"], &["release Z", "add hydrogen to A"], &[]),
        &["5:18: B is not named | B | named here: A and X", "7:13: Z is not named | Z | named here: A and X"],
    );
    check(
        &rule(&["site A", "site A", "halogen X on X"], &["release A"], &[]),
        &[
            "5:10: A is named twice | A | A is a carbon already; take another letter",
            "6:18: X is a halogen, expected a carbon | X | -",
            "8:13: A is a carbon, expected a halogen | A | -",
        ],
    );
    check(
        &rule(&["site A", "halogen X on A"], &["release X'", "release X", "release X"], &[]),
        &[
            "7:13: X' stands in a second copy, but the rule takes one | X' | write `copies 2` above the first `find`",
            "9:5: X is released twice | release X | leave one of the lines out",
        ],
    );
    check(
        &rule(&["site A", "aryl B", "bond A-B single"], &["close carbene A", "make carbene B", "raise A-B"], &[]),
        &[
            "8:19: A is no carbene, expected a `carbene` | A | -",
            "9:18: B is no carbon site, expected a `site` | B | -",
            "10:13: B is an aromatic carbon, expected a `site` | B | -",
        ],
    );
}

#[test]
fn bonds_are_between_known_atoms_and_once() {
    check(
        &rule(
            &["site A", "site B", "bond A-B single", "bond B-A double", "bond A-A single"],
            &["join A-B single"],
            &[],
        ),
        &[
            "7:5: B-A is bonded already | bond B-A double | write one line, such as `bond A-B single or double`",
            "8:5: A cannot be bonded to itself | bond A-A single | -",
            "10:5: A-B is bonded already | join A-B single | to change its order, `raise` or `lower` it",
        ],
    );
    check(
        &rule(&["site A", "site B", "site C", "bond A-B single", "bond B-C single"], &["raise A-C"], &[]),
        &["10:11: no bond A-C under find | A-C | add `bond A-C single` (or another order) under `find`"],
    );
    check(
        &rule(
            &["site A", "site B", "bond A-B single or triple", "A has at least 1 hydrogen", "B has 2 hydrogens"],
            &["raise A-B", "take hydrogen from A", "take hydrogen from B"],
            &["gives 2 protons", "gives 2 electrons"],
        ),
        &[
            "6:5: the bond A-B may be triple, which cannot be raised | bond A-B single or triple | under `find`, give this bond only orders that the edit can change",
        ],
    );
}

#[test]
fn what_is_named_is_used() {
    check(
        &rule(
            &["site A", "site B", "site C", "bond A-B single", "halogen X on A"],
            &["add hydrogen to A"],
            &["uses 1 proton"],
        ),
        &[
            "6:10: C is named but never used | C | leave it out, or say what is done to it or bonded to it",
            "8:13: X is found but never released | X | add `release X`, or ask only for its presence: `A has at least 1 halogen`",
        ],
    );
    check(
        &rule(
            &["site A", "site B", "halogen X on A", "halogen Y on B"],
            &["release X", "release Y", "add hydrogen to A", "add hydrogen to B"],
            &["uses 4 electrons", "uses 2 protons"],
        ),
        &["5:10: B is not joined to the rest of what is found | B | say by `bond` lines how it hangs on the others"],
    );
    let two = rule(
        &["site A", "halogen X on A"],
        &["release X", "release X'", "add hydrogen to A", "add hydrogen to A'", "new oxygen O"],
        &[],
    );
    check(
        &two.replace("  find", "  copies 2\n  find"),
        &[
            "7:3: the second copy is joined to nothing | edit | add an edit such as `join A-A' single`",
            "12:16: O is joined to nothing | O | add an edit such as `join A-O single`",
        ],
    );
    check(
        &rule(
            &["site A", "halogen X on A", "halogen Y on A"],
            &["release X", "release Y", "make carbene A"],
            &["uses 2 electrons", "retain configuration"],
        ),
        &[
            "12:5: no atom loses one ligand and gains one, so no configuration can be retained | retain configuration | leave the line out",
        ],
    );
}

#[test]
fn every_account_balances() {
    check(
        &rule(&["site A", "halogen X on A"], &["release X"], &["uses 1 electron", "uses 1 electron"]),
        &["9:5: the number of electrons is given twice | uses 1 electron | leave one of the lines out"],
    );
    check(
        &rule(&["site A", "halogen X on A"], &["release X"], &["uses 1 electron"]),
        &["4:10: A would have 1 bond too few | A | has `add hydrogen to A` been left out?"],
    );
    check(
        &rule(
            &["site A", "site B", "bond A-B single", "halogen X on A"],
            &["release X", "take hydrogen from B", "raise A-B"],
            &["gives 1 proton"],
        ),
        &["5:10: 1 hydrogen taken from B, which has 0 for sure | B | add `B has at least 1 hydrogen` under `find`"],
    );
    check(
        &rule(
            &["site A", "halogen X on A"],
            &["release X", "new sulfur S", "add hydrogen to S", "join A-S single"],
            &[],
        ),
        &[
            "6:3: hydrogen does not balance: expected `uses 1 proton`, found no protons | edit | add `uses 1 proton` below the edits",
            "6:3: charge does not balance: expected `uses 2 electrons`, found no electrons | edit | add `uses 2 electrons` below the edits",
            "8:16: nothing supplies sulfur: water brings oxygen and hydrogen only | S | only `new oxygen` can balance",
        ],
    );
    check(
        &rule(
            &["site A", "halogen X on A"],
            &["release X", "new oxygen O", "add hydrogen to O", "join A-O single"],
            &["uses 2 electrons"],
        ),
        &[
            "6:3: oxygen does not balance: expected `uses 1 water`, found no water | edit | add `uses 1 water` below the edits",
            "6:3: hydrogen does not balance: expected `gives 1 proton`, found no protons | edit | add `gives 1 proton` below the edits",
            "11:5: charge does not balance: expected no electrons, found `uses 2 electrons` | uses 2 electrons | leave the line out",
        ],
    );
    check(
        &rule(
            &["site A", "halogen X on A"],
            &["release X", "new oxygen O", "join A-O single"],
            &["uses 1 water", "gives 2 protons"],
        ),
        &[
            "6:3: charge does not balance: expected `gives 1 electron`, found no electrons | edit | add `gives 1 electron` below the edits",
            "8:16: O would have 1 bond where oxygen takes 2 | O | add hydrogens to it, join it, or give it a charge",
        ],
    );
}

#[test]
fn names_are_unique_and_no_groups() {
    let one = rule(
        &["site A", "halogen X on A"],
        &["release X", "add hydrogen to A"],
        &["uses 2 electrons", "uses 1 proton"],
    );
    check(&format!("{one}{one}"), &["11:6: two rules are called a | a | give one of them another name"]);
    let error = RuleSet::shipped().with_file_text("mine", &one.replace("rule a", "rule core")).unwrap_err();
    assert_eq!(error.to_string(), "mine:1:6: core is the name of a rule and of a group");
}

#[test]
fn a_users_file_adds_and_replaces() {
    let swap = rule(
        &["site A", "chlorine X on A"],
        &["release X", "add hydrogen to A"],
        &["uses 2 electrons", "uses 1 proton"],
    );
    let set = RuleSet::shipped()
        .with_file_text("mine", &swap.replace("rule a", "rule hydrogenolysis"))
        .and_then(|set| set.with_file_text("mine", &swap.replace("rule a", "rule mine")))
        .unwrap();
    assert_eq!(set.rules().len(), 14);
    assert_eq!(set.rules()[0].name, "hydrogenolysis");
    assert_eq!(set.rules()[0].cases[0].halogens[0].allowed, [false, true, false, false]);
    assert_eq!(set.rules()[13].name, "mine");
}

#[test]
fn rules_are_chosen_by_name_and_group() {
    let set = RuleSet::shipped();
    let names = |only: Option<&[&str]>, with: &[&str]| -> Result<Vec<String>, SelectionError> {
        let owned = |names: &[&str]| names.iter().map(|n| (*n).to_owned()).collect::<Vec<_>>();
        let chosen = set.select(&Selection { only: only.map(owned), with: owned(with) })?;
        Ok(chosen.into_iter().map(|r| r.name).collect())
    };
    assert_eq!(names(None, &[]).unwrap().len(), 7);
    assert_eq!(names(None, &["coupling"]).unwrap().len(), 8);
    assert_eq!(names(Some(&["hydrolysis", "core"]), &[]).unwrap()[0], "hydrogenolysis");
    assert_eq!(names(Some(&[]), &["carbene-shift"]).unwrap(), ["carbene-shift"]);
    let Err(SelectionError::UnknownName { name, nearest, known }) = names(None, &["hydrogenolisis"]) else {
        panic!("there is no such rule")
    };
    assert_eq!((name.as_str(), nearest), ("hydrogenolisis", vec!["hydrogenolysis".to_owned()]));
    assert_eq!(known.len(), 14);
}

#[test]
fn line_breaks_marks_and_case_of_words_do_not_matter() {
    let (_, text) = SHIPPED[0];
    let plain = read_rules("f", text).unwrap();
    let windows = format!("\u{FEFF}{}", text.replace('\n', "\r\n"));
    assert_eq!(read_rules("f", &windows).unwrap()[1].cases, plain[1].cases);
    let shouted = text.replace("find", "FIND").replace("release", "Release").replace("uses", "USES");
    assert_eq!(read_rules("f", &shouted).unwrap()[1].cases, plain[1].cases);
    assert_eq!(read_rules("f", text.trim_end()).unwrap()[1].cases, plain[1].cases);
    assert_eq!(read_rules("f", "").unwrap(), []);
}

proptest! {
    #[test]
    fn any_bytes_are_read_without_panic(bytes in proptest::collection::vec(any::<u8>(), 0..300)) {
        let text = String::from_utf8_lossy(&bytes);
        points_inside(&text);
    }

    #[test]
    fn any_lines_of_the_language_are_read_without_panic(picks in proptest::collection::vec(0usize..200, 0..40)) {
        let lines: Vec<&str> = SHIPPED.iter().flat_map(|(_, text)| text.lines()).collect();
        let text: String = picks.iter().flat_map(|&i| [lines[i % lines.len()], "\n"]).collect();
        points_inside(&text);
    }

    #[test]
    fn a_changed_character_is_no_panic(file in 0usize..SHIPPED.len(), at in 0usize..4000, c in any::<char>()) {
        let mut letters: Vec<char> = SHIPPED[file].1.chars().collect();
        let at = at % letters.len();
        letters[at] = c;
        points_inside(&letters.into_iter().collect::<String>());
    }
}

/// Reads a text and asks that every mistake lies in it.
fn points_inside(text: &str) {
    let (_, errors) = rule_file(text);
    let checked = read_rules("any", text).err().map(|e| e.errors).unwrap_or_default();
    for error in errors.iter().chain(&checked) {
        assert!(text.get(error.span.clone()).is_some(), "{error:?} lies outside {text:?}");
        assert!(!error.to_string().is_empty());
    }
}

#[test]
fn the_rules_shown_in_the_guide_are_right() {
    let guide = include_str!("../docs/grammar.md");
    let blocks: Vec<&str> = guide.split("```rules\n").skip(1).filter_map(|b| b.split("```").next()).collect();
    assert_eq!(blocks.len(), 4);
    for block in blocks {
        assert_eq!(mistakes(block), Vec::<String>::new(), "in\n{block}");
    }
}

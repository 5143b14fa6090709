//! Makes a [`Rule`] of a [`RuleText`], or says what is wrong with it.
//!
//! This file sees to what concerns a rule as a whole: its name and settings. Each case goes
//! through `pattern` (labels, what to find), `edits` (what
//! to do) and `balance` (valence, mass, charge). Every mistake is gathered;
//! a rule comes out only if there is none.

use super::balance::balance;
use super::edits::{edits, whole_pattern_is_used};
use super::error::{RuleError, RuleErrorKind, RuleFileError};
use super::parse::rule_file;
use super::pattern::{Labels, pattern};
use super::rule::{Case, Configuration, RingLimits, Rule};
use super::syntax::{Budget, CaseOption, CaseText, Reagent, RuleText, Setting, Span, Spanned, Switch};

/// Reads and checks a rule file.
///
/// # Errors
/// * anything in it is wrong: every mistake, in the order of the text
///
/// # Example
/// ```
/// use haloshed::rules::check::read_rules;
///
/// let text = "rule swap\n says \"a chlorine gives way to a hydrogen\"\n find\n  site A\n  chlorine X on A\n \
///             edit\n  release X\n  add hydrogen to A\n uses 2 electrons\n uses 1 proton\n";
/// let rules = read_rules("my.rules", text)?;
/// assert_eq!(rules[0].name, "swap");
/// # Ok::<(), haloshed::rules::error::RuleFileError>(())
/// ```
pub fn read_rules(file: &str, text: &str) -> Result<Vec<Rule>, RuleFileError> {
    read_rules_beside(file, text, &[])
}

/// Reads and checks a rule file whose rules are added to others, or replace them by name.
pub(super) fn read_rules_beside(file: &str, text: &str, others: &[Rule]) -> Result<Vec<Rule>, RuleFileError> {
    let (trees, mut errors) = rule_file(text);
    let rules: Vec<Rule> = trees.iter().map(|tree| rule(tree, text, &mut errors)).collect();
    names(&trees, &rules, others, &mut errors);
    if errors.is_empty() {
        return Ok(rules);
    }
    errors.sort_by_key(|e| (e.span.start, e.span.end));
    Err(RuleFileError { file: file.to_owned(), text: text.to_owned(), errors })
}

/// Checks that no two rules of a file have one name, and that no name is a rule's and a group's.
fn names(trees: &[RuleText], rules: &[Rule], others: &[Rule], errors: &mut Vec<RuleError>) {
    let staying = || others.iter().filter(|other| rules.iter().all(|rule| rule.name != other.name));
    for (index, tree) in trees.iter().enumerate() {
        let name = &tree.name;
        if rules[..index].iter().any(|before| before.name == name.value) {
            let kind = RuleErrorKind::NameTaken { name: name.value.clone() };
            errors.push(error(kind, &name.span, "the second one").hint("give one of them another name"));
        }
        if rules.iter().chain(staying()).any(|rule| rule.group.as_ref() == Some(&name.value)) {
            let kind = RuleErrorKind::NameIsGroup { name: name.value.clone() };
            errors.push(error(kind, &name.span, "this rule").hint("give the rule or the group another name"));
        }
        for setting in &tree.settings {
            let Setting::Group(group) = &setting.value else { continue };
            if staying().any(|other| other.name == *group) {
                let kind = RuleErrorKind::NameIsGroup { name: group.clone() };
                errors.push(error(kind, &setting.span, "this group").hint("give the group another name"));
            }
        }
    }
}

/// An error without a hint.
pub(super) fn error(kind: RuleErrorKind, span: &Span, label: &str) -> RuleError {
    RuleError { kind, span: span.clone(), label: label.to_owned(), hint: None }
}

impl RuleError {
    /// The same error with something to do about it.
    pub(super) fn hint(mut self, hint: impl Into<String>) -> RuleError {
        self.hint = Some(hint.into());
        self
    }
}

/// Checks one rule; what comes out is only good if no error was added.
fn rule(tree: &RuleText, text: &str, errors: &mut Vec<RuleError>) -> Rule {
    let mut rule = Rule {
        name: tree.name.value.clone(),
        summary: tree.says.value.clone(),
        group: None,
        on_by_default: true,
        copies: 1,
        generations: None,
        cases: Vec::new(),
        text: text[tree.span.clone()].to_owned(),
    };
    settings(tree, &mut rule, errors);
    for case in &tree.cases {
        rule.cases.push(checked_case(case, rule.copies, errors));
    }
    rule
}

fn settings(tree: &RuleText, rule: &mut Rule, errors: &mut Vec<RuleError>) {
    let mut given: Vec<&'static str> = Vec::new();
    for setting in &tree.settings {
        let what = match &setting.value {
            Setting::Group(name) => {
                rule.group = Some(name.clone());
                "`group`"
            }
            Setting::Default(switch) => {
                rule.on_by_default = *switch == Switch::On;
                "`default`"
            }
            Setting::Copies(copies) => {
                rule.copies = if *copies == 2 { 2 } else { 1 };
                if !(1..=2).contains(copies) {
                    let kind = RuleErrorKind::Copies { copies: *copies };
                    errors
                        .push(error(kind, &setting.span, "this many").hint("write `copies 2`, or leave the line out"));
                }
                "`copies`"
            }
            Setting::Generations(from, to) => {
                rule.generations = Some(*from..=*to);
                if from > to {
                    let kind = RuleErrorKind::Generations { from: *from, to: *to };
                    let hint = format!("write `generations {to} to {from}`; parents are generation 0");
                    errors.push(error(kind, &setting.span, "no generation lies here").hint(hint));
                }
                "`generations`"
            }
        };
        given_once(what, &mut given, &setting.span, errors);
    }
}

/// Reports what is given a second time.
fn given_once<T: PartialEq + Copy + Named>(what: T, given: &mut Vec<T>, span: &Span, errors: &mut Vec<RuleError>) {
    if given.contains(&what) {
        let kind = RuleErrorKind::GivenTwice { what: what.named() };
        errors.push(error(kind, span, "the second time").hint("leave one of the lines out"));
    }
    given.push(what);
}

/// What is given once, and how it is called.
trait Named {
    fn named(self) -> &'static str;
}

impl Named for &'static str {
    fn named(self) -> &'static str {
        self
    }
}

impl Named for Reagent {
    fn named(self) -> &'static str {
        match self {
            Reagent::Electron => "the number of electrons",
            Reagent::Proton => "the number of protons",
            Reagent::Water => "the number of waters",
        }
    }
}

impl Named for CaseOption {
    fn named(self) -> &'static str {
        match self {
            CaseOption::RetainConfiguration => "`retain configuration`",
            CaseOption::RingLimitsOff => "`ring limits off`",
        }
    }
}

/// Checks one case; what comes out is only good if no error was added.
fn checked_case(tree: &CaseText, copies: u8, errors: &mut Vec<RuleError>) -> Case {
    let n_errors = errors.len();
    let mut labels = Labels::new(copies);
    let mut case = pattern(tree, &mut labels, errors);
    budgets(&tree.budgets, &mut case, errors);
    options(&tree.options, &mut case, errors);
    edits(tree, &mut labels, &mut case, errors);
    // Sums over a pattern with holes in it would only report the holes again.
    if errors.len() == n_errors {
        whole_pattern_is_used(tree, copies, &case, errors);
    }
    if errors.len() == n_errors {
        balance(tree, &case, errors);
    }
    case
}

fn budgets(lines: &[Spanned<Budget>], case: &mut Case, errors: &mut Vec<RuleError>) {
    let mut given = Vec::new();
    for line in lines {
        let Budget { reagent, consumed } = line.value;
        match reagent {
            Reagent::Electron => case.electrons = consumed,
            Reagent::Proton => case.protons = consumed,
            Reagent::Water => case.water = consumed,
        }
        given_once(reagent, &mut given, &line.span, errors);
    }
}

fn options(lines: &[Spanned<CaseOption>], case: &mut Case, errors: &mut Vec<RuleError>) {
    let mut given = Vec::new();
    for line in lines {
        match line.value {
            CaseOption::RetainConfiguration => case.configuration = Configuration::Retained,
            CaseOption::RingLimitsOff => case.ring_limits = RingLimits::Off,
        }
        given_once(line.value, &mut given, &line.span, errors);
    }
}

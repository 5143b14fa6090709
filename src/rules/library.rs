//! The rules at hand: those shipped with the program, and those of the user's own files.
//!
//! A rule set keeps its rules in the order they came; a rule of the same name takes the place
//! of the one before. Which of them are used is chosen by names of rules and groups.

use super::check::read_rules_beside;
use super::error::{RuleFileError, SelectionError, nearest};
use super::rule::Rule;

/// The shipped files, by name.
pub const SHIPPED: [(&str, &str); 6] = [
    ("hydrogenolysis.rules", include_str!("../../rules/hydrogenolysis.rules")),
    ("elimination.rules", include_str!("../../rules/elimination.rules")),
    ("hydrogenation.rules", include_str!("../../rules/hydrogenation.rules")),
    ("carbene.rules", include_str!("../../rules/carbene.rules")),
    ("hydrolysis.rules", include_str!("../../rules/hydrolysis.rules")),
    ("coupling.rules", include_str!("../../rules/coupling.rules")),
];

/// Rules with different names, in a fixed order.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct RuleSet {
    rules: Vec<Rule>,
}

/// Which rules of a set to use.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Selection {
    /// Names of rules and groups: these and no others. None: those on by default.
    pub only: Option<Vec<String>>,
    /// Names of rules and groups to use besides.
    pub with: Vec<String>,
}

impl RuleSet {
    /// The rules that are shipped with the program.
    ///
    /// # Panics
    /// Never: the shipped files are read by a test.
    ///
    /// # Example
    /// ```
    /// use haloshed::rules::library::RuleSet;
    ///
    /// let shipped = RuleSet::shipped();
    /// assert!(shipped.get("hydrogenolysis").is_some_and(|rule| rule.on_by_default));
    /// ```
    pub fn shipped() -> RuleSet {
        SHIPPED.iter().fold(RuleSet::default(), |set, (file, text)| {
            set.with_file_text(file, text).expect("the shipped files are read by a test")
        })
    }

    /// This set with the rules of a file added; those of a known name replace it in its place.
    ///
    /// # Errors
    /// * anything in the file is wrong, or a rule has the name of a group: every mistake in it
    pub fn with_file_text(mut self, file: &str, text: &str) -> Result<RuleSet, RuleFileError> {
        for rule in read_rules_beside(file, text, &self.rules)? {
            match self.rules.iter_mut().find(|known| known.name == rule.name) {
                Some(known) => *known = rule,
                None => self.rules.push(rule),
            }
        }
        Ok(self)
    }

    /// The rules in their order.
    pub fn rules(&self) -> &[Rule] {
        &self.rules
    }

    /// The rule with this name.
    pub fn get(&self, name: &str) -> Option<&Rule> {
        self.rules.iter().find(|rule| rule.name == name)
    }

    /// Names of the groups, each once, in the order of their first rules.
    pub fn groups(&self) -> Vec<&str> {
        let mut groups: Vec<&str> = Vec::new();
        for group in self.rules.iter().filter_map(|rule| rule.group.as_deref()) {
            if !groups.contains(&group) {
                groups.push(group);
            }
        }
        groups
    }

    /// The rule with this name, or the rules of the group with this name.
    ///
    /// # Errors
    /// * there is neither: `UnknownName`, with the nearest names
    pub fn named(&self, name: &str) -> Result<Vec<&Rule>, SelectionError> {
        if let Some(rule) = self.get(name) {
            return Ok(vec![rule]);
        }
        let group: Vec<&Rule> = self.rules.iter().filter(|rule| rule.group.as_deref() == Some(name)).collect();
        if group.is_empty() { Err(self.unknown(name)) } else { Ok(group) }
    }

    fn unknown(&self, name: &str) -> SelectionError {
        let known: Vec<&str> = self.rules.iter().map(|rule| rule.name.as_str()).chain(self.groups()).collect();
        SelectionError::UnknownName {
            name: name.to_owned(),
            nearest: nearest(name, known.iter().copied()),
            known: known.into_iter().map(str::to_owned).collect(),
        }
    }

    /// The chosen rules, each once, in the order of the set.
    ///
    /// # Errors
    /// * a chosen name is that of no rule and no group: `UnknownName`, with the nearest names
    ///
    /// # Example
    /// ```
    /// use haloshed::rules::library::{RuleSet, Selection};
    ///
    /// let set = RuleSet::shipped();
    /// let core = Selection { only: Some(vec!["core".to_owned()]), with: vec![] };
    /// let names: Vec<String> = set.select(&core)?.into_iter().map(|rule| rule.name).collect();
    /// assert_eq!(names, ["hydrogenolysis", "vicinal-elimination", "geminal-elimination"]);
    /// # Ok::<(), haloshed::rules::error::SelectionError>(())
    /// ```
    pub fn select(&self, selection: &Selection) -> Result<Vec<Rule>, SelectionError> {
        let mut chosen: Vec<&str> = match &selection.only {
            None => self.rules.iter().filter(|rule| rule.on_by_default).map(|rule| rule.name.as_str()).collect(),
            Some(_) => Vec::new(),
        };
        for name in selection.only.iter().flatten().chain(&selection.with) {
            chosen.extend(self.named(name)?.into_iter().map(|rule| rule.name.as_str()));
        }
        Ok(self.rules.iter().filter(|rule| chosen.contains(&rule.name.as_str())).cloned().collect())
    }
}

//! Why a command gave no result.

use super::report::Report;

/// What went wrong, and whose fault it is.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Failure {
    pub(crate) kind: FailureKind,
    /// At least one.
    pub(crate) reports: Vec<Report>,
}

/// Kinds of failure, by exit code.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) enum FailureKind {
    /// A compound, a file or a rule is wrong.
    BadInput,
    /// The options do not go together.
    WrongUsage,
}

impl FailureKind {
    pub(crate) fn exit_code(self) -> u8 {
        match self {
            FailureKind::BadInput => 1,
            FailureKind::WrongUsage => 2,
        }
    }
}

impl Failure {
    /// Options that do not go together, and what to do.
    pub(crate) fn usage(message: impl Into<String>, help: impl Into<String>) -> Failure {
        let report = Report { message: message.into(), excerpt: None, help: Some(help.into()) };
        Failure { kind: FailureKind::WrongUsage, reports: vec![report] }
    }
}

impl From<Report> for Failure {
    fn from(report: Report) -> Failure {
        Failure { kind: FailureKind::BadInput, reports: vec![report] }
    }
}

impl From<Vec<Report>> for Failure {
    fn from(reports: Vec<Report>) -> Failure {
        Failure { kind: FailureKind::BadInput, reports }
    }
}

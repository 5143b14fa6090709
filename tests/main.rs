//! Tests of behaviour, one module a capability.
mod rule_files;

//! Tests of behaviour, one module a capability.

#![allow(clippy::unwrap_used, reason = "a test that cannot go on should stop where it is")]

mod catalogue;
mod commands;
mod condensed;
mod drawing;
mod engines_agree;
mod floors;
mod frame;
mod network;
mod output;
mod outside;
mod readme;
mod reference;
mod rule_files;
mod rule_products;
mod rule_sentences;
mod sentences;
mod smiles;
mod thermo;

//! Tests of behaviour, one module a capability.
mod drawing;
mod reference;
mod rule_files;
mod rule_products;

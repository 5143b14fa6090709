//! Tests of behaviour, one module a capability.

mod sentences;
mod smiles;

//! Finds everything that a halogenated compound can turn into under reducing conditions.

pub mod molecule;
pub mod smiles;

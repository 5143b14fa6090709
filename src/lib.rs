//! Finds everything that a halogenated compound can turn into under reducing conditions.

pub mod catalogue;
pub mod frame;
pub mod molecule;
pub mod network;
pub mod output;
pub mod rules;
pub mod smiles;
pub mod thermo;

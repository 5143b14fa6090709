//! Reading and writing SMILES.

mod errors;
mod grammar;
mod isomers;
mod molecules;
mod reading;
mod roundtrip;

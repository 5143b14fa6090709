//! Checks against what others have worked out, a module a source.

mod counts;
mod energies;
mod masses;
mod rdkit;
mod steps;

//! What leaves the program: every writer, its whole output read before it was accepted.

mod sample;

mod figures;

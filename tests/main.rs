//! Tests of behaviour, one module a capability.

#![allow(clippy::unwrap_used, reason = "a test that cannot go on should stop where it is")]

mod floors;
mod frame;
mod outside;

//! Tests of behaviour, one module a capability.

mod frame;

//! Tests of behaviour, one module a capability.

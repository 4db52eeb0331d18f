//! Stub.
pub mod angle;
pub mod bounds;
pub mod measures;
pub mod tables;
pub mod task;

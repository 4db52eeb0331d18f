//! The panels: each reads the state and returns actions.

pub mod client;
pub mod dialogs;
pub mod figure;
pub mod map;
pub mod meaning;
pub mod measured;
pub mod plots;
pub mod top;
pub mod why;

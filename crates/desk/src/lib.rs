//! The desk: the window and the command line.
//!
//! One direction: the document is studied, the study drawn, a widget returns an action, `apply`
//! makes the new state. Panels never change anything.

pub mod action;
pub mod app;
pub mod apply;
pub mod cli;
pub mod command;
pub mod computed;
pub mod demo;
pub mod document;
pub mod drag;
pub mod entry;
pub mod fields;
pub mod frame_times;
pub mod history;
pub mod names;
pub mod outside;
pub mod painter;
pub mod panels;
pub mod program;
pub mod sheets;
pub mod shell;
pub mod state;
pub mod theme;

pub use program::program;

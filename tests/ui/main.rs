//! The desk without a display. Everything is found by role and name, so these tests also hold that it can be worked
//! with a screen reader and without a pointer.

mod both;
mod fields;
mod files;
mod handles;
mod history;
mod layout;
mod matching;
mod pictures;
mod reach;
mod views;

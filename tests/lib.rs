//! Shared helpers of the acceptance tests: the demo clients, the whole desk without a display, pictures drawn on the
//! CPU, and how alike two pictures are.

pub mod clients;
pub mod desk;
pub mod drawn;
pub mod picture;
pub mod soft;

//! Physics of the squat, checked by routes that do not pass through the solver.
//!
//! - `explicit` writes the model a second time as plain sums over all segments; `brute` finds lean
//!   ranges, depths and postures by scanning. Neither shares code with the solver beyond the public
//!   values of body, limits, task and tables.
//! - `clients` draws random valid clients. The number of cases is 256, or `PLUMBFOLD_CASES`; the
//!   draws are the same in every run unless `PLUMBFOLD_SEED` gives another seed.
//! - Every other file is one subject. `published` prints its figures with `-- --nocapture`.

mod balance;
mod brute;
mod by_hand;
mod chain;
mod clients;
mod continuity;
mod depth;
mod explicit;
mod folded;
mod limits;
mod near;
mod published;
mod published_loads;
mod refusal;
mod rules;
mod scale;
mod trade;
mod virtual_work;
mod whole;

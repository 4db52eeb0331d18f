//! Why not lower, and what would change it, checked by putting every answer back.
//!
//! - `put_back` enters a change where a person would, and builds the case anew; it also writes the
//!   ranges of amounts a second time. `amounts`, `pairs` and `limits` use it on 500 random clients, or
//!   one in twenty of `PLUMBFOLD_CASES` where that is more.
//! - `map` holds the map against single balances and against depths, `seen` the seen squat against
//!   its tolerances, `by_hand` one client against numbers of two other solvers.
//! - `nothing` and `told` ask what is said where there is no answer, and in which shape.

mod amounts;
#[path = "../physics/brute.rs"]
#[expect(dead_code, reason = "the physics tests use all of it")]
mod brute;
mod by_hand;
#[path = "../physics/clients.rs"]
#[expect(dead_code, reason = "the physics tests use all of it")]
mod clients;
#[path = "../physics/explicit.rs"]
#[expect(dead_code, reason = "the physics tests use all of it")]
mod explicit;
mod limits;
mod map;
#[path = "../physics/near.rs"]
#[expect(dead_code, reason = "the physics tests use all of it")]
mod near;
mod nothing;
mod pairs;
mod put_back;
mod seen;
mod told;

//! The model proved from outside: the numbers of other people's engines and optimisers, as
//! `tests/reference/statics.py` and `optima.py` wrote them, against the program's. Neither Python nor
//! network is needed here.
//!
//! - `statics`: centre of mass and static joint torques by Pinocchio and MuJoCo.
//! - `optima`: depths, least effort, least amounts by SciPy.
//! - `made_by`: whether the numbers still belong to the scripts that made them.

mod made_by;
mod optima;
mod reference;
mod statics;

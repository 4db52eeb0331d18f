//! Between the saved structs of one format version and the next, and to the types of today.
//!
//! Each version keeps its own structs, frozen once released, and shares those that did not change
//! with the version before. A later version adds a module beside `v2` and a step here; only the
//! newest is turned into the types the desk edits. Files of every old version stay readable, and a
//! fixture of each is kept under `tests/files/fixtures`.

use std::convert::Infallible;

use crate::{client::Client, explain::Trouble, read::parse, saved::Saved as _, v1, v2};

/// Reads a text as a file of format `format`, or as the current one where the format is missing or
/// is none that ever was, so that the error names that field.
pub(crate) fn to_current(text: &str, format: Option<u32>) -> Result<Client, Trouble> {
    let file = match format {
        Some(1) => v1_to_v2(parse(text)?),
        Some(_) | None => parse::<v2::File>(text)?,
    };
    Ok(file.live())
}

/// A file of format 1 in format 2: the same with nothing added.
fn v1_to_v2(file: v1::File) -> v2::File {
    let Ok(file) = file.with_tasks(|task| Ok::<_, Infallible>(task.up()));
    file
}

/// A file of format 2 in format 1; `None` where it holds anything that format 1 cannot.
pub(crate) fn v2_to_v1(file: v2::File) -> Option<v1::File> {
    file.with_tasks(|task| v1::Task::down(task).ok_or(())).ok()
}

/// A struct and what has become of it in the next format.
trait Step: Sized {
    type Next;
    /// To the next format.
    fn up(self) -> Self::Next;
    /// Back from the next format; `None` where that would lose something.
    fn down(next: Self::Next) -> Option<Self>;
}

impl<T: Step> Step for Option<T> {
    type Next = Option<T::Next>;
    fn up(self) -> Self::Next {
        self.map(T::up)
    }
    fn down(next: Self::Next) -> Option<Self> {
        match next {
            None => Some(None),
            Some(next) => T::down(next).map(Some),
        }
    }
}

/// The fields that are the same, those that are themselves a step apart, and those that are new.
macro_rules! step {
    ($old:ty => $new:ty { same: $($same:ident),+; stepped: $($stepped:ident),*; added: $($added:ident),* $(;)? }) => {
        impl Step for $old {
            type Next = $new;
            fn up(self) -> Self::Next {
                let Self { $($same,)* $($stepped,)* } = self;
                Self::Next { $($same,)* $($stepped: $stepped.up(),)* $($added: None,)* }
            }
            fn down(next: Self::Next) -> Option<Self> {
                let Self::Next { $($same,)* $($stepped,)* $($added,)* } = next;
                if $($added.is_some())||* {
                    return None;
                }
                Some(Self { $($same,)* $($stepped: Step::down($stepped)?,)* })
            }
        }
    };
}

step!(v1::Task => v2::Task {
    same: name, placement, load_kg, footwear_drop_mm, heel_raise_mm, stance_width_cm, toe_out_deg, bend,
          lean_limit_deg, goal_thigh_deg, weight_left_percent, rule, support;
    stepped: seen;
    added: felt;
});
step!(v1::Seen => v2::Seen {
    same: thigh_deg, shank_deg, trunk_deg, heels_lifted, pain_0_10, pain_from_thigh_deg, stopped_by;
    stepped: ;
    added: pain_at;
});

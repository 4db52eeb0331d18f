//! Between saved types and the types the desk edits, both ways, nothing lost.
//!
//! Every struct is taken apart and put together by all its fields and every choice by all its words,
//! so that a field added on one side does not compile until it has its place on the other.

/// A saved type and the type it stands for.
pub(crate) trait Saved: Sized {
    /// What the desk edits.
    type Live;
    /// From the file.
    fn live(self) -> Self::Live;
    /// To the file; nothing is checked here.
    fn of(live: &Self::Live) -> Self;
}

impl<T: Saved> Saved for Option<T> {
    type Live = Option<T::Live>;
    fn live(self) -> Self::Live {
        self.map(T::live)
    }
    fn of(live: &Self::Live) -> Self {
        live.as_ref().map(T::of)
    }
}

impl<T: Saved> Saved for Vec<T> {
    type Live = Vec<T::Live>;
    fn live(self) -> Self::Live {
        self.into_iter().map(T::live).collect()
    }
    fn of(live: &Self::Live) -> Self {
        live.iter().map(T::of).collect()
    }
}

impl Saved for bool {
    type Live = Self;
    fn live(self) -> Self {
        self
    }
    fn of(live: &Self) -> Self {
        *live
    }
}

/// A struct whose fields have the same names on both sides.
macro_rules! fields {
    ($saved:ty = $live:ty $(where $param:ident: $bound:path)? { $($field:ident),* $(,)? }) => {
        impl $(<$param: $bound>)? Saved for $saved {
            type Live = $live;
            fn live(self) -> Self::Live {
                let Self { $($field),* } = self;
                Self::Live { $($field: $field.live()),* }
            }
            fn of(live: &Self::Live) -> Self {
                let Self::Live { $($field),* } = live;
                Self { $($field: Saved::of($field)),* }
            }
        }
    };
}
pub(crate) use fields;

/// A choice of the same words on both sides.
macro_rules! words {
    ($saved:ty = $live:ty { $($word:ident),* $(,)? }) => {
        impl Saved for $saved {
            type Live = $live;
            fn live(self) -> Self::Live {
                match self { $(Self::$word => <$live>::$word),* }
            }
            fn of(live: &Self::Live) -> Self {
                match live { $(<$live>::$word => Self::$word),* }
            }
        }
    };
}
pub(crate) use words;

//! A number that is within the bounds of its field, checked while it is read.

use std::fmt;

use plumbfold_core::bounds::{Bounds, Field, bounds};
use serde::{
    Deserialize, Deserializer, Serialize, Serializer,
    de::{Error, MapAccess, SeqAccess, Unexpected, Visitor},
};

use crate::saved::Saved;

/// Stands for "as it is typed in the file": the text at the place of the error says it better than
/// a number would (`1e400`, not `inf`).
pub(crate) const AS_TYPED: &str = "";

/// A finite number within the bounds of the field with this number; write it `within!(Shank)`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(crate) struct Within<const FIELD: usize>(pub f64);

/// The type of a number bounded by a row of the bounds table.
macro_rules! within {
    ($field:ident) => { crate::bounded::Within<{ plumbfold_core::bounds::Field::$field as usize }> };
}
pub(crate) use within;

impl<const FIELD: usize> Within<FIELD> {
    const OF: Field = Field::ALL[FIELD];
}

impl<'de, const FIELD: usize> Deserialize<'de> for Within<FIELD> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        // Asking for anything, not for a number: whatever else stands there comes to the visitor,
        // which knows the bounds; the parser's own error would not.
        deserializer.deserialize_any(Number(bounds(Self::OF))).map(Self)
    }
}

/// Takes finite numbers within bounds and nothing else.
struct Number(&'static Bounds);

impl Number {
    fn refused<T, E: Error>(&self, found: &str) -> Result<T, E> {
        Err(E::invalid_value(Unexpected::Other(found), self))
    }
}

impl<'de> Visitor<'de> for Number {
    type Value = f64;

    fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.0.allowed())
    }

    fn visit_f64<E: Error>(self, value: f64) -> Result<f64, E> {
        // RON takes NaN, inf and 1e400 for numbers; the bounds do not.
        if self.0.holds(value) { Ok(value) } else { self.refused(AS_TYPED) }
    }

    #[expect(clippy::cast_precision_loss, reason = "a number so large that it loses a digit is out of bounds")]
    fn visit_i64<E: Error>(self, value: i64) -> Result<f64, E> {
        self.visit_f64(value as f64)
    }

    #[expect(clippy::cast_precision_loss, reason = "a number so large that it loses a digit is out of bounds")]
    fn visit_u64<E: Error>(self, value: u64) -> Result<f64, E> {
        self.visit_f64(value as f64)
    }

    fn visit_unit<E: Error>(self) -> Result<f64, E> {
        self.refused("a word")
    }

    fn visit_none<E: Error>(self) -> Result<f64, E> {
        self.refused("None")
    }

    fn visit_some<D: Deserializer<'de>>(self, _: D) -> Result<f64, D::Error> {
        self.refused("Some(…)")
    }

    fn visit_seq<A: SeqAccess<'de>>(self, _: A) -> Result<f64, A::Error> {
        self.refused("brackets")
    }

    fn visit_map<A: MapAccess<'de>>(self, _: A) -> Result<f64, A::Error> {
        self.refused("brackets")
    }
}

impl<const FIELD: usize> Serialize for Within<FIELD> {
    fn serialize<S: Serializer>(&self, serializer: S) -> Result<S::Ok, S::Error> {
        // People give ages and pain in whole numbers and find them so in the file.
        let whole = matches!(Self::OF, Field::Age | Field::Pain) && self.0.is_sign_positive() && self.0.fract() == 0.0;
        if whole && self.0 <= f64::from(u32::MAX) {
            #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "whole, positive and small")]
            serializer.serialize_u32(self.0 as u32)
        } else {
            serializer.serialize_f64(self.0)
        }
    }
}

impl<const FIELD: usize> Saved for Within<FIELD> {
    type Live = f64;
    fn live(self) -> f64 {
        self.0
    }
    fn of(live: &f64) -> Self {
        Self(*live)
    }
}

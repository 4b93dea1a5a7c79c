//! Ids of cells: what names a vertex, an edge, a face or one use of an edge.
//!
//! Dense kernels use the four ids below, each a 4-byte newtype. A kernel with generational keys brings its own types; generic code asks for [`Id`] only.

use std::fmt::{self, Debug, Display};
use std::hash::Hash;

/// What every id can do.
///
/// The bounds are all that generic code ever needs of an id, so that `fn f<K: Topology>(mesh: &K)`
/// is enough of a signature.
pub trait Id: Copy + Ord + Hash + Debug + Send + Sync + 'static {
    /// The place of this id's slot: below the kernel's `*_bound`, for sizing and indexing columns.
    fn index(self) -> usize;

    /// How often the slot was handed out before, where the kernel counts that; else 0.
    fn generation(self) -> u32;
}

/// An index above the largest one a dense id can hold.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error(
    "index {index} is beyond {max}, the largest a dense {kind} id can hold; split the mesh or use a kernel with wider ids",
    max = MAX_DENSE_INDEX
)]
pub struct IdError {
    /// Which kind of id was asked for.
    pub kind: &'static str,
    /// The index that did not fit.
    pub index: usize,
}

/// The largest index of a dense id, 2³¹ − 2: kernels keep a bit beside a stored index, and one
/// value for "none".
pub const MAX_DENSE_INDEX: usize = (1 << 31) - 2;

macro_rules! dense_id {
    ($(#[$doc:meta])* $name:ident, $kind:literal, $letter:literal) => {
        $(#[$doc])*
        ///
        /// Holds its index and nothing else: a spare value for `Option` would cost every step of
        /// every walk two or three instructions more.
        ///
        /// ```
        #[doc = concat!("use merestone_topology::{Id, ", stringify!($name), "};")]
        #[doc = concat!("let id = ", stringify!($name), "::new(7)?;")]
        /// assert_eq!(id.index(), 7);
        #[doc = concat!("assert_eq!(format!(\"{id}\"), \"", $letter, "7\");")]
        /// # Ok::<(), merestone_topology::IdError>(())
        /// ```
        #[derive(Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
        pub struct $name(u32);

        impl $name {
            /// The id with this index.
            ///
            /// # Errors
            /// [`IdError`] when `index` exceeds [`MAX_DENSE_INDEX`].
            #[inline]
            pub const fn new(index: usize) -> Result<Self, IdError> {
                if index > MAX_DENSE_INDEX {
                    return Err(IdError { kind: $kind, index });
                }
                Ok(Self::from_u32(index as u32))
            }

            /// The id with this index, for kernels that know it to be in range. One out of range
            /// names no cell of any topology.
            #[inline(always)]
            #[must_use]
            pub const fn from_u32(index: u32) -> Self {
                Self(index)
            }

            /// The index as the kernels store it.
            #[inline(always)]
            #[must_use]
            pub const fn to_u32(self) -> u32 {
                self.0
            }
        }

        impl Id for $name {
            #[inline(always)]
            fn index(self) -> usize {
                self.to_u32() as usize
            }

            #[inline(always)]
            fn generation(self) -> u32 {
                0
            }
        }

        impl Debug for $name {
            fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
                write!(f, "{}{}", $letter, self.to_u32())
            }
        }

        impl Display for $name {
            fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
                Debug::fmt(self, f)
            }
        }
    };
}

dense_id!(
    /// A vertex of a dense kernel.
    VertexId, "vertex", "v"
);
dense_id!(
    /// An edge of a dense kernel.
    EdgeId, "edge", "e"
);
dense_id!(
    /// A face of a dense kernel.
    FaceId, "face", "f"
);
dense_id!(
    /// An oriented edge (one use of an edge by one face) of a dense kernel.
    OrientedEdgeId, "oriented edge", "h"
);

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_largest_index_fits_and_the_next_is_refused_with_its_value() {
        assert_eq!(VertexId::new(MAX_DENSE_INDEX).unwrap().index(), MAX_DENSE_INDEX);
        let error = FaceId::new(MAX_DENSE_INDEX + 1).unwrap_err();
        assert_eq!(error, IdError { kind: "face", index: MAX_DENSE_INDEX + 1 });
        assert!(error.to_string().contains("2147483647"), "{error}");
    }

    #[test]
    fn ids_order_by_index() {
        assert!(VertexId::from_u32(3) < VertexId::from_u32(4));
        assert_eq!(EdgeId::from_u32(0).index(), 0);
    }
}

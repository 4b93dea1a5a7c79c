//! Columns: one value a cell, indexed by id.

use crate::Id;
use std::fmt::{self, Debug};
use std::marker::PhantomData;
use std::ops::{Index, IndexMut};

/// One value for every slot of a kind of cell.
///
/// Asked for from a topology ([`vertex_column`](crate::TopologyExt::vertex_column) and sisters)
/// and never sized by hand: a column has a value for every id its topology can hold, retired
/// slots included.
///
/// ```
/// use merestone_topology::{Column, VertexId};
/// let mut height: Column<VertexId, f64> = Column::new(3, 0.0);
/// let v = VertexId::new(2)?;
/// height[v] = 1.5;
/// assert_eq!(height.values(), [0.0, 0.0, 1.5]);
/// # Ok::<(), merestone_topology::IdError>(())
/// ```
pub struct Column<I, T> {
    values: Vec<T>,
    _id: PhantomData<fn(I)>,
}

impl<I: Id, T> Column<I, T> {
    /// `value` for each of `bound` slots.
    #[must_use]
    pub fn new(bound: usize, value: T) -> Self
    where
        T: Clone,
    {
        Self::from_values(vec![value; bound])
    }

    /// The values by index, taken over.
    #[must_use]
    pub fn from_values(values: Vec<T>) -> Self {
        Self { values, _id: PhantomData }
    }

    /// The value of `id`, unless the column was asked for before that slot came to be.
    #[inline]
    #[must_use]
    pub fn get(&self, id: I) -> Option<&T> {
        self.values.get(id.index())
    }

    /// The value of `id`, to be changed.
    #[inline]
    pub fn get_mut(&mut self, id: I) -> Option<&mut T> {
        self.values.get_mut(id.index())
    }

    /// All values by index.
    #[inline]
    #[must_use]
    pub fn values(&self) -> &[T] {
        &self.values
    }

    /// All values by index, to be changed.
    #[inline]
    pub fn values_mut(&mut self) -> &mut [T] {
        &mut self.values
    }

    /// The values, by index.
    #[must_use]
    pub fn into_values(self) -> Vec<T> {
        self.values
    }

    /// The column after a compaction or conversion: the values of the cells that live on, each at
    /// its new place, and `value` for cells that came from none. O(slots).
    #[must_use]
    pub fn follow<J: Id>(self, moved: &Correspondence<I, J>, value: T) -> Column<J, T>
    where
        T: Clone,
    {
        let mut values = vec![value; moved.new_bound()];
        for (value, new) in self.values.into_iter().zip(moved.targets()) {
            if let Some(place) = new.and_then(|new| values.get_mut(new.index())) {
                *place = value;
            }
        }
        Column::from_values(values)
    }
}

impl<I: Id, T> Index<I> for Column<I, T> {
    type Output = T;

    #[inline]
    #[track_caller]
    fn index(&self, id: I) -> &T {
        &self.values[id.index()]
    }
}

impl<I: Id, T> IndexMut<I> for Column<I, T> {
    #[inline]
    #[track_caller]
    fn index_mut(&mut self, id: I) -> &mut T {
        &mut self.values[id.index()]
    }
}

impl<I, T: Clone> Clone for Column<I, T> {
    fn clone(&self) -> Self {
        Self { values: self.values.clone(), _id: PhantomData }
    }
}

impl<I, T: PartialEq> PartialEq for Column<I, T> {
    fn eq(&self, other: &Self) -> bool {
        self.values == other.values
    }
}

impl<I, T: Debug> Debug for Column<I, T> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_list().entries(&self.values).finish()
    }
}

/// Which cell of a new topology each cell of an old one became.
///
/// ```
/// use merestone_topology::{Column, Correspondence, VertexId};
/// let v = |i| VertexId::from_u32(i);
/// let moved = Correspondence::new(vec![None, Some(v(0)), Some(v(1))], 2);
/// assert_eq!((moved.get(v(0)), moved.get(v(2))), (None, Some(v(1))));
/// let column: Column<VertexId, char> = Column::from_values(vec!['a', 'b', 'c']);
/// assert_eq!(column.follow(&moved, '-').values(), ['b', 'c']);
/// ```
pub struct Correspondence<A, B> {
    targets: Vec<Option<B>>,
    new_bound: usize,
    _id: PhantomData<fn(A)>,
}

impl<A: Id, B: Id> Correspondence<A, B> {
    /// From the new id for each old index, and the bound of the new indices.
    #[must_use]
    pub fn new(targets: Vec<Option<B>>, new_bound: usize) -> Self {
        Self { targets, new_bound, _id: PhantomData }
    }

    /// What `old` became; `None` when it is gone or was never there.
    #[inline]
    #[must_use]
    pub fn get(&self, old: A) -> Option<B> {
        self.targets.get(old.index()).copied().flatten()
    }

    /// The new id for each old index.
    #[must_use]
    pub fn targets(&self) -> &[Option<B>] {
        &self.targets
    }

    /// Above every new index.
    #[must_use]
    pub fn new_bound(&self) -> usize {
        self.new_bound
    }
}

impl<A, B: Clone> Clone for Correspondence<A, B> {
    fn clone(&self) -> Self {
        Self { targets: self.targets.clone(), new_bound: self.new_bound, _id: PhantomData }
    }
}

impl<A, B: Debug> Debug for Correspondence<A, B> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_list().entries(&self.targets).finish()
    }
}

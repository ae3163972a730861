//! Typed ids into arenas.

use std::fmt;
use std::hash::{Hash, Hasher};
use std::marker::PhantomData;
use std::ops::{Index, IndexMut};

/// The id of a `T` in an [`Arena<T>`].
pub struct Id<T> {
    raw: u32,
    of: PhantomData<fn() -> T>,
}

impl<T> Id<T> {
    /// The id at a position of its arena.
    pub fn new(position: usize) -> Id<T> {
        debug_assert!(position < u32::MAX as usize, "arenas hold fewer than 2^32 elements");
        Id { raw: position as u32, of: PhantomData }
    }

    /// The position in the arena.
    pub fn position(self) -> usize {
        self.raw as usize
    }
}

// Written by hand because a derive would ask the same of `T`.
impl<T> Clone for Id<T> {
    fn clone(&self) -> Self {
        *self
    }
}
impl<T> Copy for Id<T> {}
impl<T> PartialEq for Id<T> {
    fn eq(&self, other: &Self) -> bool {
        self.raw == other.raw
    }
}
impl<T> Eq for Id<T> {}
impl<T> PartialOrd for Id<T> {
    fn partial_cmp(&self, other: &Self) -> Option<std::cmp::Ordering> {
        Some(self.cmp(other))
    }
}
impl<T> Ord for Id<T> {
    fn cmp(&self, other: &Self) -> std::cmp::Ordering {
        self.raw.cmp(&other.raw)
    }
}
impl<T> Hash for Id<T> {
    fn hash<H: Hasher>(&self, state: &mut H) {
        self.raw.hash(state);
    }
}
impl<T> fmt::Debug for Id<T> {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "#{}", self.raw)
    }
}

/// A list that hands out typed ids.
#[derive(Clone, Debug)]
pub struct Arena<T> {
    items: Vec<T>,
}

impl<T> Default for Arena<T> {
    fn default() -> Self {
        Arena { items: Vec::new() }
    }
}

impl<T> Arena<T> {
    /// Adds an element and gives its id.
    pub fn add(&mut self, item: T) -> Id<T> {
        self.items.push(item);
        Id::new(self.items.len() - 1)
    }

    /// How many elements there are.
    pub fn len(&self) -> usize {
        self.items.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.items.is_empty()
    }

    /// The ids in order.
    pub fn ids(&self) -> impl DoubleEndedIterator<Item = Id<T>> + use<T> {
        (0..self.items.len()).map(Id::new)
    }

    /// The elements in order with their ids.
    pub fn iter(&self) -> impl DoubleEndedIterator<Item = (Id<T>, &T)> {
        self.items.iter().enumerate().map(|(at, item)| (Id::new(at), item))
    }
}

impl<T> Index<Id<T>> for Arena<T> {
    type Output = T;
    fn index(&self, id: Id<T>) -> &T {
        &self.items[id.position()]
    }
}

impl<T> IndexMut<Id<T>> for Arena<T> {
    fn index_mut(&mut self, id: Id<T>) -> &mut T {
        &mut self.items[id.position()]
    }
}

//! A thing as a property, equal to itself alone: for what is shared, and for what costs more to compare than to draw again.

use std::rc::Rc;

/// Shared, and equal where it is the same object.
#[derive(Debug)]
pub struct Same<T>(pub Rc<T>);

// Derived, these would ask the same of what is shared.
impl<T> Clone for Same<T> {
    fn clone(&self) -> Self {
        Same(self.0.clone())
    }
}

impl<T> PartialEq for Same<T> {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

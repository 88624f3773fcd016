//! Oil.

//! Units of measure.

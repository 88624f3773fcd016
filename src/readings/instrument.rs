//! Instruments and their accuracy.

//! Reads an export on standard input and writes one assessment per visit.
fn main() {}

//! Starts the app in the browser.
fn main() {}

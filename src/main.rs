//! Starts thawline.
fn main() {}

//! The `coldseam` binary.

fn main() {}

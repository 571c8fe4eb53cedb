//! The command line of Plankform.

fn main() {}

//! Both sides of the bracket on one grid.

//! Two-dimensional flow about a section.

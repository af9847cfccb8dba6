//! Lines, cells, faces, nodes and surfaces, and their splitting.

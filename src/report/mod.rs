//! Text, JSON and CSV from a rating.

//! Published material values and surface resistances, each with its source.

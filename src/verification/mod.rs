//! Published cases, computed and compared.

//! The room `rules`.

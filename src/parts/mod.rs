//! The room `parts`.

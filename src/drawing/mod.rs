//! The room `drawing`.

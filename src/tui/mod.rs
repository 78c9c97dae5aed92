//! The room `tui`.

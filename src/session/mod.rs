//! The room `session`.

//! The room `figures`.

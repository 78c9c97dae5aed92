//! The room `simulate`.

//! The room `method`.

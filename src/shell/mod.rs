//! The room `shell`.

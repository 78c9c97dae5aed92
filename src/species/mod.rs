//! The room `species`.

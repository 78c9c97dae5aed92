//! The room `record`.

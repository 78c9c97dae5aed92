//! The room `assessment`.

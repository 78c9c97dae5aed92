//! The room `mechanics`.

//! The room `diagnostic`.

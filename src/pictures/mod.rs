//! The room `pictures`.

//! The room `document`.

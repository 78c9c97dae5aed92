//! The room `briefing`.

//! One test binary: the house, the published checks, the kits, the session, the screens.

mod support;
mod check_command;
mod plan_kit;
mod session;
mod why_command;

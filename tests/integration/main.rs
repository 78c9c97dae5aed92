//! One test binary: the house, the published checks, the kits, the session, the screens.

#![expect(
    clippy::unwrap_used,
    clippy::disallowed_methods,
    clippy::wildcard_enum_match_arm,
    reason = "tests open files, read clocks and stop at the first surprise"
)]

mod support;
mod driver;
mod terminal;
mod house;
mod session;
mod screens;
mod record_desk;
mod record_attacks;
mod record_kit;
mod record_format;
mod record_durability;
mod record_folder;
mod record_interop;
mod commands_record;
mod commands_sizeup;
mod published;
mod sample;
mod virtual_stump;
mod virtual_stump_odd;
mod mechanics_properties;
mod tree_properties;
mod method_choice;
mod tree_figures;
mod check_command;
mod plan_kit;
mod why_command;

//! One test binary: the house, the published checks, the kits, the session, the screens.

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
mod published;
mod sample;
mod virtual_stump;
mod virtual_stump_odd;
mod mechanics_properties;
mod tree_properties;
mod method_choice;
mod tree_figures;

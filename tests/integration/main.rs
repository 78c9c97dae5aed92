//! One test binary: the house, the published checks, the kits, the session, the screens.

mod published;
mod sample;
mod virtual_stump;
mod mechanics_properties;
mod method_choice;

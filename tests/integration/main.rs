//! One test binary: the house, the published checks, the kits, the session, the screens.

mod published;
mod sample;
mod virtual_stump;
mod virtual_stump_odd;
mod mechanics_properties;
mod tree_properties;
mod method_choice;
mod tree_figures;

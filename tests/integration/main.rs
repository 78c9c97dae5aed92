//! One test binary: the house, the published checks, the kits, the session, the screens.

mod published;

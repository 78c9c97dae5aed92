//! Every figure of one tree with one list of cuts: bands over many cases, twenty equal cases, the
//! state, the worst credible case and the input whose doubt matters most. It chooses no method.

mod bands;
mod brisk;
mod cases;
mod compute;
mod doubt;
mod input;
mod layout;
mod model;
mod read;
mod sobol;
mod state;
mod tree;
mod worst;

pub(crate) use compute::{PLUNGE_CLEAR, line_lever};
pub use compute::{crossing_band, figures};
pub use doubt::{Doubt, DoubtInput};
pub use input::{
    Condition, Crown, CrownInput, Line, Overrides, Saw, SiteStop, Slope, TreeInput, WayOut, Weigh,
    WoodOverride, WoodState,
};
pub use layout::{Layout, Release};
pub(crate) use model::CaseTree;
pub use model::{CannotSay, Model};
pub use tree::{
    BackCutFigures, BriskFigures, CaseState, Cases, CentreFigures, CrossingBand, EscapeFigures,
    FaceFigures, FallFigures, PlungeFigures, StrapFigures, TreeFigures, Why, WorstCredible,
};
pub(crate) use worst::{AtCommit, Cuts, at_commit, cautious_extras, stretch};
pub use worst::{Stretch, WorstCase, worst_case};

//! The cuts of one tree as lengths: what every figure of the cuts rests on. It draws no steps.

use crate::plan::step::MethodName;
use crate::units::{Angle, Length};

/// How the wood behind the hinge is left at the moment the tree commits.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Release {
    /// A back cut from the rear: the tree may commit before the hinge is reached.
    FromRear,
    /// A strap released on a finished hinge.
    Strap,
    /// A tongue between relieved corners, cut from the rear.
    Tongue {
        /// The tongue's width.
        width: Length,
    },
}

/// The cuts of one tree.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Layout {
    /// The method they belong to.
    pub method: MethodName,
    /// Depth of the face's apex from the front of the wood.
    pub face_depth: Length,
    /// The face's whole opening.
    pub opening: Angle,
    /// Thickness of the hinge.
    pub hinge: Length,
    /// Height of the back cut above the apex.
    pub back_cut_height: Length,
    /// Thickness of the strap, where one is left or would be.
    pub strap: Length,
    /// How the rear is left.
    pub release: Release,
}

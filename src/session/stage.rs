//! The stages of the day.

/// A stage.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Stage {
    /// Who is here.
    RollCall,
    /// Own hazards.
    OwnHazards,
    /// Questions to named people.
    Questions,
    /// Each signs.
    Signing,
    /// Which tree is next.
    Choose,
    /// Short talk at the tree.
    ShortTalk,
    /// The walk-up.
    WalkUp,
    /// The cuts up to the hold line, and what follows it.
    Cuts,
    /// The hold line.
    HoldLine,
    /// All clear.
    AllClear,
    /// Signing out and closing.
    Closing,
    /// Closed.
    Closed,
    /// Stopped; the place is kept.
    Stopped,
    /// Talking again; the place is kept.
    TalkAgain,
}

impl Stage {
    /// Every stage.
    pub const ALL: [Self; 14] = [
        Self::RollCall,
        Self::OwnHazards,
        Self::Questions,
        Self::Signing,
        Self::Choose,
        Self::ShortTalk,
        Self::WalkUp,
        Self::Cuts,
        Self::HoldLine,
        Self::AllClear,
        Self::Closing,
        Self::Closed,
        Self::Stopped,
        Self::TalkAgain,
    ];

    /// Its word on the record.
    pub const fn word(self) -> &'static str {
        match self {
            Self::RollCall => "roll-call",
            Self::OwnHazards => "own-hazards",
            Self::Questions => "questions",
            Self::Signing => "signing",
            Self::Choose => "choose",
            Self::ShortTalk => "short-talk",
            Self::WalkUp => "walk-up",
            Self::Cuts => "cuts",
            Self::HoldLine => "hold-line",
            Self::AllClear => "all-clear",
            Self::Closing => "closing",
            Self::Closed => "closed",
            Self::Stopped => "stopped",
            Self::TalkAgain => "talk-again",
        }
    }

    /// Its title on the screen.
    pub const fn title(self) -> &'static str {
        match self {
            Self::RollCall => "ROLL CALL",
            Self::OwnHazards => "TAILGATE: OWN HAZARDS",
            Self::Questions => "TAILGATE: QUESTIONS",
            Self::Signing => "TAILGATE: SIGNING",
            Self::Choose => "NEXT TREE",
            Self::ShortTalk => "SHORT TALK",
            Self::WalkUp => "WALK-UP",
            Self::Cuts => "CUTS",
            Self::HoldLine => "HOLD LINE",
            Self::AllClear => "ALL CLEAR",
            Self::Closing => "CLOSE",
            Self::Closed => "CLOSED",
            Self::Stopped => "STOPPED",
            Self::TalkAgain => "TALK AGAIN",
        }
    }

    /// From its word.
    pub fn of(word: &str) -> Option<Self> {
        Self::ALL.into_iter().find(|s| s.word() == word)
    }

    /// Whether items of this stage belong to the tree at hand.
    pub const fn at_tree(self) -> bool {
        matches!(
            self,
            Self::ShortTalk | Self::WalkUp | Self::Cuts | Self::HoldLine | Self::AllClear
        )
    }

    /// Whether free words are typed here, so that SPACE is a letter.
    pub const fn of_words(self) -> bool {
        matches!(self, Self::OwnHazards)
    }
}

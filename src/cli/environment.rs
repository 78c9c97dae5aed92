//! What the surroundings say: terminal or not, colours or not, letters or not.

#![expect(
    clippy::disallowed_methods,
    reason = "this file is the door to the environment"
)]

use std::io::IsTerminal;

use clap::Args;

use crate::tui::{Ground, Letters, Look};

/// How the screen is painted.
#[derive(Debug, Clone, Args)]
pub struct ScreenArgs {
    /// Nothing but ASCII letters.
    #[arg(long)]
    pub ascii: bool,
    /// White on black instead of black on white.
    #[arg(long)]
    pub dusk: bool,
    /// Whether to use colours.
    #[arg(long, value_name = "WHEN", value_enum)]
    pub color: Option<ColorWhen>,
}

/// When colours are used.
#[derive(Debug, Clone, Copy, PartialEq, Eq, clap::ValueEnum)]
pub enum ColorWhen {
    /// Unless NO_COLOR says no.
    Auto,
    /// Always.
    Always,
    /// Never.
    Never,
}

/// The surroundings.
#[derive(Debug, Clone)]
pub struct Environment {
    /// Whether a person sits at both ends.
    pub is_terminal: bool,
    /// Whether colours are refused.
    pub no_color: bool,
    /// Whether letters beyond ASCII can be shown.
    pub utf8: bool,
}

impl Environment {
    /// Looks around.
    pub fn look_around() -> Self {
        let set = |name: &str| std::env::var_os(name).is_some_and(|v| !v.is_empty());
        let text = |name: &str| std::env::var(name).unwrap_or_default();
        let locale = ["LC_ALL", "LC_CTYPE", "LANG"]
            .iter()
            .map(|n| text(n))
            .find(|v| !v.is_empty())
            .unwrap_or_default();
        let utf8 = ["utf-8", "utf8"]
            .iter()
            .any(|u| locale.to_lowercase().contains(u))
            && text("TERM") != "linux";
        Self {
            is_terminal: std::io::stdin().is_terminal()
                && std::io::stdout().is_terminal()
                && text("TERM") != "dumb",
            no_color: set("NO_COLOR"),
            utf8,
        }
    }
}

/// How the screen is painted: the command line goes before the environment.
pub fn look(args: &ScreenArgs, environment: &Environment) -> Look {
    let plain = match args.color {
        Some(ColorWhen::Always) => false,
        Some(ColorWhen::Never) => true,
        Some(ColorWhen::Auto) | None => environment.no_color,
    };
    let ground = match (plain, args.dusk) {
        (true, _) => Ground::Plain,
        (false, true) => Ground::Dusk,
        (false, false) => Ground::Sun,
    };
    let letters = if args.ascii || !environment.utf8 {
        Letters::Ascii
    } else {
        Letters::Full
    };
    Look { ground, letters }
}

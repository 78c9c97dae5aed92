//! `demo`: a demo job copied into a folder of its own, and opened. Its keys are marked as such.

use std::path::{Path, PathBuf};

use clap::Args;

use super::brief::{self, BriefArgs};
use crate::cli::environment::{Environment, ScreenArgs};
use crate::cli::exit::Exit;
use crate::cli::output::Output;
use crate::shell::files::{self, Readers};

/// What `demo` takes.
#[derive(Debug, Clone, Args)]
pub struct DemoArgs {
    /// The folder to copy it to.
    #[arg(long, value_name = "DIR", default_value = "stumpside-demo")]
    pub job: PathBuf,
    /// Copy only; do not open it.
    #[arg(long)]
    pub copy_only: bool,
    /// How the screen is painted.
    #[command(flatten)]
    pub screen: ScreenArgs,
}

/// The demo job's files: name in the folder, bytes, who may read it.
const FILES: &[(&str, &[u8], Readers)] = &[
    (
        "plan.yaml",
        include_bytes!("../../../demo-jobs/heron-bench/plan.yaml"),
        Readers::Everyone,
    ),
    (
        "keys/odile",
        include_bytes!("../../../demo-jobs/heron-bench/keys/odile"),
        Readers::Owner,
    ),
    (
        "keys/odile.pub",
        include_bytes!("../../../demo-jobs/heron-bench/keys/odile.pub"),
        Readers::Everyone,
    ),
    (
        "keys/tamsin",
        include_bytes!("../../../demo-jobs/heron-bench/keys/tamsin"),
        Readers::Owner,
    ),
    (
        "keys/tamsin.pub",
        include_bytes!("../../../demo-jobs/heron-bench/keys/tamsin.pub"),
        Readers::Everyone,
    ),
    (
        "keys/rui",
        include_bytes!("../../../demo-jobs/heron-bench/keys/rui"),
        Readers::Owner,
    ),
    (
        "keys/rui.pub",
        include_bytes!("../../../demo-jobs/heron-bench/keys/rui.pub"),
        Readers::Everyone,
    ),
];

/// Runs it. What is in the folder already stays as it is.
pub fn run(args: &DemoArgs, environment: &Environment, output: &mut Output<'_>) -> Exit {
    if let Err(error) = copy(&args.job) {
        output.talk(&format!(
            "stumpside: {error}; choose another folder with --job"
        ));
        return Exit::Unwritable;
    }
    let plan = args.job.join("plan.yaml");
    output.talk(&format!(
        "demo job in {}; its keys are DEMO keys and prove nothing",
        args.job.display()
    ));
    if args.copy_only {
        return Exit::Good;
    }
    let brief_args = BriefArgs {
        plan,
        job: None,
        screen: args.screen.clone(),
    };
    brief::run(&brief_args, environment, output)
}

fn copy(folder: &Path) -> Result<(), files::FileError> {
    files::make_dir(folder)?;
    files::make_dir(&folder.join("keys"))?;
    for (name, bytes, readers) in FILES {
        files::write_or_same(&folder.join(name), bytes, *readers)?;
    }
    Ok(())
}

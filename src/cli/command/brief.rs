//! `brief`: opens the terminal program on a job, or goes on with its record.

use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

use clap::Args;

use super::check::{self, findings_of, print_findings};
use crate::cli::environment::{Environment, ScreenArgs, look};
use crate::cli::exit::Exit;
use crate::cli::output::Output;
use crate::diagnostic::{Finding, Severity, count};
use crate::shell::beginning::{DayError, Ground};
use crate::shell::brief::{self, BriefError, Left};
use crate::shell::job_folder;
use crate::shell::record_file::{Places, RecordError};

/// What `brief` takes.
#[derive(Debug, Clone, Args)]
pub struct BriefArgs {
    /// The job plan.
    pub plan: PathBuf,
    /// The job folder that holds the record; the plan's own folder without it.
    #[arg(long, value_name = "DIR")]
    pub job: Option<PathBuf>,
    /// How the screen is painted.
    #[command(flatten)]
    pub screen: ScreenArgs,
}

/// Runs it.
pub fn run(args: &BriefArgs, environment: &Environment, output: &mut Output<'_>) -> Exit {
    let file = match check::read(&args.plan) {
        Ok(file) => file,
        Err(error) => {
            output.talk(&format!("stumpside: {error}"));
            return Exit::Unreadable;
        }
    };
    let findings = findings_of(&file);
    let Some(plan) = file.loaded.plan.clone() else {
        print_findings(&file.source, &findings, output);
        output.talk("stumpside: the plan cannot be briefed as it stands");
        return Exit::No;
    };
    // Stop findings about one tree keep that tree from being begun; others keep the day from it.
    let of_the_day = |f: &&Finding| f.severity == Severity::Stop && !f.path.starts_with("trees[");
    let day_stops: Vec<_> = findings.iter().filter(of_the_day).cloned().collect();
    if count(&day_stops).stop > 0 {
        print_findings(&file.source, &day_stops, output);
        output.talk(
            "stumpside: the day cannot be begun with these stop findings; see `stumpside check`",
        );
        return Exit::No;
    }
    if !environment.is_terminal {
        output.talk("stumpside: brief needs a terminal; `stumpside check` and `stumpside sizeup` print without one");
        return Exit::Usage;
    }
    let stops = stops_of_trees(&plan, &findings);
    let ground = match ground(args, (plan, stops), &file) {
        Ok(ground) => ground,
        Err(error) => return explain(&error, output),
    };
    match brief::run(ground, look(&args.screen, environment)) {
        Ok((Left::Quit, code)) => {
            output.talk(&format!("record code {code}; open the plan again to go on"));
            Exit::Good
        }
        Ok((Left::Signal(_), code)) => {
            output.talk(&format!(
                "ended by a signal; everything shown as RECORDED is on disk; record code {code}"
            ));
            Exit::Interrupted
        }
        Ok((Left::OnPaper, code)) => {
            output.talk(&format!("NOT RECORDED: the record could not take the last acts; go on on paper; record code {code}"));
            Exit::Unwritable
        }
        Err(BriefError::Day(error)) => explain(&error, output),
        Err(error @ BriefError::Terminal(_)) => {
            output.talk(&format!("stumpside: {error}"));
            Exit::Unwritable
        }
    }
}

/// The codes of stop findings by the tree they are about. What the size-ups find is found anew with
/// every card.
fn stops_of_trees(plan: &crate::plan::Plan, findings: &[Finding]) -> BTreeMap<String, Vec<String>> {
    let mut stops: BTreeMap<String, Vec<String>> = BTreeMap::new();
    for finding in findings
        .iter()
        .filter(|f| f.severity == Severity::Stop && !f.code.starts_with("TREE"))
    {
        let about = |t: &&crate::plan::Tree| {
            finding.path == t.route || finding.path.starts_with(&format!("{}.", t.route))
        };
        if let Some(tree) = plan.trees.iter().find(about) {
            stops
                .entry(tree.id.value.clone())
                .or_default()
                .push(finding.code.to_owned());
        }
    }
    stops
}

fn ground(
    args: &BriefArgs,
    (plan, stops): (crate::plan::Plan, BTreeMap<String, Vec<String>>),
    file: &job_folder::PlanFile,
) -> Result<Ground, DayError> {
    let parts = job_folder::read_parts(&plan, &file.path)?;
    let crew = job_folder::read_crew(&plan, &file.path)?;
    let own = args
        .plan
        .parent()
        .filter(|p| !p.as_os_str().is_empty())
        .unwrap_or(Path::new("."));
    let places = Places::of_job(args.job.as_deref().unwrap_or(own));
    let plan_bytes = file.source.text().as_bytes().to_vec();
    Ok(Ground {
        plan,
        plan_bytes,
        plan_path: file.path.clone(),
        parts,
        stops,
        crew,
        places,
    })
}

/// The words and the exit code of a day that cannot go on.
fn explain(error: &DayError, output: &mut Output<'_>) -> Exit {
    output.talk(&format!("stumpside: {error}"));
    match error {
        DayError::AnotherPlan { .. } | DayError::OtherGround(_) | DayError::LeaderWithoutKey(_) => {
            Exit::No
        }
        DayError::Record(RecordError::Closed) => {
            output.talk("the day of this record is closed; see `stumpside record verify`");
            Exit::No
        }
        DayError::Record(RecordError::Refused { .. }) => Exit::No,
        DayError::Record(RecordError::Fork(..) | RecordError::WrongKey(..)) => Exit::No,
        DayError::Record(RecordError::Locked(_)) => {
            output.talk("close the other program first, or give this plan a folder of its own");
            Exit::Unwritable
        }
        DayError::Record(_) | DayError::Entropy(_) => {
            output.talk("nothing was begun: free some room, or choose a folder that can be written with --job");
            Exit::Unwritable
        }
        DayError::Folder(_)
        | DayError::Key(_)
        | DayError::File(_)
        | DayError::Unreadable { .. } => Exit::Unreadable,
    }
}

//! `check`: everything wrong with a plan, in one run.

use std::collections::BTreeMap;
use std::path::{Path, PathBuf};

use clap::Args;
use serde_json::{Value as Json, json};

use crate::assessment::{self, Ground};
use crate::cli::exit::Exit;
use crate::cli::output::{Format, Output};
use crate::diagnostic::{self, Finding, Severity, SourceText, count};
use crate::document::{self, LIMIT_BYTES};
use crate::parts::Parts;
use crate::plan::{self, Loaded, Partial};
use crate::shell::files::{self, FileError};
use crate::shell::job_folder::{self, PlanFile};

/// What `check` takes.
#[derive(Debug, Clone, Args)]
pub struct CheckArgs {
    /// The job plan.
    pub plan: PathBuf,
    /// In which form the findings are printed.
    #[arg(long, value_enum, default_value_t)]
    pub format: Format,
}

/// Runs it: exit 1 where a finding says stop.
pub fn run(args: &CheckArgs, output: &mut Output<'_>) -> Exit {
    let file = match read(&args.plan) {
        Ok(file) => file,
        Err(error) => {
            output.talk(&format!("stumpside: {error}"));
            return Exit::Unreadable;
        }
    };
    let findings = findings_of(&file);
    let counted = count(&findings);
    match args.format {
        Format::Text => {
            output.data_raw(diagnostic::render_all(&file.source, &findings).as_bytes());
            output.data_raw(diagnostic::render_summary(&file.source, counted).as_bytes());
        }
        Format::Json => output.data(&json_of(&file.source, &findings).to_string()),
    }
    if counted.stop > 0 {
        Exit::No
    } else {
        Exit::Good
    }
}

/// Reads a plan. A file that can be read and is no plan, because it is too long or no text, has
/// its one finding.
///
/// # Errors
/// [`FileError`] where the file cannot be read.
pub fn read(path: &Path) -> Result<PlanFile, FileError> {
    // One byte past the limit is enough to say that it is past it.
    let bytes = match files::read_limited(path, LIMIT_BYTES) {
        Ok(bytes) => bytes,
        Err(FileError::TooLong { .. }) => vec![0; LIMIT_BYTES + 1],
        Err(error) => return Err(error),
    };
    let (text, loaded) = match document::text_of(&bytes) {
        Ok(text) => {
            let loaded = plan::load(&text);
            (text, loaded)
        }
        Err(no_text) => (
            no_text.shown,
            Loaded {
                plan: None,
                partial: None,
                findings: vec![no_text.finding],
            },
        ),
    };
    Ok(PlanFile {
        path: path.to_owned(),
        source: SourceText::new(path.display().to_string(), text),
        loaded,
    })
}

/// Every finding of a plan, in the order of their places.
pub fn findings_of(file: &PlanFile) -> Vec<Finding> {
    let mut findings = file.loaded.findings.clone();
    if let Some(partial) = &file.loaded.partial {
        let parts = match job_folder::read_parts(&partial.plan, &file.path) {
            Ok(parts) => parts,
            Err(error) => {
                findings.push(unusable_parts(partial, &error.to_string()));
                Parts::built_in()
            }
        };
        findings.extend(match &file.loaded.plan {
            Some(plan) => assessment::sized_findings(plan, &parts),
            None => {
                let ground = Ground {
                    parts: &parts,
                    knows_species: &assessment::knows_species,
                    size_ups: &BTreeMap::new(),
                };
                assessment::look_through(partial, &ground)
            }
        });
    }
    diagnostic::sort(&mut findings);
    findings
}

fn unusable_parts(partial: &Partial, why: &str) -> Finding {
    let named = partial.plan.parts.as_ref();
    Finding {
        code: "JOB-33",
        severity: Severity::Stop,
        message: format!("the parts folder cannot be used: {why}"),
        place: named.map_or(partial.plan.place, |n| n.place),
        path: "parts".to_owned(),
        rule: None,
        help: "correct the folder, or take `parts` out of the plan; the built-in rules were looked at meanwhile".to_owned(),
    }
}

/// Findings as talk, for commands whose answer is something else.
pub fn print_findings(source: &SourceText, findings: &[Finding], output: &mut Output<'_>) {
    output.talk_raw(&diagnostic::render_all(source, findings));
}

/// The machine output, format 1.
pub fn json_of(source: &SourceText, findings: &[Finding]) -> Json {
    let counted = count(findings);
    let all: Vec<Json> = findings.iter().map(|f| finding_json(source, f)).collect();
    json!({
        "format": 1,
        "findings": all,
        "stop": counted.stop,
        "caution": counted.caution,
        "note": counted.note,
    })
}

/// One finding as machine output.
pub fn finding_json(source: &SourceText, finding: &Finding) -> Json {
    let start = source.line_column(finding.place.start);
    let end = source.line_column(finding.place.end);
    json!({
        "code": finding.code,
        "severity": finding.severity.word(),
        "message": finding.message,
        "file": source.name(),
        "line": start.line,
        "column": start.column,
        "end_line": end.line,
        "end_column": end.column,
        "path": finding.path,
        "rule": finding.rule.as_ref().map(|r| json!({"set": r.set, "source": r.source})),
        "help": finding.help,
    })
}

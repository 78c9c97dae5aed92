//! `check`: everything wrong with a plan, in one run.

use std::path::PathBuf;

use clap::Args;
use serde_json::{Value as Json, json};

use crate::cli::exit::Exit;
use crate::cli::output::{Format, Output};
use crate::diagnostic::{self, Finding, SourceText, count};
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
    let file = match job_folder::read_plan(&args.plan) {
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

/// Every finding of a plan, in the order of their places.
pub fn findings_of(file: &PlanFile) -> Vec<Finding> {
    let mut findings = file.loaded.findings.clone();
    if let Some(plan) = &file.loaded.plan {
        findings.extend(crate::assessment::findings(plan));
    }
    diagnostic::sort(&mut findings);
    findings
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

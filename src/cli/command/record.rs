//! `record verify`, `record show`, `record receipt`: reads records and says what holds.
//! It never writes one and never repairs one.

use std::path::{Path, PathBuf};

use clap::{Args, Subcommand};
use serde_json::{Map, Value};

use crate::cli::exit::Exit;
use crate::cli::output::{Format, Output};
use crate::record::chain::{Standing, walk};
use crate::record::code::{Ink, RecordCode, square};
use crate::record::duty::Missing;
use crate::record::line::hex;
use crate::record::text::visible;
use crate::record::verify::LIMITS;
use crate::record::{
    Options, RECORD_BYTES_MAX, Report, Trust, Verdict, signers, verify, verify_many,
};
use crate::shell::files;
use crate::shell::record_file::RECORD_FILE;

/// Records held in memory together; ordinary ones have some hundred kilobytes.
const FILES_AT_ONCE: usize = 32;
const CREW_BYTES_MAX: usize = 1024 * 1024;

/// Look at and verify records.
#[derive(Debug, Args)]
pub struct RecordArgs {
    #[command(subcommand)]
    command: RecordCommand,
}

#[derive(Debug, Subcommand)]
enum RecordCommand {
    /// Check every entry, the chain and the signatures.
    Verify(VerifyArgs),
    /// Print the record for people, one line an entry.
    Show(ShowArgs),
    /// Print the record code and the square code to carry away.
    Receipt(ReceiptArgs),
}

/// What `record verify` takes.
#[derive(Debug, Args)]
pub struct VerifyArgs {
    /// Record files, or job folders.
    #[arg(required = true, value_name = "FILE")]
    files: Vec<PathBuf>,
    /// The crew of this job from outside, as an OpenSSH allowed_signers file.
    #[arg(long, value_name = "FILE")]
    crew: Option<PathBuf>,
    /// A record code somebody carried away; it must be of an entry in the record.
    #[arg(long = "code", value_name = "CODE")]
    codes: Vec<String>,
    /// The form of the result.
    #[arg(long, value_enum, default_value_t)]
    format: Format,
}

/// What `record show` takes.
#[derive(Debug, Args)]
pub struct ShowArgs {
    /// A record file, or a job folder.
    file: PathBuf,
}

/// What `record receipt` takes.
#[derive(Debug, Args)]
pub struct ReceiptArgs {
    /// A record file, or a job folder.
    file: PathBuf,
    /// Draw the square code in plain ASCII.
    #[arg(long)]
    ascii: bool,
}

/// Runs a record command.
pub fn run(args: &RecordArgs, output: &mut Output<'_>) -> Exit {
    match &args.command {
        RecordCommand::Verify(args) => run_verify(args, output),
        RecordCommand::Show(args) => run_show(args, output),
        RecordCommand::Receipt(args) => run_receipt(args, output),
    }
}

fn read_record(path: &Path, output: &mut Output<'_>) -> Result<Vec<u8>, Exit> {
    let in_folder = path.join(RECORD_FILE);
    let path = if files::is_dir(path) {
        &in_folder
    } else {
        path
    };
    files::read_limited(path, RECORD_BYTES_MAX).map_err(|error| {
        output.talk(&format!("stumpside: {error}"));
        Exit::Unreadable
    })
}

fn run_verify(args: &VerifyArgs, output: &mut Output<'_>) -> Exit {
    let trust = match read_trust(args.crew.as_deref(), output) {
        Ok(trust) => trust,
        Err(exit) => return exit,
    };
    let mut options = Options::default();
    for text in &args.codes {
        let Some(code) = RecordCode::read(text) else {
            output.talk(&format!(
                "stumpside: \"{text}\" is no record code (four groups of four)"
            ));
            return Exit::Usage;
        };
        options.codes.push(code);
    }
    let mut exit = Exit::Good;
    let mut records = Vec::new();
    for files in args.files.chunks(FILES_AT_ONCE) {
        let read: Vec<_> = files.iter().map(|file| read_record(file, output)).collect();
        let readable: Vec<&Vec<u8>> = read
            .iter()
            .filter_map(|bytes| bytes.as_ref().ok())
            .collect();
        let mut reports = verify_many(&readable, &trust, &options).into_iter();
        for (file, bytes) in files.iter().zip(&read) {
            let report = bytes.as_ref().ok().and_then(|_| reports.next());
            exit = exit.worse(
                report
                    .as_ref()
                    .map_or(Exit::Unreadable, |r| exit_of(r.verdict)),
            );
            match (args.format, &report) {
                (Format::Text, Some(report)) => print_report(file, report, output),
                (Format::Text, None) => {}
                (Format::Json, Some(report)) => records.push(report_json(file, report)),
                (Format::Json, None) => records.push(unreadable_json(file)),
            }
        }
    }
    if args.format == Format::Json {
        let mut object = Map::new();
        object.insert("format".into(), 1.into());
        object.insert("records".into(), records.into());
        output.data(&Value::Object(object).to_string());
    }
    exit
}

fn read_trust(crew: Option<&Path>, output: &mut Output<'_>) -> Result<Trust, Exit> {
    let Some(path) = crew else {
        return Ok(Trust::Roster);
    };
    let text = files::read_text(path, CREW_BYTES_MAX).map_err(|error| error.to_string());
    let list = text.and_then(|text| {
        signers::read(&text).map_err(|fault| format!("{}: {fault}", path.display()))
    });
    list.map(Trust::Crew).map_err(|error| {
        output.talk(&format!("stumpside: {error}"));
        Exit::Unreadable
    })
}

const fn exit_of(verdict: Verdict) -> Exit {
    match verdict {
        Verdict::ClosedOk => Exit::Good,
        Verdict::Open => Exit::Open,
        Verdict::Fail => Exit::No,
    }
}

fn unreadable_json(file: &Path) -> Value {
    let mut object = Map::new();
    object.insert("file".into(), file.display().to_string().into());
    object.insert("error".into(), "cannot be read".into());
    Value::Object(object)
}

/// The machine form of one report.
pub fn report_json(file: &Path, report: &Report) -> Value {
    let bad = report.bad.iter().map(|bad| {
        let mut object = Map::new();
        object.insert("entry".into(), bad.entry.into());
        object.insert("why".into(), bad.why.clone().into());
        Value::Object(object)
    });
    let texts = |items: &mut dyn Iterator<Item = &String>| -> Value {
        items.cloned().map(Value::from).collect::<Vec<_>>().into()
    };
    let limits = LIMITS.iter().map(|limit| (*limit).to_owned());
    let notes: Vec<String> = report.notes.iter().cloned().chain(limits).collect();
    let mut object = Map::new();
    object.insert("file".into(), file.display().to_string().into());
    object.insert("entries".into(), report.entries.into());
    object.insert("good".into(), report.good.into());
    object.insert("bad".into(), bad.collect::<Vec<_>>().into());
    object.insert(
        "unknown_keys".into(),
        texts(&mut report.unknown_keys.iter()),
    );
    object.insert("tail".into(), report.tail.word().into());
    object.insert("head".into(), hex(&report.head).into());
    object.insert("record_code".into(), report.code().to_string().into());
    object.insert("signers".into(), texts(&mut report.signers.iter()));
    object.insert(
        "unsigned_required".into(),
        report
            .unsigned_required
            .iter()
            .map(missing_json)
            .collect::<Vec<_>>()
            .into(),
    );
    object.insert("verdict".into(), report.verdict.word().into());
    object.insert("notes".into(), texts(&mut notes.iter()));
    Value::Object(object)
}

fn missing_json(missing: &Missing) -> Value {
    let mut object = Map::new();
    object.insert("entry".into(), missing.entry.into());
    object.insert("kind".into(), missing.kind.clone().into());
    object.insert("who".into(), missing.who.clone().into());
    object.insert("why".into(), missing.why.clone().into());
    Value::Object(object)
}

fn print_report(file: &Path, report: &Report, output: &mut Output<'_>) {
    let verdict = match report.verdict {
        Verdict::ClosedOk => "CLOSED, OK: every entry fits and everyone required has signed",
        Verdict::Open => "OPEN: the end, or a signature, may be missing",
        Verdict::Fail => "FAIL: this record does not verify",
    };
    output.data(&format!("{}", file.display()));
    output.data(&format!("  {verdict}"));
    output.data(&format!(
        "  entries {}, good {}, tail {}",
        report.entries,
        report.good,
        report.tail.word()
    ));
    output.data(&format!("  last hash    {}", hex(&report.head)));
    output.data(&format!("  record code  {}", report.code()));
    let signers: Vec<&str> = report.signers.iter().map(String::as_str).collect();
    let signers = if signers.is_empty() {
        "nobody".to_owned()
    } else {
        signers.join(", ")
    };
    output.data(&format!("  signed by    {signers}"));
    if let Some(first) = report.bad.first() {
        output.data(&format!("  first bad entry: {}", first.entry));
    }
    for bad in &report.bad {
        output.data(&format!("  BAD entry {}: {}", bad.entry, visible(&bad.why)));
    }
    for key in &report.unknown_keys {
        output.data(&format!("  UNKNOWN KEY {}", visible(key)));
    }
    for missing in &report.unsigned_required {
        let entry = missing
            .entry
            .map_or_else(String::new, |entry| format!("entry {entry} "));
        let who = if missing.who.is_empty() {
            "nobody named"
        } else {
            &missing.who
        };
        output.data(&format!(
            "  NOT SIGNED {entry}{}: {}: {}",
            visible(&missing.kind),
            visible(who),
            missing.why
        ));
    }
    for note in &report.notes {
        output.data(&format!("  note: {}", visible(note)));
    }
    output.data("  What this does not show:");
    for limit in LIMITS {
        output.data(&format!("  - {limit}"));
    }
}

fn run_show(args: &ShowArgs, output: &mut Output<'_>) -> Exit {
    let bytes = match read_record(&args.file, output) {
        Ok(bytes) => bytes,
        Err(exit) => return exit,
    };
    let report = verify(&bytes, &Trust::Roster, &Options::default());
    for standing in &walk(&bytes).lines {
        let bad = report.bad.iter().any(|bad| bad.entry == standing.entry);
        output.data(&show_line(standing, if bad { "BAD" } else { "   " }));
    }
    output.data("");
    print_report(&args.file, &report, output);
    exit_of(report.verdict)
}

fn show_line(standing: &Standing, mark: &str) -> String {
    let entry = standing.entry;
    let Some(line) = &standing.line else {
        return format!("{mark} {entry:>5}  not a line of format 1");
    };
    if let Some(sig) = &line.sig {
        return format!(
            "{mark} {entry:>5}  signature of {} over entry {}",
            visible(&sig.who),
            sig.signs
        );
    }
    let local = line.stamp.map_or_else(String::new, |stamp| stamp.local());
    let known = match crate::record::kind::find(&line.kind) {
        Some(_) => "",
        None => " (unknown kind)",
    };
    let members: Vec<String> = line
        .members
        .iter()
        .map(|(name, value)| format!("{}: {}", visible(name), shown(value)))
        .collect();
    format!(
        "{mark} {entry:>5}  {local}  {}{known}  {}",
        line.kind,
        members.join(" · ")
    )
}

fn shown(value: &Value) -> String {
    match value {
        Value::String(text) => visible(text),
        Value::Null | Value::Bool(_) | Value::Number(_) | Value::Array(_) | Value::Object(_) => {
            visible(&value.to_string())
        }
    }
}

fn run_receipt(args: &ReceiptArgs, output: &mut Output<'_>) -> Exit {
    let bytes = match read_record(&args.file, output) {
        Ok(bytes) => bytes,
        Err(exit) => return exit,
    };
    let report = verify(&bytes, &Trust::Roster, &Options::default());
    if report.entries == 0 {
        output.talk("stumpside: there is no entry to make a record code of");
        return Exit::No;
    }
    if let Some(bad) = report.bad.first() {
        output.talk(&format!(
            "stumpside: this record does not verify: entry {}: {}",
            bad.entry, bad.why
        ));
        return Exit::No;
    }
    if report
        .notes
        .iter()
        .any(|note| note.starts_with("DEMO KEYS"))
    {
        output.data("DEMO KEYS: PROVES NOTHING");
    }
    output.data(&format!("record code  {}", report.code()));
    output.data(&format!(
        "entry        {}",
        report.entries.saturating_sub(1)
    ));
    output.data(&format!("whole hash   {}", hex(&report.head)));
    let ink = if args.ascii {
        Ink::Ascii
    } else {
        Ink::HalfBlocks
    };
    for row in square(&report.head, ink) {
        output.data(&row);
    }
    output.data("Write the code down or photograph it, and keep it away from this laptop.");
    Exit::Good
}

//! `crew add` and `crew list`: the keys of a job's crew.
//! It never shows a private key or a passphrase and never writes over a key.

use std::io;
use std::path::{Path, PathBuf};

use clap::{Args, Subcommand};
use zeroize::Zeroizing;

use crate::cli::exit::Exit;
use crate::cli::output::Output;
use crate::record::public_key::PublicKey;
use crate::record::text;
use crate::shell::files::{self, FileError};
use crate::shell::key_store::{self, KEYS_DIR, KeyError, NewKey, PrivateHalf};
use crate::shell::passphrase::Asked;

/// Keys of the crew.
#[derive(Debug, Args)]
pub struct CrewArgs {
    #[command(subcommand)]
    command: CrewCommand,
}

#[derive(Debug, Subcommand)]
enum CrewCommand {
    /// Make a key for a person, or take the public key they have.
    Add(AddArgs),
    /// List the keys of a job.
    List(ListArgs),
}

/// What `crew add` takes.
#[derive(Debug, Args)]
pub struct AddArgs {
    /// The crew id: small letters, digits and dashes.
    id: String,
    /// The name people are called by.
    #[arg(long)]
    name: String,
    /// The job folder.
    #[arg(long, value_name = "DIR", default_value = ".")]
    job: PathBuf,
    /// Take this public key instead of making one.
    #[arg(long, value_name = "FILE", conflicts_with_all = ["demo", "passphrase_file", "no_passphrase"])]
    key: Option<PathBuf>,
    /// Mark the new key as one for demonstrations: it proves nothing.
    #[arg(long)]
    demo: bool,
    /// Read the passphrase from the first line of this file.
    #[arg(long, value_name = "FILE", conflicts_with = "no_passphrase")]
    passphrase_file: Option<PathBuf>,
    /// Leave the new key open to anyone who has its file.
    #[arg(long)]
    no_passphrase: bool,
}

/// What `crew list` takes.
#[derive(Debug, Args)]
pub struct ListArgs {
    /// A plan, or a job folder.
    place: PathBuf,
}

/// How a hidden line is asked for.
pub type Ask<'a> = dyn FnMut() -> io::Result<Asked> + 'a;

/// Runs a crew command.
pub fn run(args: &CrewArgs, output: &mut Output<'_>, ask: &mut Ask<'_>) -> Exit {
    match &args.command {
        CrewCommand::Add(args) => run_add(args, output, ask),
        CrewCommand::List(args) => run_list(args, output),
    }
}

fn run_add(args: &AddArgs, output: &mut Output<'_>, ask: &mut Ask<'_>) -> Exit {
    let plain_name = !args.name.trim().is_empty() && text::clean(&args.name) == args.name;
    if !plain_name || args.name.contains(['\n', '\t']) {
        output.talk("stumpside: the name is empty or holds characters that cannot be shown");
        return Exit::Usage;
    }
    let made = match &args.key {
        Some(file) => key_store::adopt(&args.job, &args.id, file),
        None => match passphrase(args, output, ask) {
            Ok(passphrase) => make(args, passphrase.as_deref().map(String::as_str)),
            Err(exit) => return exit,
        },
    };
    match made {
        Ok(public) => {
            print_added(args, &public, output);
            Exit::Good
        }
        Err(error) => {
            output.talk(&format!("stumpside: {error}"));
            exit_of(&error)
        }
    }
}

fn make(args: &AddArgs, passphrase: Option<&str>) -> Result<PublicKey, KeyError> {
    let comment = if args.demo {
        format!("DEMO {} {}: proves nothing", args.id, args.name)
    } else {
        format!("{} {}", args.id, args.name)
    };
    key_store::make(
        &args.job,
        NewKey {
            id: &args.id,
            comment: &comment,
            passphrase,
        },
    )
}

fn passphrase(
    args: &AddArgs,
    output: &mut Output<'_>,
    ask: &mut Ask<'_>,
) -> Result<Option<Zeroizing<String>>, Exit> {
    if args.no_passphrase {
        output.talk("note: without a passphrase anyone who has the file can sign in this name");
        return Ok(None);
    }
    let typed = match &args.passphrase_file {
        Some(file) => {
            let whole = files::read_text(file, 4096)
                .map(Zeroizing::new)
                .map_err(|error| {
                    output.talk(&format!("stumpside: {error}"));
                    Exit::Unreadable
                })?;
            Zeroizing::new(whole.lines().next().unwrap_or_default().to_owned())
        }
        None => ask_twice(output, ask)?,
    };
    if typed.is_empty() {
        output.talk("stumpside: the passphrase is empty; --no-passphrase leaves the key open");
        return Err(Exit::Usage);
    }
    Ok(Some(typed))
}

fn ask_twice(output: &mut Output<'_>, ask: &mut Ask<'_>) -> Result<Zeroizing<String>, Exit> {
    let mut answers = Vec::new();
    for prompt in ["passphrase for the new key: ", "the same again: "] {
        output.talk_raw(prompt);
        let answer = ask();
        output.talk("");
        match answer {
            Ok(Asked::Typed(typed)) => answers.push(typed),
            Ok(Asked::BrokenOff) => return Err(Exit::Interrupted),
            Err(error) => {
                output.talk(&format!(
                    "stumpside: no terminal to ask on ({error}); give --passphrase-file or --no-passphrase"
                ));
                return Err(Exit::Unreadable);
            }
        }
    }
    match (answers.pop(), answers.pop()) {
        (Some(second), Some(first)) if first == second => Ok(first),
        (_, _) => {
            output.talk("stumpside: the two passphrases differ; nothing was made");
            Err(Exit::No)
        }
    }
}

fn print_added(args: &AddArgs, public: &PublicKey, output: &mut Output<'_>) {
    output.talk(&format!("{}  {}", public.fingerprint(), public.comment()));
    if public.is_demo() {
        output.talk("DEMO KEY: PROVES NOTHING");
    }
    output.talk("for the plan's crew:");
    let name = serde_json::Value::from(args.name.as_str());
    output.data(&format!(
        "  - {{id: {}, name: {name}, roles: [], key: {KEYS_DIR}/{}.pub}}",
        args.id, args.id
    ));
}

fn run_list(args: &ListArgs, output: &mut Output<'_>) -> Exit {
    let job = if files::is_dir(&args.place) {
        args.place.as_path()
    } else {
        args.place
            .parent()
            .filter(|dir| !dir.as_os_str().is_empty())
            .unwrap_or(Path::new("."))
    };
    match key_store::list(job) {
        Ok(keys) => {
            if keys.is_empty() {
                output.talk("no keys in this job folder; crew add makes one");
            }
            for key in keys {
                let private = match key.private {
                    PrivateHalf::Elsewhere => "private half elsewhere",
                    PrivateHalf::Here => "private half here",
                    PrivateHalf::HereAndOpen => "private half here, READABLE BY OTHERS",
                };
                let demo = if key.public.is_demo() {
                    "  DEMO: PROVES NOTHING"
                } else {
                    ""
                };
                output.data(&format!(
                    "{}  {}  {}  {private}{demo}",
                    key.id,
                    key.public.kind(),
                    key.public.fingerprint()
                ));
            }
            Exit::Good
        }
        Err(error) => {
            output.talk(&format!("stumpside: {error}"));
            exit_of(&error)
        }
    }
}

fn exit_of(error: &KeyError) -> Exit {
    match error {
        KeyError::WrongPassphrase(_) | KeyError::PassphraseNeeded(_) | KeyError::Locked(_) => {
            Exit::No
        }
        KeyError::Id(_) => Exit::Usage,
        KeyError::NotAKey { .. } | KeyError::Public { .. } => Exit::Unreadable,
        KeyError::Making(_) => Exit::Fault,
        KeyError::File(FileError::Read { .. } | FileError::TooLong { .. }) => Exit::Unreadable,
        KeyError::File(FileError::Exists { .. } | FileError::Write { .. }) => Exit::Unwritable,
    }
}

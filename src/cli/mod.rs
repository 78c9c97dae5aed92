//! The front hall: words in, words out, an exit code.

pub mod exit;
pub mod output;
pub mod environment;
pub mod command;

use std::process::ExitCode;

use clap::{Parser, Subcommand};

use exit::Exit;
use output::Output;

/// Sizes up leaning trees, checks felling plans, briefs the crew, walks the cuts and keeps a
/// signed record.
#[derive(Debug, Parser)]
#[command(name = "stumpside", version, about)]
struct Line {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Finds everything wrong with a plan, in one run.
    Check(command::check::CheckArgs),
    /// Every figure of every tree, the method proposed and why.
    Sizeup(command::sizeup::SizeupArgs),
    /// A tree's steps on the virtual stump, judged centimetre by centimetre.
    Simulate(command::simulate::SimulateArgs),
    /// Says what a finding's code means and what it rests on.
    Why(command::why::WhyArgs),
    /// Opens the terminal program on a job; goes on where its record ends.
    Brief(command::brief::BriefArgs),
    /// Copies a demo job into a folder of its own and opens it.
    Demo(command::demo::DemoArgs),
    /// Look at and verify records.
    Record(command::record::RecordArgs),
    /// Keys of the crew.
    Crew(command::crew::CrewArgs),
}

/// Reads the command line, runs the command and returns its exit code.
pub fn run() -> ExitCode {
    output::with_standard(|output| match Line::try_parse() {
        Ok(line) => dispatch(&line, output),
        Err(error) => explain(&error, output),
    })
    .into()
}

fn dispatch(line: &Line, output: &mut Output<'_>) -> Exit {
    match &line.command {
        Command::Check(args) => command::check::run(args, output),
        Command::Sizeup(args) => command::sizeup::run(args, output),
        Command::Simulate(args) => command::simulate::run(args, output),
        Command::Why(args) => command::why::run(args, output),
        Command::Brief(args) => {
            command::brief::run(args, &environment::Environment::look_around(), output)
        }
        Command::Demo(args) => {
            command::demo::run(args, &environment::Environment::look_around(), output)
        }
        Command::Record(args) => command::record::run(args, output),
        Command::Crew(args) => {
            command::crew::run(args, output, &mut crate::shell::passphrase::ask_hidden)
        }
    }
}

fn explain(error: &clap::Error, output: &mut Output<'_>) -> Exit {
    let text = error.render().to_string();
    if error.use_stderr() {
        output.talk(text.trim_end());
        Exit::Usage
    } else {
        output.data(text.trim_end());
        Exit::Good
    }
}

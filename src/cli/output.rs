//! The only place that writes standard output and standard error: data to one, talk to the other.
//! A write that fails is remembered and decides the exit code; nothing is said twice.

use std::io::{self, Write};

use clap::ValueEnum;

use super::exit::Exit;

/// In which form results are printed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default, ValueEnum)]
pub enum Format {
    /// For people.
    #[default]
    Text,
    /// One JSON object for programs.
    Json,
}

/// Where a command prints.
pub struct Output<'a> {
    data: &'a mut dyn Write,
    talk: &'a mut dyn Write,
    failed: Option<io::Error>,
}

impl<'a> Output<'a> {
    /// Prints into these two.
    pub fn new(data: &'a mut dyn Write, talk: &'a mut dyn Write) -> Self {
        Self {
            data,
            talk,
            failed: None,
        }
    }

    /// Prints one line of data.
    pub fn data(&mut self, line: &str) {
        self.data_raw(format!("{line}\n").as_bytes());
    }

    /// Prints bytes of data as they are.
    pub fn data_raw(&mut self, bytes: &[u8]) {
        if self.failed.is_none() {
            self.failed = self.data.write_all(bytes).err();
        }
    }

    /// Says one line to the person.
    pub fn talk(&mut self, line: &str) {
        self.talk_raw(&format!("{line}\n"));
    }

    /// Says something to the person and leaves the cursor behind it.
    pub fn talk_raw(&mut self, text: &str) {
        // When nobody can hear the talk there is nobody to tell.
        let _ = self
            .talk
            .write_all(text.as_bytes())
            .and_then(|()| self.talk.flush());
    }

    /// Ends the printing: an output that could not be written outranks the command's own answer.
    pub fn finish(mut self, exit: Exit) -> Exit {
        if self.failed.is_none() {
            self.failed = self.data.flush().err();
        }
        match self.failed.take() {
            None => exit,
            Some(error) => {
                self.talk(&format!("stumpside: the output cannot be written: {error}"));
                Exit::Unwritable
            }
        }
    }
}

/// Runs something with the real standard output and standard error.
#[expect(
    clippy::disallowed_methods,
    reason = "this is the door to standard output and error"
)]
pub fn with_standard(run: impl FnOnce(&mut Output<'_>) -> Exit) -> Exit {
    let mut data = io::BufWriter::new(io::stdout().lock());
    let mut talk = io::stderr();
    let mut output = Output::new(&mut data, &mut talk);
    let exit = run(&mut output);
    output.finish(exit)
}

//! A person at a real terminal: the built program in a pseudo-terminal, answered by what its
//! screen asks and by nothing else.

use std::io::{Read, Write};
use std::path::Path;
use std::sync::mpsc::{Receiver, RecvTimeoutError, channel};
use std::time::{Duration, Instant};

use portable_pty::{Child, CommandBuilder, MasterPty, PtySize, native_pty_system};

/// The program in a terminal.
pub(crate) struct Terminal {
    master: Option<Box<dyn MasterPty + Send>>,
    writer: Option<Box<dyn Write + Send>>,
    child: Box<dyn Child + Send + Sync>,
    bytes: Receiver<Vec<u8>>,
    parser: vt100::Parser,
    /// Every byte the program sent.
    pub(crate) sent: Vec<u8>,
}

static STARTS: std::sync::Mutex<()> = std::sync::Mutex::new(());

/// How long anything may take on a loaded machine.
const PATIENCE: Duration = Duration::from_secs(60);

impl Terminal {
    /// Starts the program in a folder with a size and arguments; its state lies in `state`.
    pub(crate) fn start(arguments: &[&str], (columns, rows): (u16, u16), state: &Path) -> Self {
        Self::start_with(arguments, (columns, rows), (state, &[]))
    }

    /// The same with more environment.
    pub(crate) fn start_with(
        arguments: &[&str],
        (columns, rows): (u16, u16),
        (state, more): (&Path, &[(&str, &str)]),
    ) -> Self {
        let size = PtySize {
            rows,
            cols: columns,
            pixel_width: 0,
            pixel_height: 0,
        };
        // No other start may inherit this terminal between its opening and its closing on exec.
        let one_at_a_time = STARTS
            .lock()
            .unwrap_or_else(std::sync::PoisonError::into_inner);
        let pair = native_pty_system().openpty(size).unwrap();
        let mut command = CommandBuilder::new("sh");
        // A limit on the size of files stands in for a full disk: the shell sets it, then becomes
        // the program.
        let limit = more
            .iter()
            .find(|(name, _)| *name == "FILE_BLOCKS")
            .map(|(_, blocks)| *blocks);
        let set = limit.map_or(String::new(), |blocks| format!("ulimit -f {blocks}; "));
        command.args([
            "-c",
            &format!("{set}exec \"$0\" \"$@\""),
            env!("CARGO_BIN_EXE_stumpside"),
        ]);
        command.args(arguments);
        command.env_clear();
        command.env("PATH", "/usr/local/bin:/usr/bin:/bin");
        command.env("TERM", "xterm-256color");
        command.env("LANG", "C.UTF-8");
        command.env("TZ", "UTC");
        command.env("XDG_STATE_HOME", state);
        for (name, value) in more {
            command.env(name, value);
        }
        command.cwd(state);
        let child = pair.slave.spawn_command(command).unwrap();
        drop(pair.slave);
        drop(one_at_a_time);
        let mut reader = pair.master.try_clone_reader().unwrap();
        let (to, bytes) = channel();
        std::thread::spawn(move || {
            let mut buffer = [0; 65_536];
            while let Ok(n) = reader.read(&mut buffer) {
                if n == 0 || to.send(buffer[..n].to_vec()).is_err() {
                    break;
                }
            }
        });
        let writer = pair.master.take_writer().unwrap();
        Self {
            master: Some(pair.master),
            writer: Some(writer),
            child,
            bytes,
            parser: vt100::Parser::new(rows, columns, 0),
            sent: vec![],
        }
    }

    /// Types keys; a program that is gone does not hear them.
    pub(crate) fn keys(&mut self, keys: &str) {
        if let Some(writer) = &mut self.writer {
            let _ = writer
                .write_all(keys.as_bytes())
                .and_then(|()| writer.flush());
        }
    }

    fn take(&mut self, chunk: &[u8]) {
        self.sent.extend_from_slice(chunk);
        self.parser.process(chunk);
    }

    /// The screen as it stands.
    pub(crate) fn screen(&self) -> String {
        self.parser.screen().contents()
    }

    /// Waits until the screen is as wanted.
    pub(crate) fn wait(&mut self, what: &str, wanted: impl Fn(&str) -> bool) -> String {
        let until = Instant::now() + PATIENCE;
        loop {
            let screen = self.screen();
            if wanted(&screen) {
                return screen;
            }
            match self
                .bytes
                .recv_timeout(until.saturating_duration_since(Instant::now()))
            {
                Ok(chunk) => self.take(&chunk),
                Err(_) => panic!("the screen never showed {what}:\n{}", self.screen()),
            }
        }
    }

    /// Listens for a while; false where the program has ended.
    pub(crate) fn listen(&mut self, time: Duration) -> bool {
        let until = Instant::now() + time;
        loop {
            match self
                .bytes
                .recv_timeout(until.saturating_duration_since(Instant::now()))
            {
                Ok(chunk) => self.take(&chunk),
                Err(RecvTimeoutError::Timeout) => return true,
                Err(RecvTimeoutError::Disconnected) => return false,
            }
        }
    }

    /// Looks until the screen has stood still for a moment and nothing is under way: a person
    /// does not answer half a picture.
    pub(crate) fn look(&mut self) {
        let still = Duration::from_millis(20);
        loop {
            match self.bytes.recv_timeout(still) {
                Ok(chunk) => self.take(&chunk),
                Err(_) if is_settled(&self.screen()) => return,
                Err(RecvTimeoutError::Timeout) => {}
                Err(RecvTimeoutError::Disconnected) => return,
            }
        }
    }

    /// Waits for the end and gives the exit code.
    pub(crate) fn end(mut self) -> (u32, Vec<u8>, String) {
        let runs = self.listen(PATIENCE);
        assert!(!runs, "the program does not end:\n{}", self.screen());
        let code = self.child.wait().unwrap().exit_code();
        let screen = self.screen();
        (code, std::mem::take(&mut self.sent), screen)
    }

    /// Kills the program where it stands.
    pub(crate) fn kill(mut self) {
        let pid = rustix_pid(self.child.process_id().unwrap());
        let _ = rustix::process::kill_process(pid, rustix::process::Signal::KILL);
        let _ = self.child.wait();
    }

    /// Takes the terminal away; true where the program ended within the patience.
    pub(crate) fn hang_up(&mut self) -> bool {
        self.master = None;
        self.writer = None;
        let (_, closed) = channel();
        // The reading thread lets go of its end at the next byte it cannot hand on.
        drop(std::mem::replace(&mut self.bytes, closed));
        let (_pace, pace) = channel::<()>();
        for _ in 0..600 {
            if self.child.try_wait().unwrap().is_some() {
                return true;
            }
            let _ = pace.recv_timeout(Duration::from_millis(100));
        }
        false
    }

    /// Sends a signal.
    pub(crate) fn signal(&self, signal: rustix::process::Signal) {
        let pid = rustix_pid(self.child.process_id().unwrap());
        rustix::process::kill_process(pid, signal).unwrap();
    }

    /// Gives the window another size.
    pub(crate) fn resize(&mut self, (columns, rows): (u16, u16)) {
        self.parser.screen_mut().set_size(rows, columns);
        let size = PtySize {
            rows,
            cols: columns,
            pixel_width: 0,
            pixel_height: 0,
        };
        self.master.as_ref().unwrap().resize(size).unwrap();
    }

    /// Keys the sensible answer to what the screen asks and waits until it moved on.
    pub(crate) fn answer(&mut self) {
        self.look();
        let screen = self.screen();
        let keys = keys_for(&screen);
        let before = position(&screen);
        self.keys(&keys);
        self.wait("the next step", |screen| {
            position(screen) != before && is_settled(screen)
        });
        self.look();
    }
}

impl Drop for Terminal {
    fn drop(&mut self) {
        let _ = self.child.kill();
        let _ = self.child.wait();
    }
}

fn rustix_pid(pid: u32) -> rustix::process::Pid {
    rustix::process::Pid::from_raw(i32::try_from(pid).unwrap()).unwrap()
}

/// Whether nothing is under way.
fn is_settled(screen: &str) -> bool {
    !screen.contains(" RECORDING\n")
        && !screen.contains("RECORDING ")
        && !screen.contains("SIZING UP AGAIN")
}

/// What tells one place of the day from another: stage, lit step, held look, overlay, last done.
pub(crate) fn position(screen: &str) -> String {
    let lines: Vec<&str> = screen.lines().collect();
    let title = lines.first().map_or("", |l| l.get(40..62).unwrap_or(""));
    let lit = lit_number(screen).map_or(String::new(), |n| n.to_string());
    let held = screen.contains("HELD");
    let overlay = screen.contains("any key = back") || screen.contains("seconds gone");
    let last: Vec<&str> = lines.iter().rev().skip(2).take(2).copied().collect();
    let tree = lines.first().map_or("", |l| l.get(..12).unwrap_or(""));
    format!("{tree}/{title}/{lit}/{held}/{overlay}/{last:?}")
}

/// The number of the lit rung.
pub(crate) fn lit_number(screen: &str) -> Option<u8> {
    screen.lines().find_map(|line| {
        let rest = line.strip_prefix("> ")?;
        rest.split(' ').next()?.parse().ok()
    })
}

/// The keys a person would type for what the screen asks.
pub(crate) fn keys_for(screen: &str) -> String {
    if screen.contains("seconds gone") {
        return "d".to_owned();
    }
    if screen.contains("any key = back") {
        return "x".to_owned();
    }
    let n = lit_number(screen).unwrap_or_else(|| panic!("nothing is lit:\n{screen}"));
    let footer = screen.lines().last().unwrap_or("");
    if footer.contains("digit, Enter") {
        format!("{}\r{n}\r", digit_for(screen))
    } else if footer.contains("number, Enter") {
        format!("{}{n}\r", numbers_for(screen))
    } else if footer.contains("w = write") {
        format!("wdead limb over way out B\t{n}\r")
    } else {
        format!("{n}\r")
    }
}

/// The first answer, or the first tree that may be begun, or closing the day.
fn digit_for(screen: &str) -> char {
    if !screen.contains("Which tree is next?") {
        return '1';
    }
    let open = screen.lines().find_map(|line| {
        let line = right_panel(line);
        let (digit, rest) = line.split_once("  ")?;
        let is_choice = digit.len() == 1 && digit.chars().all(|c| c.is_ascii_digit());
        (is_choice && !rest.contains("keeps it open")).then(|| digit.chars().next())?
    });
    open.unwrap_or('1')
}

/// What stands in the right panel of a line.
fn right_panel(line: &str) -> String {
    line.chars().skip(30).collect::<String>().trim().to_owned()
}

/// A whole number for each field: as planned where the screen shows a plan.
fn numbers_for(screen: &str) -> String {
    let panel: Vec<String> = screen.lines().map(right_panel).collect();
    let planned = |label: &str| {
        let line = panel
            .iter()
            .find(|l| l.starts_with(&format!("Plan, {label}: ")))?;
        line.split(": ")
            .nth(1)?
            .split(' ')
            .next()?
            .parse::<i64>()
            .ok()
    };
    // What two people see at the trees of the demo job; a blind look shows no figure to copy.
    let lean = match screen.lines().next().unwrap_or("").trim_start().get(..2) {
        Some("T3") => 8,
        Some("T2") => 3,
        _ => 2,
    };
    let mut keys = String::new();
    for line in panel
        .iter()
        .filter(|l| l.contains("[ ") && !l.contains("step's number"))
    {
        let label = line
            .trim_start_matches("> ")
            .split("  ")
            .next()
            .unwrap_or("")
            .split(" [")
            .next()
            .unwrap_or("")
            .trim();
        let value = match label {
            "wind" => 9,
            "heads inside" => 1,
            "lean" => lean,
            "height" => 20,
            label => planned(label).unwrap_or(40),
        };
        keys.push_str(&format!("{value}\r"));
    }
    keys
}

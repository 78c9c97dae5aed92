//! Times what a person feels, on the built program in a real pseudo-terminal: start to first
//! screen, a key to its drawn answer, a key to the answer on disk. Printed, never asserted.

#![expect(
    clippy::unwrap_used,
    clippy::disallowed_methods,
    clippy::print_stdout,
    reason = "a bench opens files, reads the clock and prints"
)]

use std::time::{Duration, Instant};

#[path = "../integration/driver.rs"]
#[expect(
    dead_code,
    reason = "a bench needs less of the person at the terminal than the tests"
)]
mod driver;

use driver::{Terminal, keys_for, position};

const TRIES: usize = 20;

fn main() {
    let folder = tempfile::tempdir().unwrap();
    let mut starts = vec![];
    let mut drawn = vec![];
    let mut recorded = vec![];
    for n in 0..TRIES {
        let job = folder.path().join(format!("job-{n}"));
        let begun = Instant::now();
        let arguments = ["demo", "--job", job.to_str().unwrap()];
        let mut terminal = Terminal::start(&arguments, (80, 24), folder.path());
        terminal.wait("the first screen", |s| s.contains("> 1 >"));
        starts.push(begun.elapsed());
        for _ in 0..5 {
            terminal.look();
            // A digit typed into a field: nothing but the screen answers.
            let before = terminal.screen();
            let pressed = Instant::now();
            terminal.keys("1");
            terminal.wait("the digit", |s| s != before);
            drawn.push(pressed.elapsed());
            terminal.keys("\u{1b}");
            terminal.look();
            // An answer confirmed: the screen moves on when it is on disk.
            let screen = terminal.screen();
            let keys = keys_for(&screen);
            let (most, last) = keys.split_at(keys.len() - 1);
            terminal.keys(most);
            terminal.look();
            let place = position(&terminal.screen());
            let pressed = Instant::now();
            terminal.keys(last);
            terminal.wait("the next step", |s| {
                position(s) != place && s.contains("RECORDED")
            });
            recorded.push(pressed.elapsed());
        }
        terminal.kill();
    }
    print(
        "start to first screen (demo job copied, three trees sized up)",
        &mut starts,
        100,
    );
    print("key to its drawn answer", &mut drawn, 16);
    print("Enter to the next step, on disk", &mut recorded, 250);
}

fn print(what: &str, times: &mut [Duration], wanted_ms: u32) {
    times.sort();
    let ms = |d: Duration| d.as_secs_f64() * 1_000.0;
    let middle = ms(times[times.len() / 2]);
    let most = ms(times[times.len() - 1]);
    println!(
        "{what}: median {middle:.1} ms, most {most:.1} ms of {} (wanted {wanted_ms} ms)",
        times.len()
    );
}

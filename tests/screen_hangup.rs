//! The real program when its terminal goes away or takes no more output: it ends soon, with a code, and does not spin.
#![cfg(target_os = "linux")]
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
mod screen_support;

use portable_pty::{Child, CommandBuilder, MasterPty, PtySize, native_pty_system};
use screen_support::ROOF;
use std::io::{Read, Write};
use std::time::{Duration, Instant};

/// The longest the program may take to end.
const SOON: Duration = Duration::from_secs(2);
/// Ticks of processor time (a hundredth of a second each) that ending may take: spinning until [`SOON`] takes 200.
const MOST_TICKS: u64 = 60;

/// Whether the terminal is the one that sends SIGHUP when it goes away.
#[derive(Clone, Copy, PartialEq)]
enum Terminal {
    Controlling,
    Plain,
}

/// A program whose output is read only as far as asked for, so that no reader keeps the terminal open.
struct Held {
    child: Box<dyn Child + Send + Sync>,
    keyboard: Box<dyn Write + Send>,
    output: Box<dyn Read + Send>,
    master: Box<dyn MasterPty + Send>,
    _folder: tempfile::TempDir,
}

impl Held {
    fn start(terminal: Terminal) -> Self {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("roof-edge.toml");
        std::fs::write(&path, ROOF).unwrap();
        let mut command = CommandBuilder::new(env!("CARGO_BIN_EXE_underfoot"));
        command.arg(&path);
        command.env("TERM", "xterm-256color");
        command.set_controlling_tty(terminal == Terminal::Controlling);
        let size = PtySize { rows: 40, cols: 100, pixel_width: 0, pixel_height: 0 };
        let pair = native_pty_system().openpty(size).unwrap();
        let child = pair.slave.spawn_command(command).unwrap();
        let output = pair.master.try_clone_reader().unwrap();
        let keyboard = pair.master.take_writer().unwrap();
        Self { child, keyboard, output, master: pair.master, _folder: folder }
    }

    /// Reads until the text has come; it must be one that is written in one piece.
    fn read_until(&mut self, text: &str) {
        let mut read = Vec::new();
        let mut byte = [0];
        while !read.ends_with(text.as_bytes()) {
            assert_eq!(self.output.read(&mut byte).unwrap(), 1, "{}", String::from_utf8_lossy(&read));
            read.push(byte[0]);
        }
    }

    fn signal(&self, name: &str) {
        let pid = self.child.process_id().unwrap().to_string();
        assert!(std::process::Command::new("kill").args([&format!("-{name}"), &pid]).status().unwrap().success());
    }

    /// Closes every handle on the other end of the terminal.
    fn drop_terminal(self) -> Box<dyn Child + Send + Sync> {
        let Self { child, keyboard, output, master, .. } = self;
        drop((keyboard, output, master));
        child
    }
}

/// Ticks of processor time so far; nothing once the program has ended.
fn ticks(pid: u32) -> Option<u64> {
    let stat = std::fs::read_to_string(format!("/proc/{pid}/stat")).ok()?;
    let fields: Vec<&str> = stat.rsplit_once(')')?.1.split_whitespace().collect();
    Some(fields[11].parse::<u64>().ok()? + fields[12].parse::<u64>().ok()?)
}

/// Waits for the end, which must come soon and cost little; a program that goes on is ended before the test fails.
fn code(mut child: Box<dyn Child + Send + Sync>) -> u32 {
    let pid = child.process_id().unwrap();
    let before = ticks(pid).unwrap();
    let mut after = before;
    let start = Instant::now();
    loop {
        after = ticks(pid).unwrap_or(after).max(after);
        if let Some(status) = child.try_wait().unwrap() {
            assert!(after - before <= MOST_TICKS, "ending took {} ticks", after - before);
            return status.exit_code();
        }
        if start.elapsed() > SOON {
            child.kill().unwrap();
            child.wait().unwrap();
            panic!("still running after {SOON:?} and {} ticks", after - before);
        }
        std::thread::sleep(Duration::from_millis(10));
    }
}

#[test]
fn a_terminal_that_goes_away_ends_the_program() {
    let mut held = Held::start(Terminal::Controlling);
    held.read_until("FIRST-PASS");
    assert_eq!(code(held.drop_terminal()), 129);
}

#[test]
fn a_terminal_that_goes_away_without_a_signal_ends_the_program() {
    let mut held = Held::start(Terminal::Plain);
    held.read_until("FIRST-PASS");
    assert_eq!(code(held.drop_terminal()), 129);
}

#[test]
fn a_terminal_that_goes_away_while_the_fall_plays_ends_the_program() {
    let mut held = Held::start(Terminal::Plain);
    held.read_until("FIRST-PASS");
    held.keyboard.write_all(b" ").unwrap();
    held.read_until("\x1b[");
    assert_eq!(code(held.drop_terminal()), 129);
}

#[test]
fn a_hangup_with_a_signal_as_well_ends_the_program_the_same_way() {
    let mut held = Held::start(Terminal::Plain);
    held.read_until("FIRST-PASS");
    held.signal("HUP");
    assert_eq!(code(held.drop_terminal()), 129);
}

#[test]
fn a_terminal_that_takes_no_more_output_does_not_hold_up_a_signal() {
    for (name, expected) in [("TERM", 143), ("HUP", 129), ("INT", 130)] {
        let mut held = Held::start(Terminal::Controlling);
        held.read_until("FIRST-PASS");
        // Every key is another full frame; nobody reads them, until the terminal takes no more.
        for _ in 0..100 {
            held.keyboard.write_all(b"?").unwrap();
            std::thread::sleep(Duration::from_millis(5));
        }
        held.signal(name);
        // Both ends stay open until the program has ended.
        let Held { child, keyboard, output, master, _folder } = held;
        assert_eq!(code(child), expected, "SIG{name}");
        drop((keyboard, output, master));
    }
}

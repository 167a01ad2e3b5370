//! The real program in a real terminal: it starts, edits, leaves, and gives the terminal back however it ends.
#![cfg(unix)]
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail by panicking")]
mod screen_support;

use portable_pty::{Child, CommandBuilder, ExitStatus, MasterPty, PtySize, native_pty_system};
use screen_support::ROOF;
use std::io::{Read, Write};
use std::sync::{Arc, Mutex};
use std::time::{Duration, Instant};

const PATIENCE: Duration = Duration::from_secs(20);

/// A program in a terminal of 100 columns and 40 rows.
struct Session {
    terminal: Arc<Mutex<vt100::Parser>>,
    keyboard: Box<dyn Write + Send>,
    child: Box<dyn Child + Send + Sync>,
    _master: Box<dyn MasterPty + Send>,
}

impl Session {
    fn start(command: CommandBuilder) -> Self {
        let size = PtySize { rows: 40, cols: 100, pixel_width: 0, pixel_height: 0 };
        let pair = native_pty_system().openpty(size).unwrap();
        let child = pair.slave.spawn_command(command).unwrap();
        drop(pair.slave);
        let terminal = Arc::new(Mutex::new(vt100::Parser::new(40.try_into().unwrap(), 100.try_into().unwrap(), 0)));
        let mut output = pair.master.try_clone_reader().unwrap();
        let sink = Arc::clone(&terminal);
        std::thread::spawn(move || {
            let mut bytes = [0; 4096];
            while let Ok(count @ 1..) = output.read(&mut bytes) {
                sink.lock().unwrap().process(&bytes[..count]);
            }
        });
        let keyboard = pair.master.take_writer().unwrap();
        Self { terminal, keyboard, child, _master: pair.master }
    }

    fn screen(path: &std::path::Path) -> Self {
        let mut command = CommandBuilder::new(env!("CARGO_BIN_EXE_underfoot"));
        command.arg(path);
        command.env("TERM", "xterm-256color");
        Self::start(command)
    }

    fn text(&self) -> String {
        self.terminal.lock().unwrap().screen().contents()
    }

    fn wait(&self, what: &str, happened: impl Fn(&vt100::Screen) -> bool) {
        let start = Instant::now();
        while !happened(self.terminal.lock().unwrap().screen()) {
            assert!(start.elapsed() < PATIENCE, "waited in vain for {what}\n{}", self.text());
            std::thread::sleep(Duration::from_millis(10));
        }
    }

    fn wait_for(&self, text: &str) {
        self.wait(text, |screen| screen.contents().contains(text));
    }

    fn press(&mut self, keys: &str) {
        self.keyboard.write_all(keys.as_bytes()).unwrap();
        self.keyboard.flush().unwrap();
    }

    fn signal(&self, name: &str) {
        let pid = self.child.process_id().unwrap().to_string();
        assert!(std::process::Command::new("kill").args([&format!("-{name}"), &pid]).status().unwrap().success());
    }

    fn end(mut self) -> ExitStatus {
        let start = Instant::now();
        let status = loop {
            if let Some(status) = self.child.try_wait().unwrap() {
                break status;
            }
            assert!(start.elapsed() < PATIENCE, "still running\n{}", self.text());
            std::thread::sleep(Duration::from_millis(10));
        };
        self.wait("the terminal as it was", |screen| {
            !screen.alternate_screen()
                && !screen.hide_cursor()
                && !screen.bracketed_paste()
                && screen.mouse_protocol_mode() == vt100::MouseProtocolMode::None
        });
        status
    }
}

fn file() -> (tempfile::TempDir, std::path::PathBuf) {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("roof-edge.toml");
    std::fs::write(&path, ROOF).unwrap();
    (folder, path)
}

fn is_taken(screen: &vt100::Screen) -> bool {
    screen.alternate_screen() && screen.mouse_protocol_mode() != vt100::MouseProtocolMode::None
}

#[test]
fn the_program_starts_nudges_undoes_and_leaves() {
    let (_folder, path) = file();
    let mut session = Session::screen(&path);
    session.wait_for("FIRST-PASS ESTIMATE");
    session.wait_for("quit");
    session.wait("the alternate screen and the mouse", is_taken);
    session.press("\x1b[C");
    session.wait_for("edited");
    session.press("u");
    session.wait("the mark to go", |screen| !screen.contents().contains("edited"));
    session.press("q");
    assert_eq!(session.end().exit_code(), 0);
    assert_eq!(std::fs::read_to_string(&path).unwrap(), ROOF);
}

#[test]
fn a_walk_leads_on_and_leaves_its_scenario_as_it_was() {
    let (folder, path) = file();
    let walk = folder.path().join("roof.walk.toml");
    let stop = "[[stop]]\nsay = \"More line.\"\ninput = \"line.length\"\nvalue = \"1.9 m\"\n";
    std::fs::write(&walk, format!("scenario = \"roof-edge.toml\"\n{stop}")).unwrap();
    let mut command = CommandBuilder::new(env!("CARGO_BIN_EXE_underfoot"));
    command.arg("walk");
    command.arg(&walk);
    command.env("TERM", "xterm-256color");
    let mut session = Session::start(command);
    session.wait_for("start, 1 stop");
    session.press(">");
    session.wait_for("More line.");
    session.wait_for("line.length 1.8 m -> 1.9 m");
    session.press("q");
    assert_eq!(session.end().exit_code(), 0);
    assert_eq!(std::fs::read_to_string(&path).unwrap(), ROOF);
}

#[test]
fn a_change_is_saved_to_the_file() {
    let (_folder, path) = file();
    let mut session = Session::screen(&path);
    session.wait_for("quit");
    session.press("\x1b[C");
    session.wait_for("edited");
    session.press("s");
    session.wait_for("saved");
    session.press("q");
    assert_eq!(session.end().exit_code(), 0);
    assert_eq!(std::fs::read_to_string(&path).unwrap(), ROOF.replace("80..100..120", "80..101..120"));
}

#[test]
fn a_change_from_outside_is_announced() {
    let (_folder, path) = file();
    let mut session = Session::screen(&path);
    session.wait_for("quit");
    std::fs::write(&path, ROOF.replace("22 kN", "23 kN")).unwrap();
    session.wait_for("changed on disk");
    session.press("r");
    session.wait_for("23 kN");
    session.press("q");
    assert_eq!(session.end().exit_code(), 0);
}

#[test]
fn control_c_leaves_with_130() {
    let (_folder, path) = file();
    let mut session = Session::screen(&path);
    session.wait_for("quit");
    session.press("\x03");
    assert_eq!(session.end().exit_code(), 130);
}

#[test]
fn signals_give_the_terminal_back() {
    for (name, code) in [("TERM", 143), ("HUP", 129), ("INT", 130)] {
        let (_folder, path) = file();
        let session = Session::screen(&path);
        session.wait_for("quit");
        session.wait("the alternate screen", is_taken);
        session.signal(name);
        assert_eq!(session.end().exit_code(), code, "SIG{name}");
    }
}

#[test]
fn a_file_with_faults_never_enters_the_alternate_screen() {
    let (_folder, path) = file();
    std::fs::write(&path, ROOF.replace("100..120 kg", "100..120 m")).unwrap();
    let session = Session::screen(&path);
    session.wait_for("roof-edge.toml");
    assert_eq!(session.end().exit_code(), 2);
}

#[test]
fn without_a_terminal_it_says_so() {
    let (_folder, path) = file();
    let output = std::process::Command::new(env!("CARGO_BIN_EXE_underfoot")).arg(&path).output().unwrap();
    assert_eq!(output.status.code(), Some(2));
    assert!(String::from_utf8_lossy(&output.stderr).contains("terminal"));
    assert!(output.stdout.is_empty());
}

#[test]
fn no_color_leaves_the_marks_and_drops_the_colours() {
    let (_folder, path) = file();
    let mut command = CommandBuilder::new(env!("CARGO_BIN_EXE_underfoot"));
    command.arg(&path);
    command.env("TERM", "xterm-256color");
    command.env("NO_COLOR", "1");
    let mut session = Session::start(command);
    session.wait_for("quit");
    {
        let terminal = session.terminal.lock().unwrap();
        let cells: Vec<&vt100::Cell> = (0..40)
            .flat_map(|row| (0..100).map(move |column| (row, column)))
            .filter_map(|(row, column)| terminal.screen().cell(row, column))
            .collect();
        assert!(
            cells.iter().all(|cell| cell.fgcolor() == vt100::Color::Default && cell.bgcolor() == vt100::Color::Default)
        );
        assert!(cells.iter().any(|cell| cell.inverse()), "the caution is no longer set off");
    }
    session.press("q");
    assert_eq!(session.end().exit_code(), 0);
}

/// Not a test of its own: what [`a_panic_gives_the_terminal_back`] runs in its terminal.
#[test]
fn child_that_panics_on_the_screen() {
    if std::env::var_os("UNDERFOOT_PANIC_ON_SCREEN").is_some() {
        let _guard = underfoot::tui::terminal::Guard::take().unwrap();
        panic!("the roof is on fire");
    }
}

#[test]
fn a_panic_gives_the_terminal_back() {
    let mut command = CommandBuilder::new(std::env::current_exe().unwrap());
    command.args(["--exact", "child_that_panics_on_the_screen", "--nocapture"]);
    command.env("TERM", "xterm-256color");
    command.env("UNDERFOOT_PANIC_ON_SCREEN", "1");
    let session = Session::start(command);
    session.wait_for("the roof is on fire");
    assert_ne!(session.end().exit_code(), 0);
}

#[test]
fn a_running_sample_is_stopped_by_its_key_while_the_screen_answers_a_nudge() {
    let (_folder, path) = file();
    let mut session = Session::screen(&path);
    session.wait_for("quit");
    session.press("8");
    for count in ["4,096 samples", "16,384 samples", "65,536 samples"] {
        session.wait_for(count);
        session.press("g");
    }
    // A quarter of a million runs take seconds.
    session.wait_for("sample: ");
    let asked = Instant::now();
    session.press("\x1b[C");
    session.wait_for("edited");
    assert!(asked.elapsed() < Duration::from_secs(1), "a nudge waited for the sample");
    let far = |line: &str| line.contains("sample: ") && line.contains("% done");
    session.wait("the sample to get on", |screen| screen.contents().lines().any(far));
    session.press("x");
    session.wait_for("262,144, stopped: a part");
    session.press("q");
    session.wait_for("unsaved changes");
    session.press("q");
    assert_eq!(session.end().exit_code(), 0);
}

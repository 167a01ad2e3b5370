//! Throughput and peak memory of `audit` over 10,000 files, with the program itself.
#![allow(clippy::expect_used, reason = "a bench fails by panicking")]
use std::fs;
use std::path::Path;
use std::process::{Command, Stdio};
use std::time::{Duration, Instant};

/// Files of the goal.
const FILES: usize = 10_000;
/// Falls that go straight down, one to five bands each.
const STRAIGHT: &[&str] = &[
    "roof-foot-level.toml",
    "overhead-anchor.toml",
    "steel-beam-us.toml",
    "low-scaffold-short.toml",
    "vertical-line-grab.toml",
    "harness-and-post.toml",
    "retractable-overhead.toml",
    "secondary-line.toml",
];
/// One file in so many is another, the rarest first: a lifeline, one with a fault, a swing.
const OTHERS: &[(&str, usize)] = &[("lifeline-with-sag.toml", 200), ("", 100), ("swing-clears-tower.toml", 50)];

fn shipped(name: &str) -> String {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("scenarios").join(name);
    fs::read_to_string(path).expect("a shipped scenario")
}

/// A file like a shipped one with a band or value of its own.
fn text(number: usize, others: bool) -> String {
    let other = OTHERS.iter().find(|(_, each)| others && number % each == each - 1).map(|(name, _)| *name);
    let base = match other {
        Some("") => return "[subject]\nkind = \"person\"\nmass = \"x\"\n".to_owned(),
        Some(name) => shipped(name),
        None => shipped(STRAIGHT[number % STRAIGHT.len()]),
    };
    let own = format!("\"{}..{}..{} kg\"", 70 + number % 7, 85 + number % 11, 100 + number % 13);
    let line = base.lines().find(|line| line.starts_with("mass = ")).expect("a mass");
    base.replacen(line, &format!("mass = {own} # {number}"), 1)
}

/// Seconds, and peak resident memory in MiB as the system tells it.
fn run(folder: &Path, form: &str, threads: &str) -> (f64, f64) {
    let start = Instant::now();
    let mut child = Command::new(env!("CARGO_BIN_EXE_underfoot"))
        .args(["audit", form])
        .arg(folder)
        .env("RAYON_NUM_THREADS", threads)
        .stdout(Stdio::null())
        .stderr(Stdio::null())
        .spawn()
        .expect("the program");
    let status = format!("/proc/{}/status", child.id());
    let mut peak = 0.0_f64;
    loop {
        let text = fs::read_to_string(&status).unwrap_or_default();
        let line = text.lines().find_map(|line| line.strip_prefix("VmHWM:"));
        let kib = line.and_then(|line| line.trim().trim_end_matches(" kB").parse::<f64>().ok());
        peak = peak.max(kib.unwrap_or(0.0) / 1024.0);
        if child.try_wait().expect("a child").is_some() {
            return (start.elapsed().as_secs_f64(), peak);
        }
        std::thread::sleep(Duration::from_millis(5));
    }
}

fn main() {
    let load = fs::read_to_string("/proc/loadavg").unwrap_or_default();
    println!("load before: {}", load.split(' ').next().unwrap_or("unknown"));
    for (name, others) in [("straight falls", false), ("with swings, lifelines, faults", true)] {
        let folder = tempfile::tempdir().expect("a folder");
        for number in 0..FILES {
            fs::write(folder.path().join(format!("{number:05}.toml")), text(number, others)).expect("a file");
        }
        for (form, threads) in [("--brief", "1"), ("--brief", "2"), ("--json", "2"), ("--sarif", "2")] {
            let (seconds, peak) = run(folder.path(), form, threads);
            #[expect(clippy::cast_precision_loss, reason = "a small count")]
            let each = FILES as f64 / seconds;
            println!(
                "{name:<32} {form:<8} {threads} threads: {seconds:>7.2} s, {each:>6.0} files a second, peak {peak:>6.1} MiB"
            );
        }
    }
}

//! Sheets worked again by hand: every number that a sheet prints is recomputed from the inputs it prints, to the digits
//! printed. Nothing of the program is used but its Markdown.
#![allow(
    clippy::expect_used,
    clippy::panic,
    clippy::unwrap_used,
    clippy::too_many_lines,
    clippy::cast_precision_loss,
    reason = "a test fails by panicking"
)]
mod hand_support;

use hand_support::motion::{Case, Mode, Run, State};
use hand_support::page::{Table, is_printed, numbers, read};
use std::collections::BTreeMap;

/// Published limits that these sheets are judged by, SI, by the label of the check: set, then value.
const PUBLISHED: &[(&str, &str, f64)] = &[
    ("eu-363", "arrest force", 6000.0),
    ("eu-363", "deceleration distance", 1.75),
    ("eu-363", "anchor strength", 12_000.0),
    ("eu-363", "line strength", 22_000.0),
    ("eu-363", "lanyard length", 2.0),
    ("rope-1891", "arrest force", 6000.0),
    ("rope-1891", "rope elongation, static", 0.05),
];

struct Hand {
    file: &'static str,
    text: String,
    tables: Vec<Table>,
    words: Vec<(String, String)>,
    inputs: BTreeMap<String, f64>,
    stated: BTreeMap<String, String>,
    case: Case,
    run: Run,
    /// Every value worked by hand, by its name.
    known: BTreeMap<String, f64>,
}

fn sheet(file: &str) -> String {
    let folder = tempfile::tempdir().expect("a folder");
    let out = folder.path().join("sheet.md");
    let file = format!("scenarios/{file}.toml");
    let run = assert_cmd::Command::cargo_bin("underfoot")
        .expect("the program")
        .args(["sheet", &file, "-o"])
        .arg(&out)
        .output();
    let run = run.expect("a run");
    assert!(matches!(run.status.code(), Some(0 | 1)), "{}", String::from_utf8_lossy(&run.stderr));
    std::fs::read_to_string(out).expect("a sheet")
}

/// A quantity with its unit to SI.
fn si(words: &str) -> f64 {
    let (number, unit) = words.split_once(' ').unwrap_or((words, ""));
    let factor = match unit {
        "" | "m" | "kg" | "N" | "N/m" | "N s/m" | "m/s2" | "s" => 1.0,
        "kN" | "kN/m" => 1000.0,
        "%" => 0.01,
        other => panic!("no unit {other} in {words}"),
    };
    factor * number.parse::<f64>().unwrap_or_else(|_| panic!("no number in {words}"))
}

impl Hand {
    fn of(file: &'static str) -> Self {
        let text = std::fs::read_to_string(format!("scenarios/{file}.toml")).expect("the scenario");
        let (tables, words) = read(&sheet(file));
        let table = tables.iter().find(|t| t.caption == "inputs").expect("the inputs");
        let (mut inputs, mut stated) = (BTreeMap::new(), BTreeMap::new());
        for row in &table.rows {
            let path = table.cell(row, "path").to_owned();
            stated.insert(path.clone(), table.cell(row, "as stated").to_owned());
            let used = table.cell(row, "used, SI");
            if !used.is_empty() {
                inputs.insert(path, si(used));
            }
        }
        let case = case(&inputs);
        let mut hand =
            Self { file, text, tables, words, inputs, stated, run: case.run(), case, known: BTreeMap::new() };
        hand.work();
        hand
    }

    fn get(&self, path: &str) -> Option<f64> {
        self.inputs.get(path).copied()
    }
    fn zero(&self, path: &str) -> f64 {
        self.get(path).unwrap_or(0.0)
    }
    fn know(&mut self, name: &str, value: f64) {
        self.known.insert(name.to_owned(), value);
    }
    fn value(&self, name: &str) -> f64 {
        *self.known.get(name).unwrap_or_else(|| panic!("{}: `{name}` is printed and not worked by hand", self.file))
    }

    /// Everything but the motion itself, which `run` has.
    fn work(&mut self) {
        let Case { mass, gravity, free_fall, stiffness, damping, absorber } = self.case;
        let weight = mass * gravity;
        let speed = (2.0 * gravity * free_fall).sqrt();
        let taut = speed / gravity;
        let rest = weight / stiffness;
        let length = self.get("line.length").expect("a length");
        let alpha = damping / (2.0 * mass);
        let natural = (stiffness / mass).sqrt();
        let split = (natural * natural - alpha * alpha).abs().sqrt();
        let last = self.run.pieces.last().expect("a motion").end;
        let deployed = last.y[3];
        let hang = deployed + rest;
        let arrest = self.run.lowest.map_or(hang, |low| low.y[0]);
        let deep =
            self.run.lowest.map_or(
                [hang, 0.0, rest, deployed, weight * (free_fall + rest) - 0.5 * stiffness * rest * rest],
                |low| low.y,
            );
        let body = self
            .get("subject.attachment_above_feet")
            .or(self.get("subject.underside_below_attachment"))
            .expect("a body");
        let allowance = self.zero("subject.stretch_allowance");
        let standing = self.get("place.standing").expect("a standing surface");
        let (start, top, reserve) = (standing + body, self.zero("obstacle.1.top"), self.zero("obstacle.1.reserve"));
        let lowest_part = start - free_fall - arrest - body - allowance;
        let anchor = self.get("place.anchor").unwrap_or(start - free_fall + length);
        for (name, value) in [
            ("W", weight),
            ("h", free_fall),
            ("E_0", weight * free_fall),
            ("v_0", speed),
            ("t_0", taut),
            ("k_1", stiffness),
            ("c_1", damping),
            ("D", damping * damping - 4.0 * mass * stiffness),
            ("α", alpha),
            ("ω_0", natural),
            ("ζ", alpha / natural),
            ("ω", split),
            ("δ", split),
            ("x_e", rest),
            ("slow", alpha - split),
            ("fast", alpha + split),
            ("decay of stretch", stiffness / damping),
            ("free_fall_distance", free_fall),
            ("fall_factor", free_fall / length),
            ("fall_energy", weight * free_fall),
            ("speed_at_taut", speed),
            ("time_taut", taut),
            ("arrest_force_peak", self.run.peak.0),
            ("time_peak_force", self.run.peak.1),
            ("anchor_force_peak", self.run.peak.0),
            ("deceleration_peak", (self.run.peak.0 - weight) / weight),
            ("time_above_4kn", self.run.above[0]),
            ("time_above_6kn", self.run.above[1]),
            ("line_elongation_peak", self.run.longest_stretch),
            ("other_elongation_peak", 0.0),
            ("deployed_length", deployed),
            ("stroke_used_up", 0.0),
            ("arrest_distance", arrest),
            ("total_fall_distance", free_fall + arrest),
            ("hang_travel", hang),
            ("lowest_attachment", start - free_fall - arrest),
            ("lowest_foot", lowest_part),
            ("lowest_underside", lowest_part),
            ("clearance", lowest_part - top),
            ("margin", lowest_part - top - reserve),
            ("settle_time", last.t),
            ("damping_ratio", alpha / natural),
            ("natural_frequency", natural),
            ("damped_frequency", split),
            ("line_work", 0.5 * stiffness * deep[2] * deep[2]),
            ("other_work", 0.0),
            ("damper_work", deep[4]),
            ("absorber_work", absorber.map_or(0.0, |a| a.0) * deep[3]),
            ("E", weight * (free_fall + arrest)),
            ("anchor", anchor),
            ("anchor above", anchor - start),
            ("to taut", anchor - start + free_fall),
            ("attachment start", start),
            ("attachment taut", start - free_fall),
            ("attachment rest", start - free_fall - hang),
            ("below the anchor", anchor - lowest_part + reserve),
            ("below standing", free_fall + arrest + allowance + reserve),
            ("slack_episodes", self.run.pieces.iter().filter(|p| p.mode == Mode::Slack).count() as f64),
        ] {
            self.know(name, value);
        }
        if let Some((force, onset, stroke)) = absorber {
            self.know("F", force);
            self.know("F_on", onset);
            self.know("S", stroke);
            self.know("stretch under F", force / stiffness);
            self.know("stroke_left", stroke - deployed);
        }
        if let Some(low) = self.run.lowest {
            self.know("time_lowest", low.t);
            self.know("deceleration_mean", speed / (low.t - taut) / gravity);
            if let Some(high) = self.run.highest {
                self.know("rebound_rise", low.y[0] - high.y[0]);
                self.know("highest travel", high.y[0]);
            }
        }
        if let Some(slack) = self.run.pieces.iter().find(|p| p.mode == Mode::Slack) {
            self.know("time_first_slack", slack.start.t);
        }
        if absorber.is_none() && damping * damping < 4.0 * mass * stiffness {
            let amplitude = rest.hypot((speed - alpha * rest) / split);
            let tau = self.run.lowest.expect("a lowest point").t - taut;
            self.know("envelope_amplitude", amplitude);
            self.know("envelope_decay", alpha);
            self.know("envelope_bound_coarse", hang + amplitude);
            self.know("envelope_bound_tight", hang + amplitude * (-alpha * tau).exp());
        }
        if let (Some(p), Some(from), Some(to)) = (
            self.get("line.static_elongation.percent"),
            self.get("line.static_elongation.from"),
            self.get("line.static_elongation.to"),
        ) {
            self.know("K", (to - from) * gravity / p);
            self.know("F_a", from * gravity);
            self.know("F_b", to * gravity);
        }
        if let Some(modulus) = self.get("line.modulus") {
            self.know("K", modulus);
        }
    }

    /// A printed cell against a value, in SI or in the unit that stands in it.
    fn expect(&self, place: &str, cell: &str, value: f64) {
        let printed = cell.trim_start_matches(['≤', '≥', '+', ' ']);
        let (number, unit) = printed.split_once(' ').unwrap_or((printed, ""));
        let value = if unit == "kN" { value / 1000.0 } else { value };
        assert!(
            is_printed(&number.replace('−', "-"), value),
            "{} {place}: printed `{cell}`, by hand {value}",
            self.file
        );
    }

    fn table(&self, caption: &str) -> Option<&Table> {
        self.tables.iter().find(|t| t.caption == caption)
    }
}

fn case(inputs: &BTreeMap<String, f64>) -> Case {
    let get = |path: &str| inputs.get(path).copied();
    let (mass, gravity) = (get("subject.mass").expect("a mass"), get("gravity").expect("gravity"));
    let length = get("line.length").expect("a length");
    let free_fall = get("fall.free_fall").unwrap_or_else(|| {
        let attachment =
            get("place.standing").expect("standing") + get("subject.attachment_above_feet").expect("attachment");
        attachment - (get("place.anchor").expect("an anchor") - length)
    });
    let elongation = || {
        let (p, from, to) = (
            get("line.static_elongation.percent")?,
            get("line.static_elongation.from")?,
            get("line.static_elongation.to")?,
        );
        Some((to - from) * gravity / p)
    };
    let stiffness =
        get("line.stiffness").or_else(|| Some(get("line.modulus").or_else(elongation)? / length)).expect("a stiffness");
    let ratio = |z: f64| 2.0 * z * (mass * stiffness).sqrt();
    let damping = get("line.damping").or_else(|| get("line.damping_ratio").map(ratio)).expect("a damper");
    let force = get("absorber.deploy_force");
    let absorber =
        force.map(|f| (f, get("absorber.onset_force").unwrap_or(f), get("absorber.stroke").expect("a stroke")));
    Case { mass, gravity, free_fall, stiffness, damping, absorber }
}

/// What a cell states in the file's own unit is what is used, and stands where the sheet says.
fn inputs_are_as_stated(hand: &Hand) {
    let table = hand.table("inputs").expect("the inputs");
    let lines: Vec<&str> = hand.text.lines().collect();
    for row in &table.rows {
        let (path, from) = (table.cell(row, "path"), table.cell(row, "from"));
        if let Some(number) = from.strip_prefix("line ") {
            let line = lines[number.parse::<usize>().expect("a number") - 1];
            let key = path.rsplit('.').next().expect("a key");
            assert!(line.contains(key), "{path} is not in `{line}`");
            assert!(line.contains(table.cell(row, "as stated")), "{path}: `{line}`");
        } else {
            assert_eq!((from, path), ("default", "gravity"));
        }
        let (used, typical) = (table.cell(row, "used, SI"), table.cell(row, "typical"));
        if !used.is_empty() {
            assert!((si(used) - si(typical)).abs() <= 1e-9 * si(used).abs(), "{path}: {used} {typical}");
        }
    }
}

fn steps_are_right(hand: &Hand, caption: &str, value: impl Fn(&str) -> f64) {
    let Some(table) = hand.table(caption) else { panic!("{}: no table `{caption}`", hand.file) };
    for row in &table.rows {
        let (symbol, cell) = (table.cell(row, "symbol"), table.cell(row, "value"));
        if cell.is_empty() || cell.ends_with("damped") {
            continue;
        }
        if symbol == "r_1,2" {
            let underdamped = hand.value("D") < 0.0;
            let pair = if underdamped { ["α", "ω"] } else { ["slow", "fast"] };
            for (printed, name) in numbers(&cell.replace("1/s", "")).iter().zip(pair) {
                hand.expect(caption, printed, hand.value(name));
            }
            continue;
        }
        hand.expect(&format!("{caption} {symbol}"), cell, value(symbol));
    }
}

/// Value of a symbol in the working of a mode.
fn of_mode(hand: &Hand, index: usize, symbol: &str) -> f64 {
    let piece = &hand.run.pieces[index];
    let Case { mass, gravity, stiffness, .. } = hand.case;
    let rest = piece.start.y[3] + mass * gravity / stiffness;
    let (alpha, split) = (hand.value("α"), hand.value("ω"));
    let a = piece.start.y[0] - rest;
    let b = (piece.start.y[1] + alpha * a) / split;
    let force = |state: &State| hand.case.force(piece.mode, &state.y);
    match symbol {
        "t_a" => piece.start.t,
        "x_a" => piece.start.y[0],
        "v_a" => piece.start.y[1],
        "s_a" => piece.start.y[3],
        "e_a" => piece.start.y[2],
        "T_a" => force(&piece.start),
        "x_b" => piece.end.y[0],
        "v_b" => piece.end.y[1],
        "s_b" => piece.end.y[3],
        "T_b" => force(&piece.end),
        "x_r" => rest,
        "A" => a,
        "B" => b,
        "C" => a.hypot(b),
        "γ" => b.atan2(a),
        "a" => gravity - force(&piece.start) / mass,
        "τ_low" => hand.value("time_lowest") - piece.start.t,
        "τ_b" => piece.end.t - piece.start.t,
        "t_b" => piece.end.t,
        other => panic!("{}: no symbol `{other}` in mode {index}", hand.file),
    }
}

const MODE_SYMBOLS: [&str; 18] = [
    "t_a", "x_a", "v_a", "s_a", "e_a", "T_a", "x_b", "v_b", "s_b", "T_b", "x_r", "A", "B", "C", "γ", "a", "τ_b", "t_b",
];

fn modes_are_right(hand: &mut Hand) {
    let shown: Vec<Table> = hand.tables.iter().filter(|t| t.caption.starts_with("mode ")).cloned().collect();
    assert!(!shown.is_empty());
    for (index, table) in shown.iter().enumerate() {
        let word = match hand.run.pieces[index].mode {
            Mode::Taut => "taut",
            Mode::Deploying => "deploying",
            Mode::Slack => "slack",
        };
        assert_eq!(table.caption, format!("mode {}: {word}", index + 1));
        steps_are_right(hand, &table.caption, |symbol| of_mode(hand, index, symbol));
        for symbol in MODE_SYMBOLS {
            let value = of_mode(hand, index, symbol);
            hand.know(&format!("mode {index} {symbol}"), value);
        }
        let piece = hand.run.pieces[index];
        if let Some((force, _, _)) = hand.case.absorber {
            hand.know(&format!("mode {index} away"), piece.start.y[2] - force / hand.case.stiffness);
        }
        if let Some(low) = hand.run.lowest {
            hand.know(&format!("mode {index} low"), low.t - piece.start.t);
        }
    }
    let list = hand.table("modes in order of time, each with the state at its start").expect("the modes").clone();
    assert_eq!(list.rows.len(), shown.len());
    for (index, row) in list.rows.iter().enumerate() {
        assert_eq!(list.cell(row, "mode"), (index + 1).to_string());
        for (head, symbol) in
            [("from", "t_a"), ("travel past taut", "x_a"), ("speed", "v_a"), ("line force", "T_a"), ("deployed", "s_a")]
        {
            hand.expect(head, list.cell(row, head), of_mode(hand, index, symbol));
        }
    }
    let left = hand.run.pieces.len() - shown.len();
    let told = hand.words.iter().any(|(_, words)| words.starts_with(&format!("{left} more mode")));
    assert!(left == 0 || told, "{}: {left} modes are not told of", hand.file);
}

fn envelope_is_right(hand: &mut Hand) {
    if hand.value("D") >= 0.0 {
        assert!(hand.table("envelope of the oscillation about the hang position").is_none());
        return;
    }
    let after = hand.case.absorber.is_some();
    let taut = |p: &&hand_support::motion::Piece| p.mode == Mode::Taut;
    let found = if after { hand.run.pieces.iter().rfind(taut) } else { hand.run.pieces.first() };
    let piece = *found.expect("a taut mode");
    let index = hand.run.pieces.iter().position(|p| p.start.t == piece.start.t).expect("a mode");
    let (amplitude, rest) = (of_mode(hand, index, "C"), of_mode(hand, index, "x_r"));
    steps_are_right(hand, "envelope of the oscillation about the hang position", |symbol| match symbol {
        "t_a" => piece.start.t,
        "x_r" => rest,
        "C" => amplitude,
        "α" => hand.value("α"),
        "x_c" => hand.value("envelope_bound_coarse"),
        "x_t" => hand.value("envelope_bound_tight"),
        other => panic!("no symbol `{other}`"),
    });
    hand.know("envelope start", piece.start.t);
    hand.know("envelope C", amplitude);
    hand.know("envelope rest", rest);
}

fn geometry_is_right(hand: &Hand) {
    let offset = hand.value("anchor") - hand.value("attachment start");
    let length = hand.get("line.length").expect("a length");
    for table in hand.tables.iter().filter(|t| t.section.starts_with("Geometry")) {
        for row in &table.rows {
            let what = table.cell(row, "what");
            let value = match what {
                "elevation of the anchor, as stated" => hand.value("anchor"),
                "elevation of the attachment at the start" => hand.value("attachment start"),
                "anchor above the attachment" => offset,
                "distance from the anchor to the attachment, along the fall line" => offset.abs(),
                "line from the anchor to the attachment, as stated"
                | "depth below the anchor when taut: the length of the line" => length,
                "from the anchor down to the attachment when the line comes taut" => {
                    hand.value("anchor") - hand.value("attachment taut")
                }
                "elevation of the attachment when the line comes taut" => hand.value("attachment taut"),
                w if w.starts_with("free fall") => hand.case.free_fall,
                w if w.starts_with("from taut down to the lowest point") => hand.value("arrest_distance"),
                "height of the attachment above the feet" => hand.zero("subject.attachment_above_feet"),
                "underside of the load below the attachment" => hand.zero("subject.underside_below_attachment"),
                "stretch of the harness and shift of the attachment" => hand.zero("subject.stretch_allowance"),
                w if w.starts_with("reserve wanted above") => hand.zero("obstacle.1.reserve"),
                "sum: clear space wanted below the anchor" => hand.value("below the anchor"),
                w if w.starts_with("sum:") => hand.value("below standing"),
                other => panic!("no step `{other}`"),
            };
            hand.expect(what, table.cell(row, "value, SI"), value);
            hand.expect(what, table.cell(row, "in units of the sheet"), value);
        }
    }
}

/// Every event at its time, with the state then.
fn events_are_right(hand: &Hand) {
    let table = hand.table("what the fall does").expect("the events");
    let pieces = &hand.run.pieces;
    let mut order = pieces.iter().skip(1).peekable();
    let case = &hand.case;
    for row in &table.rows {
        let words = table.cell(row, "what happens");
        let deployed = |state: &State| state.y[3];
        let (state, force) = match words.split([',', ' ']).next().expect("a word") {
            "falls" | "let" => {
                let start = State { t: 0.0, y: [-case.free_fall, 0.0, 0.0, 0.0, 0.0] };
                (start, 0.0)
            }
            "taut"
                if table.cell(row, "travel past taut") == "0 m"
                    && table.cell(row, "deployed") == "0 m"
                    && numbers(table.cell(row, "time"))[0].parse::<f64>().unwrap() < pieces[0].end.t =>
            {
                (pieces[0].start, case.force(Mode::Taut, &pieces[0].start.y))
            }
            "taut" | "slack" => {
                let piece = order
                    .find(|p| p.mode == if words.starts_with("taut") { Mode::Taut } else { Mode::Slack })
                    .expect("a mode");
                (piece.start, case.force(piece.mode, &piece.start.y))
            }
            "absorber" if words.contains("starts") => {
                let piece = order.find(|p| p.mode == Mode::Deploying).expect("a deployment");
                (piece.start, case.absorber.expect("an absorber").1)
            }
            "absorber" => {
                let piece = order.find(|p| p.mode == Mode::Taut).expect("taut");
                (piece.start, case.force(Mode::Taut, &piece.start.y))
            }
            "largest" => {
                let at = state_at(hand, hand.run.peak.1);
                (at, hand.run.peak.0)
            }
            "lowest" => {
                let low = hand.run.lowest.expect("a lowest point");
                (low, force_at(hand, &low))
            }
            "highest" => {
                let high = hand.run.highest.expect("a highest point");
                (high, force_at(hand, &high))
            }
            "settled" => {
                let last = pieces.last().expect("a mode");
                (last.end, case.force(last.mode, &last.end.y))
            }
            other => panic!("no event `{other}`"),
        };
        for (head, value) in [
            ("time", state.t),
            ("travel past taut", state.y[0]),
            ("speed", state.y[1]),
            ("line force", force),
            ("deployed", deployed(&state)),
        ] {
            hand.expect(words, table.cell(row, head), value);
        }
        let shown = [state.y[0], state.y[1], force / 1000.0, state.y[3], case.free_fall];
        for printed in numbers(words) {
            assert!(shown.iter().any(|v| is_printed(&printed, v.abs())), "{}: `{printed}` in `{words}`", hand.file);
        }
    }
}

fn force_at(hand: &Hand, state: &State) -> f64 {
    let inside = |p: &&hand_support::motion::Piece| p.start.t <= state.t + 1e-9 && state.t <= p.end.t + 1e-9;
    let piece = hand.run.pieces.iter().rfind(inside).expect("a mode");
    hand.case.force(piece.mode, &state.y)
}

/// The state at a time, from the start of its mode in one thousand small steps of the closed form.
fn state_at(hand: &Hand, t: f64) -> State {
    let piece = hand.run.pieces.iter().find(|p| p.start.t <= t + 1e-12 && t <= p.end.t + 1e-12).expect("a mode");
    if (t - piece.start.t).abs() < 1e-9 {
        return piece.start;
    }
    if (t - piece.end.t).abs() < 1e-9 {
        return piece.end;
    }
    assert_eq!(piece.mode, Mode::Taut, "only taut modes are worked in between");
    let (m, k) = (hand.case.mass, hand.case.stiffness);
    let (alpha, split) = (hand.value("α"), hand.value("ω"));
    let rest = piece.start.y[3] + m * hand.case.gravity / k;
    let (a, tau) = (piece.start.y[0] - rest, t - piece.start.t);
    let b = (piece.start.y[1] + alpha * a) / split;
    let (e, (sin, cos)) = ((-alpha * tau).exp(), (split * tau).sin_cos());
    let x = rest + e * (a * cos + b * sin);
    let v = e * ((b * split - alpha * a) * cos - (alpha * b + a * split) * sin);
    State { t, y: [x, v, x - piece.start.y[3], piece.start.y[3], 0.0] }
}

fn margins_are_right(hand: &mut Hand) {
    let table = hand.table("checks, the governing one first").expect("the checks").clone();
    let basis = hand.stated["limits.basis"].clone();
    let peak = hand.run.peak.0;
    for row in &table.rows {
        let label = table.cell(row, "check").to_owned();
        let (name, factor) =
            label.rsplit_once(" x ").map_or((label.as_str(), 1.0), |(n, f)| (n, f.parse().expect("a factor")));
        let published = PUBLISHED.iter().find(|p| p.0 == basis && p.1 == name).map(|p| p.2);
        let own = |key: &str| hand.get(&format!("limits.{key}"));
        let input = |path: &str| hand.get(path);
        if name == "anchor load" || name == "line force" {
            let stated = own(if name == "anchor load" { "anchor_factor" } else { "line_factor" });
            assert_eq!(stated.unwrap_or(1.0), factor, "{label}");
        }
        let (demand, limit, at_least) = match name {
            "arrest force" => (peak, own("arrest_force").or(published), false),
            "anchor load" => (factor * peak, input("anchor.capacity"), false),
            "line force" => (factor * peak, input("line.strength"), false),
            "absorber stroke" => (hand.value("deployed_length"), input("absorber.stroke"), false),
            "deceleration distance" => (hand.value("deployed_length"), published, false),
            "total fall distance" => {
                (hand.value("total_fall_distance"), input("line.length").map(|l| 2.0 * l + 1.75), false)
            }
            "anchor strength" => (hand.zero("anchor.capacity"), published, true),
            "line strength" => (hand.zero("line.strength"), published, true),
            "lanyard length" => (hand.zero("line.length"), published, false),
            "free fall, absorber rating" => (hand.case.free_fall, input("absorber.rated_free_fall"), false),
            "mass, absorber rating" => (hand.case.mass, input("absorber.rated_mass"), false),
            "rope elongation, static" => (hand.zero("line.static_elongation.percent"), published, false),
            name if name.starts_with("clearance ") => (hand.value("clearance"), input("obstacle.1.reserve"), true),
            other => panic!("no check `{other}`"),
        };
        let limit = limit.unwrap_or_else(|| panic!("no limit for `{label}`"));
        let room = if at_least { demand - limit } else { limit - demand };
        let rounding = 1e-9 * limit.abs();
        let word = if room >= -rounding { "holds" } else { "short" };
        assert!(table.cell(row, "verdict").ends_with(word), "{label}: {row:?}");
        hand.expect(&label, table.cell(row, "demand"), demand);
        hand.expect(&label, table.cell(row, "limit"), limit);
        hand.expect(&label, table.cell(row, "room"), room);
        for (what, value) in [("demand", demand), ("limit", limit), ("room", room), ("factor", factor)] {
            hand.know(&format!("{label} {what}"), value);
        }
    }
}

fn ledger_is_right(hand: &Hand) {
    let sum = hand.value("line_work") + hand.value("damper_work") + hand.value("absorber_work");
    steps_are_right(hand, "energy account at the lowest point", |symbol| match symbol {
        "E" => hand.value("E"),
        "E_1" => hand.value("line_work"),
        "E_2" => 0.0,
        "E_s" => hand.value("absorber_work"),
        "E_c" => hand.value("damper_work"),
        "Σ" => sum,
        other => panic!("no symbol `{other}`"),
    });
    let table = hand.table("every number with its definition").expect("the numbers");
    for row in &table.rows {
        let id = table.cell(row, "id");
        let stem = id.split('.').next().expect("an id");
        let value = table.cell(row, "value");
        match id {
            "damping_regime" => assert_eq!(value == "underdamped", hand.value("D") < 0.0),
            "energy_residual" => assert_eq!(value, "below 1e-9"),
            "stroke_used_up" => assert_eq!(value, "no"),
            _ => {
                hand.expect(id, value, hand.value(stem));
                hand.expect(id, table.cell(row, "value, SI"), hand.value(stem));
            }
        }
    }
}

/// Numbers put into formulas, and numbers in sentences: each is one of the values worked by hand, or a constant of the
/// formula.
fn no_other_number_is_printed(hand: &Hand) {
    let mut values: Vec<f64> = hand.known.values().chain(hand.inputs.values()).copied().collect();
    values.extend([2.0, 4.0, 1.0]);
    // A long run is drawn up to ten times the time of its lowest point.
    values.extend(hand.run.lowest.map(|low| 10.0 * low.t));
    let is_known =
        |printed: &str| values.iter().any(|v| is_printed(printed, v.abs()) || is_printed(printed, v.abs() / 1000.0));
    for table in hand.tables.iter().filter(|t| t.head.iter().any(|h| h == "with numbers, SI")) {
        for row in &table.rows {
            let cell = table.cell(row, "with numbers, SI");
            for printed in numbers(cell) {
                assert!(is_known(&printed), "{}: `{printed}` of `{cell}` ({})", hand.file, table.caption);
            }
        }
    }
    let texts = hand.words.iter().filter(|(section, _)| section == "Figures" || section == "Verdict");
    for (_, words) in texts {
        for printed in numbers(words) {
            assert!(is_known(&printed), "{}: `{printed}` of `{words}`", hand.file);
        }
    }
}

/// All tables are looked at by one of the checks above.
fn no_table_is_left_out(hand: &Hand) {
    for table in &hand.tables {
        let without_numbers = [
            "what this sheet is about",
            "inputs that the file does not state",
            "where each limit comes from",
            "reproduction",
        ];
        let checked = [
            "inputs",
            "the fall until taut, and the constants of the path",
            "characteristic equation",
            "what the fall does",
            "envelope of the oscillation about the hang position",
            "checks, the governing one first",
            "energy account at the lowest point",
            "every number with its definition",
        ];
        let caption = table.caption.as_str();
        let known = without_numbers.contains(&caption)
            || checked.contains(&caption)
            || caption.starts_with("mode ")
            || caption.starts_with("modes in order")
            || table.section.starts_with("Geometry")
            || table.head[0] == "to be filled in by hand";
        assert!(known, "{}: the table `{caption}` is not checked", hand.file);
    }
}

fn by_hand(file: &'static str) {
    let mut hand = Hand::of(file);
    assert!(hand.run.settled.is_some(), "{file}: not settled by hand");
    inputs_are_as_stated(&hand);
    geometry_is_right(&hand);
    steps_are_right(&hand, "the fall until taut, and the constants of the path", |symbol| hand.value(symbol));
    steps_are_right(&hand, "characteristic equation", |symbol| hand.value(symbol));
    modes_are_right(&mut hand);
    envelope_is_right(&mut hand);
    events_are_right(&hand);
    margins_are_right(&mut hand);
    ledger_is_right(&hand);
    no_other_number_is_printed(&hand);
    no_table_is_left_out(&hand);
}

#[test]
fn a_lanyard_with_absorber_that_stops_short_is_right_by_hand() {
    by_hand("low-scaffold-short");
}

#[test]
fn a_rope_by_its_static_elongation_is_right_by_hand() {
    by_hand("low-stretch-rope");
}

#[test]
fn an_overdamped_line_is_right_by_hand() {
    by_hand("overdamped-buffer");
}

//! The arrest mode by mode: constants of the motion, where it turns, how it ends.
use super::path::total;
use super::steps::Steps;
use super::value::{Block, Cell, Column, Kind, Row, Table, column, digits, exact};
use crate::estimate::{Form, Mode, ModeView, Sample, Solved};
use crate::sheet::Report;

/// Most modes that are worked; what comes after them stands in the list of events.
const MOST: usize = 8;

/// Most modes that are listed.
const LISTED: usize = 60;

const LIST: &[Column] = &[
    column("number", "mode", Kind::Number),
    column("word", "the line is", Kind::Name),
    column("time", "from", Kind::Number),
    column("travel", "travel past taut", Kind::Number),
    column("speed", "speed", Kind::Number),
    column("force", "line force", Kind::Number),
    column("deployed", "deployed", Kind::Number),
    column("until", "until", Kind::Words),
];

/// A list of the modes up to the one that holds the lowest point and the one after it, and the working of each; of a law
/// in many pieces only of the first piece of each.
pub fn modes(report: &Report) -> Vec<Block> {
    let all = &report.estimate.solved.modes;
    let lowest = report.estimate.numbers.get("time_lowest").unwrap_or(f64::INFINITY);
    let wanted = all.iter().take_while(|mode| mode.start.time_s <= lowest).count() + 1;
    let count = wanted.min(LISTED).min(all.len());
    let mut blocks = vec![list(&all[..count], all)];
    let begins = |index: usize| index == 0 || all[index - 1].mode != all[index].mode;
    let worked = (0..count).filter(|&index| count <= MOST || begins(index)).take(MOST);
    for index in worked {
        blocks.push(one(&report.estimate.solved, index + 1, &all[index], all.get(index + 1), lowest));
    }
    let left = all.len() - count;
    if left > 0 {
        blocks.push(Block::words(&format!(
            "{left} more mode{} of the same forms until the end of the run: see the events.",
            if left == 1 { " follows" } else { "s follow" }
        )));
    }
    blocks
}

fn list(shown: &[ModeView], all: &[ModeView]) -> Block {
    let row = |(index, mode): (usize, &ModeView)| {
        let Sample { time_s, travel_m, speed_m_per_s, force_n, deployed_m, .. } = mode.start;
        Row::new(vec![
            Cell::words(&(index + 1).to_string()),
            Cell::words(mode.mode.word()),
            Cell::si(time_s, "s"),
            Cell::si(travel_m, "m"),
            Cell::si(speed_m_per_s, "m/s"),
            Cell::si(force_n, "N"),
            Cell::si(deployed_m, "m"),
            Cell::words(why(mode, all.get(index + 1))),
        ])
    };
    Block::Table(Table {
        id: "modes".to_owned(),
        caption: "modes in order of time, each with the state at its start".to_owned(),
        columns: LIST,
        rows: shown.iter().enumerate().map(row).collect(),
    })
}

fn one(solved: &Solved, number: usize, mode: &ModeView, next: Option<&ModeView>, lowest_s: f64) -> Block {
    let mut steps = Steps::default();
    steps.given("t_a", "start of this mode", mode.start.time_s, "s");
    steps.given("x_a", "travel past taut at its start", mode.start.travel_m, "m");
    steps.given("v_a", "downward speed at its start", mode.start.speed_m_per_s, "m/s");
    if solved.absorber.is_some() {
        steps.given("s_a", "deployed length at its start", mode.start.deployed_m, "m");
    }
    steps.given("T_a", "line force just after its start", mode.start.force_n, "N");
    match mode.form {
        Form::Oscillation { .. } => oscillation(&mut steps, solved, mode),
        Form::Constant { acceleration_m_per_s2: a } => constant(&mut steps, solved, mode, a),
        Form::Fourth => {
            let form = ["a power series in τ of the fourth-order motion, one step of it", ""];
            steps.word("x(τ)", "travel, τ = t − t_a", form, "");
        }
        Form::Third { .. } => third(&mut steps, mode),
    }
    let inside = lowest_s >= mode.start.time_s && lowest_s < mode.end.time_s;
    if inside {
        lowest(&mut steps, mode, lowest_s);
    }
    steps.step(
        "τ_b",
        &format!("ends when {}", why(mode, next)),
        ["t_b − t_a", &format!("{} − {}", digits(mode.end.time_s), digits(mode.start.time_s))],
        mode.end.time_s - mode.start.time_s,
        "s",
    );
    steps.given("x_b", "travel past taut at its end", mode.end.travel_m, "m");
    steps.given("v_b", "downward speed at its end", mode.end.speed_m_per_s, "m/s");
    if solved.absorber.is_some() {
        steps.given("s_b", "deployed length at its end", mode.end.deployed_m, "m");
    }
    steps.given("T_b", "line force just before its end", mode.end.force_n, "N");
    let caption = format!("mode {number}: {}", mode.mode.word());
    steps.table(&format!("mode_{number}"), &caption)
}

fn oscillation(steps: &mut Steps, solved: &Solved, mode: &ModeView) {
    let Form::Oscillation { rest_m, decay_per_s: alpha, square_per_s2: square, from_rest_m: a } = mode.form else {
        return;
    };
    let (start, spread) = (&mode.start, square.abs().sqrt());
    let k = total(solved);
    let linear = solved.line.pieces == 1 && solved.other.is_none_or(|o| o.pieces == 1) && mode.mode == Mode::Taut;
    if linear {
        let weight = solved.mass_kg * solved.gravity_m_per_s2;
        let numbers = format!("{} + {} / {}", digits(start.deployed_m), digits(weight), digits(k));
        steps.step("x_r", "travel at rest with this deployed length", ["s_a + W / k", &numbers], rest_m, "m");
    } else {
        steps.given("x_r", "travel at rest on this piece of the law, continued", rest_m, "m");
        steps.given("α", "decay on this piece", alpha, "1/s");
        let what = if square >= 0.0 { "frequency on this piece" } else { "half the distance of its real roots" };
        steps.given(if square >= 0.0 { "ω" } else { "δ" }, what, spread, "1/s");
    }
    let numbers = format!("{} − {}", digits(start.travel_m), digits(rest_m));
    steps.step("A", "first constant: distance from rest", ["x_a − x_r", &numbers], a, "m");
    let slope = start.speed_m_per_s + alpha * a;
    let top = format!("{} + {} × {}", digits(start.speed_m_per_s), digits(alpha), signed(a));
    if spread == 0.0 {
        steps.step("B", "second constant", ["v_a + α A", &top], slope, "m/s");
        let form = format!("{} + e^(−{} τ) ({} + {} τ)", digits(rest_m), digits(alpha), digits(a), digits(slope));
        return steps.word("x(τ)", "travel, τ = t − t_a", ["x_r + e^(−α τ) (A + B τ)", &form], "");
    }
    let b = slope / spread;
    let (w, cos, sin) = if square > 0.0 { ("ω", "cos", "sin") } else { ("δ", "cosh", "sinh") };
    steps.step(
        "B",
        "second constant",
        [&format!("(v_a + α A) / {w}"), &format!("({top}) / {}", digits(spread))],
        b,
        "m",
    );
    let formula = format!("x_r + e^(−α τ) (A {cos} {w}τ + B {sin} {w}τ)");
    let numbers = format!(
        "{0} + e^(−{1} τ) ({2} {cos} {3} τ + {4} {sin} {3} τ)",
        digits(rest_m),
        digits(alpha),
        digits(a),
        digits(spread),
        signed(b)
    );
    steps.word("x(τ)", "travel, τ = t − t_a", [&formula, &numbers], "");
    if square > 0.0 {
        let amplitude = a.hypot(b);
        let numbers = format!("√({}² + {}²)", signed(a), signed(b));
        steps.step("C", "amplitude of the envelope x_r ± C e^(−α τ)", ["√(A² + B²)", &numbers], amplitude, "m");
        let numbers = format!("atan2({}, {})", digits(b), digits(a));
        steps.step("γ", "phase, x = x_r + C e^(−α τ) cos(ωτ − γ)", ["atan2(B, A)", &numbers], b.atan2(a), "rad");
    }
}

/// Third order: its roots, and the travel with its constants where the roots are apart.
fn third(steps: &mut Steps, mode: &ModeView) {
    let Form::Third { rest_m, real_per_s, decay_per_s, square_per_s2, coefficients } = mode.form else { return };
    let spread = square_per_s2.abs().sqrt();
    let waves = square_per_s2 > 0.0;
    let (w, cos, sin) = if waves { ("ω", "cos", "sin") } else { ("δ", "cosh", "sinh") };
    steps.given("x_r", "travel that it tends to", rest_m, "m");
    steps.given("r_1", "real root on this piece", real_per_s, "1/s");
    steps.given("α", "decay of the other roots", decay_per_s, "1/s");
    let what = if waves { "frequency of the other roots" } else { "half the distance of the other roots" };
    steps.given(w, what, spread, "1/s");
    let Some([p, q, r]) = coefficients.filter(|_| spread > 0.0) else {
        let words = "three roots so near to each other that the form with one term each says nothing";
        return steps.word("x(τ)", words, ["", ""], "");
    };
    let b = q / spread;
    let formula = format!("x_r + e^(−α τ) (A {cos} {w}τ + B {sin} {w}τ) + R e^(r_1 τ)");
    let numbers = format!(
        "{0} + e^(−{1} τ) ({2} {cos} {3} τ + {4} {sin} {3} τ) + {5} e^({6} τ)",
        digits(rest_m),
        digits(decay_per_s),
        digits(p),
        digits(spread),
        signed(b),
        signed(r),
        digits(real_per_s)
    );
    steps.word("x(τ)", "travel, τ = t − t_a; A, B, R from x, x′, x″ at its start", [&formula, &numbers], "");
}

/// In brackets where it is negative.
fn signed(value: f64) -> String {
    if value < 0.0 { format!("({})", digits(value)) } else { digits(value) }
}

fn constant(steps: &mut Steps, solved: &Solved, mode: &ModeView, a: f64) {
    let (start, g, m) = (&mode.start, solved.gravity_m_per_s2, solved.mass_kg);
    let (k, c) = (solved.line.stiffness_n_per_m, solved.line.damping_n_s_per_m);
    let slack = mode.mode == Mode::Slack;
    if slack {
        steps.step("a", "acceleration, downward: the line carries nothing", ["g", ""], a, "m/s2");
    } else {
        let force = m * (g - a);
        let numbers = format!("{} − {} / {}", exact(g), digits(force), exact(m));
        steps.step("a", "acceleration, downward, under the deployment force", ["g − F / m", &numbers], a, "m/s2");
    }
    let numbers = format!("{} + {} τ + {} τ² / 2", digits(start.travel_m), signed(start.speed_m_per_s), signed(a));
    steps.word("x(τ)", "travel, τ = t − t_a", ["x_a + v_a τ + a τ² / 2", &numbers], "");
    if c > 0.0 && solved.line.pieces == 1 {
        let target = if slack { 0.0 } else { m * (g - a) / k };
        steps.given("e_a", "stretch of the line at the start", start.line_elongation_m, "m");
        let formula = if slack { "e_a e^(−k_1 τ / c_1)" } else { "F/k_1 + (e_a − F/k_1) e^(−k_1 τ / c_1)" };
        let away = start.line_elongation_m - target;
        let numbers = if slack {
            format!("{} e^(−{} τ)", digits(away), digits(k / c))
        } else {
            format!("{} + {} e^(−{} τ)", digits(target), signed(away), digits(k / c))
        };
        steps.word("e(τ)", "stretch of the line, which relaxes", [formula, &numbers], "");
    }
    if !slack {
        let formula = if solved.other.is_some() { "x − e_1 − e_2" } else { "x − e" };
        steps.word("s(τ)", "deployed length", [formula, ""], "");
    }
}

fn lowest(steps: &mut Steps, mode: &ModeView, lowest_s: f64) {
    let tau = lowest_s - mode.start.time_s;
    let v = mode.start.speed_m_per_s;
    match mode.form {
        Form::Oscillation { decay_per_s: alpha, square_per_s2: square, from_rest_m: a, .. } if square > 0.0 => {
            let w = square.sqrt();
            let b = (v + alpha * a) / w;
            let numbers = format!(
                "atan2({}, {} × {} + {} × {}) / {}",
                digits(v),
                digits(alpha),
                signed(b),
                digits(w),
                signed(a),
                digits(w)
            );
            steps.step("τ_low", "lowest point: x′ = 0", ["atan2(v_a, α B + ω A) / ω", &numbers], tau, "s");
        }
        Form::Constant { acceleration_m_per_s2: a } => {
            let numbers = format!("−{} / {}", digits(v), signed(a));
            steps.step("τ_low", "lowest point: x′ = 0", ["−v_a / a", &numbers], tau, "s");
        }
        _ => steps.given("τ_low", "lowest point: x′ = 0", tau, "s"),
    }
}

fn why(mode: &ModeView, next: Option<&ModeView>) -> &'static str {
    match (mode.mode, next.map(|n| n.mode)) {
        (_, None) => "the run ends",
        (Mode::Taut, Some(Mode::Deploying)) => "the line force reaches the force at which the absorber moves",
        (_, Some(Mode::Slack)) => "the line force comes down to zero",
        (Mode::Slack, Some(_)) => "travel equals stretch and deployed length again",
        (Mode::Deploying, Some(Mode::Taut)) => "the absorber stops: s′ = 0 or its stroke is used up",
        _ => "a piece of the force law ends",
    }
}

//! From the inputs to the constants of the path: stiffness, damping, roots.
use super::steps::Steps;
use super::value::{Block, digits, exact};
use crate::estimate::{CubicView, PartView, Solved};
use crate::quantity::{Dimension, Measure};
use crate::scenario::{AnchorKind, DampingLaw, Scenario, StretchLaw};

/// Weight, fall and the parts of the path.
pub fn constants(scenario: &Scenario, solved: &Solved) -> Block {
    let mut steps = Steps::default();
    fall(&mut steps, solved);
    line(&mut steps, scenario, solved);
    damping(&mut steps, scenario, solved);
    other(&mut steps, scenario, solved);
    absorber(&mut steps, scenario, solved);
    steps.table("constants", "the fall until taut, and the constants of the path")
}

fn fall(steps: &mut Steps, solved: &Solved) {
    let (m, g, h) = (solved.mass_kg, solved.gravity_m_per_s2, solved.free_fall_m);
    let (m_, g_, h_) = (exact(m), exact(g), digits(h));
    let v0 = (2.0 * g * h).sqrt();
    steps.step("W", "weight of the subject", ["m g", &format!("{m_} × {g_}")], m * g, "N");
    steps.given("h", "free fall, from the geometry", h, "m");
    steps.step("E_0", "energy of the free fall", ["W h", &format!("{} × {h_}", digits(m * g))], m * g * h, "J");
    steps.step("v_0", "speed when the line comes taut", ["√(2 g h)", &format!("√(2 × {g_} × {h_})")], v0, "m/s");
    steps.step("t_0", "time when the line comes taut", ["v_0 / g", &format!("{} / {g_}", digits(v0))], v0 / g, "s");
}

fn line(steps: &mut Steps, scenario: &Scenario, solved: &Solved) {
    let g = solved.gravity_m_per_s2;
    let k1 = solved.line.stiffness_n_per_m;
    let force = |m: &Measure| if m.dimension() == Dimension::Mass { m.si() * g } else { m.si() };
    let modulus = match &scenario.line.stretch {
        StretchLaw::Stiffness(_) => return steps.step("k_1", "stiffness of the line, as stated", ["", ""], k1, "N/m"),
        StretchLaw::Curve(rows) => {
            let (x, f) = rows.get(1).copied().unwrap_or_default();
            let numbers = format!("{} / {}", exact(f), exact(x));
            return steps.step(
                "k_1",
                "stiffness of the first piece of the line's table",
                ["f / e", &numbers],
                k1,
                "N/m",
            );
        }
        StretchLaw::Modulus(modulus) => {
            steps.given("K", "force per unit strain of the line, as stated", modulus.si(), "N");
            modulus.si()
        }
        StretchLaw::RatedImpact { force: rated, mass, fall_factor } => {
            let (w, f, ratio) = (mass.si() * g, rated.si(), fall_factor.si());
            steps.step(
                "W_r",
                "weight of the rated drop",
                ["m_r g", &format!("{} × {}", exact(mass.si()), exact(g))],
                w,
                "N",
            );
            let modulus = f * (f - 2.0 * w) / (2.0 * w * ratio);
            let numbers = format!("{0} ({0} − 2 × {1}) / (2 × {1} × {2})", exact(f), digits(w), exact(ratio));
            let what = "force per unit strain, from the rated drop of an undamped line";
            steps.step("K", what, ["F_r (F_r − 2 W_r) / (2 W_r f_r)", &numbers], modulus, "N");
            modulus
        }
        StretchLaw::StaticElongation { percent, from, to } => {
            let modulus = (force(to) - force(from)) / percent.si();
            let numbers = format!("({} − {}) / {}", digits(force(to)), digits(force(from)), exact(percent.si()));
            steps.step(
                "K",
                "force per unit strain, from the static elongation",
                ["(F_b − F_a) / p", &numbers],
                modulus,
                "N",
            );
            modulus
        }
    };
    let length = solved.elastic_length_m.unwrap_or(f64::NAN);
    let numbers = format!("{} / {}", digits(modulus), digits(length));
    steps.step("k_1", "stiffness of the line: over its whole length", ["K / L", &numbers], k1, "N/m");
}

fn damping(steps: &mut Steps, scenario: &Scenario, solved: &Solved) {
    let (c1, k1) = (solved.line.damping_n_s_per_m, solved.line.stiffness_n_per_m);
    match &scenario.line.damping {
        DampingLaw::None => steps.given("c_1", "damping of the line: none", c1, "N s/m"),
        DampingLaw::Damping(_) => steps.given("c_1", "damping of the line, as stated", c1, "N s/m"),
        DampingLaw::Ratio(ratio) => {
            let numbers = format!("2 × {} × √({} × {})", exact(ratio.si()), exact(solved.mass_kg), digits(k1));
            steps.step("c_1", "damping of the line, from its ratio", ["2 ζ_1 √(m k_1)", &numbers], c1, "N s/m");
        }
    }
}

/// Everything beside the line: symbols, stiffness and damping of its parts.
fn parts(scenario: &Scenario) -> Vec<(&'static str, &'static str, f64, f64)> {
    let damping = |c: Option<Measure>| c.map_or(0.0, |c| c.si());
    let mut list = Vec::new();
    list.extend(scenario.line.series_stiffness.map(|k| ("k_s", "spring in series of the line", k.si(), 0.0)));
    list.extend(scenario.harness.as_ref().map(|h| ("k_h", "harness and body", h.stiffness.si(), damping(h.damping))));
    if let AnchorKind::Sprung(anchor) = &scenario.anchor.kind {
        list.push(("k_a", "anchor", anchor.stiffness.si(), damping(anchor.damping)));
    }
    list
}

fn other(steps: &mut Steps, scenario: &Scenario, solved: &Solved) {
    let Some(other) = &solved.other else { return };
    let list = parts(scenario);
    for (symbol, what, k, c) in &list {
        steps.given(symbol, &format!("stiffness: {what}, as stated"), *k, "N/m");
        if *c > 0.0 {
            steps.given(&symbol.replace('k', "c"), &format!("damping: {what}, as stated"), *c, "N s/m");
        }
    }
    let (k2, c2) = (other.stiffness_n_per_m, other.damping_n_s_per_m);
    if matches!(scenario.anchor.kind, AnchorKind::Span(_)) {
        let what = format!("stiffness beside the line, first of {} straight pieces with the lifeline", other.pieces);
        steps.given("k_2", &what, k2, "N/m");
    } else {
        let inverse = list.iter().map(|p| format!("1/{}", exact(p.2))).collect::<Vec<_>>().join(" + ");
        steps.step(
            "k_2",
            "stiffness beside the line, in series",
            ["1 / Σ(1/k_i)", &format!("1 / ({inverse})")],
            k2,
            "N/m",
        );
    }
    if c2 > 0.0 {
        let formula = if list.len() > 1 { "k_2² Σ(c_i / k_i²)" } else { "" };
        steps.step("c_2", "damping beside the line", [formula, ""], c2, "N s/m");
    }
    let (k1, k) = (solved.line.stiffness_n_per_m, total(solved));
    let numbers = format!("1 / (1/{} + 1/{})", digits(k1), digits(k2));
    steps.step("k", "stiffness of the whole path", ["1 / (1/k_1 + 1/k_2)", &numbers], k, "N/m");
}

/// Stiffness of the whole path on the first piece of each law, N/m.
pub fn total(solved: &Solved) -> f64 {
    let k1 = solved.line.stiffness_n_per_m;
    solved.other.map_or(k1, |other| 1.0 / (1.0 / k1 + 1.0 / other.stiffness_n_per_m))
}

fn absorber(steps: &mut Steps, scenario: &Scenario, solved: &Solved) {
    let (Some(slider), Some(stated)) = (&solved.absorber, &scenario.absorber) else { return };
    let factor = stated.force_factor();
    let [_, first, _] = stated.first_force_n();
    let onset = stated.onset_force.map_or(first, |f| f.si());
    let [force_numbers, onset_numbers] = [first, onset].map(|f| format!("{} × {}", exact(factor), exact(f)));
    let what =
        if slider.is_constant { "deployment force" } else { "deployment force at length 0, rising by the table" };
    steps.step(
        "F",
        &format!("{what}, wet and cold factor counted in"),
        ["w F_dry", &force_numbers],
        slider.force_n,
        "N",
    );
    steps.step("F_on", "force at which deployment first starts", ["w F_on,dry", &onset_numbers], slider.onset_n, "N");
    steps.given("S", "stroke", slider.stroke_m, "m");
}

/// The characteristic equation, its roots and the regime; none where they change from piece to piece.
pub fn roots(solved: &Solved) -> Vec<Block> {
    let is_linear = solved.line.pieces == 1 && solved.other.is_none_or(|other| other.pieces == 1);
    if !is_linear {
        return vec![Block::words(
            "A law of this path is a table of straight pieces: the characteristic equation changes from piece to piece, \
             and its decay and frequency stand with each mode below.",
        )];
    }
    match (&solved.cubic, &solved.other) {
        (Some(cubic), Some(other)) => third(solved, other, cubic),
        _ => second(solved),
    }
}

fn second(solved: &Solved) -> Vec<Block> {
    let (m, c, k) = (solved.mass_kg, solved.line.damping_n_s_per_m, total(solved));
    let (m_, c_, k_) = (exact(m), digits(c), digits(k));
    let alpha = c / (2.0 * m);
    let natural = (k / m).sqrt();
    let square = k / m - alpha * alpha;
    let ratio = alpha / natural;
    let regime = regime(ratio);
    let mut steps = Steps::default();
    let numbers = format!("{c_}² − 4 × {m_} × {k_}");
    steps.step("D", "discriminant of m r² + c r + k = 0", ["c² − 4 m k", &numbers], c * c - 4.0 * m * k, "N2 s2/m2");
    steps.word("", "regime", ["D < 0 underdamped, = 0 critical, > 0 overdamped", ""], regime);
    steps.step("α", "decay", ["c / (2 m)", &format!("{c_} / (2 × {m_})")], alpha, "1/s");
    steps.step("ω_0", "undamped frequency", ["√(k / m)", &format!("√({k_} / {m_})")], natural, "rad/s");
    let ratio_numbers = format!("{} / {}", digits(alpha), digits(natural));
    steps.step("ζ", "damping ratio", ["α / ω_0", &ratio_numbers], ratio, "1");
    let spread = square.abs().sqrt();
    let root_numbers = format!("√({}² − {}²)", digits(natural), digits(alpha));
    if regime == "underdamped" {
        steps.step("ω", "damped frequency", ["√(ω_0² − α²)", &root_numbers], spread, "rad/s");
        let words = format!("−{} ± {} i 1/s", digits(alpha), digits(spread));
        steps.word("r_1,2", "characteristic roots", ["−α ± ω i", ""], &words);
    } else {
        let numbers = format!("√({}² − {}²)", digits(alpha), digits(natural));
        steps.step("δ", "half the distance of the roots", ["√(α² − ω_0²)", &numbers], spread, "1/s");
        let words = format!("−{} 1/s and −{} 1/s", digits(k / m / (alpha + spread)), digits(alpha + spread));
        steps.word("r_1,2", "characteristic roots", ["−α ± δ", ""], &words);
    }
    steps.step(
        "x_e",
        "stretch under the weight alone",
        ["W / k", &format!("{} / {k_}", digits(m * solved.gravity_m_per_s2))],
        m * solved.gravity_m_per_s2 / k,
        "m",
    );
    vec![
        Block::words(
            "Taut, the path obeys m x″ + c x′ + k (x − s) = m g with the travel x past taut and the deployed length s.",
        ),
        steps.table("roots", "characteristic equation"),
    ]
}

fn third(solved: &Solved, other: &PartView, cubic: &CubicView) -> Vec<Block> {
    let (m, c1, k1) = (solved.mass_kg, solved.line.damping_n_s_per_m, solved.line.stiffness_n_per_m);
    let (c2, k2) = (other.damping_n_s_per_m, other.stiffness_n_per_m);
    let [m_, c1_, k1_, c2_, k2_] = [m, c1, k1, c2, k2].map(digits);
    let sum = digits(c1 + c2);
    let [b2, b1, b0] = cubic.coefficients;
    let mut steps = Steps::default();
    let numbers = format!("({k1_} + {k2_}) / {sum} + {c1_} × {c2_} / ({m_} × {sum})");
    steps.step(
        "b_2",
        "of r³ + b_2 r² + b_1 r + b_0 = 0",
        ["(k_1 + k_2)/C + c_1 c_2/(m C), C = c_1 + c_2", &numbers],
        b2,
        "1/s",
    );
    let numbers = format!("({k1_} × {c2_} + {k2_} × {c1_}) / ({m_} × {sum})");
    steps.step("b_1", "", ["(k_1 c_2 + k_2 c_1)/(m C)", &numbers], b1, "1/s2");
    steps.step("b_0", "", ["k_1 k_2/(m C)", &format!("{k1_} × {k2_} / ({m_} × {sum})")], b0, "1/s3");
    steps.given("r_1", "real root", cubic.real_per_s, "1/s");
    let (alpha, spread) = (cubic.decay_per_s, cubic.square_per_s2.abs().sqrt());
    if cubic.square_per_s2 > 0.0 {
        steps.word("r_2,3", "other roots", ["−α ± ω i", ""], &format!("−{} ± {} i 1/s", digits(alpha), digits(spread)));
        steps.word("", "regime", ["a pair of complex roots: underdamped", ""], "underdamped");
    } else {
        let words = format!("−{} 1/s and −{} 1/s", digits(alpha - spread), digits(alpha + spread));
        steps.word("r_2,3", "other roots", ["−α ± δ", ""], &words);
        steps.word("", "regime", ["all roots real: overdamped", ""], "overdamped");
    }
    vec![
        Block::words(
            "Taut, the two parts share one force, m g − m x″ = k_1 e_1 + c_1 e_1′ = k_2 e_2 + c_2 e_2′ with x = e_1 + e_2 + s: \
             a third-order equation.",
        ),
        steps.table("roots", "characteristic equation"),
    ]
}

/// The regime of a damping ratio, critical within 1e-9.
fn regime(ratio: f64) -> &'static str {
    if (ratio - 1.0).abs() <= 1e-9 {
        "critical"
    } else if ratio > 1.0 {
        "overdamped"
    } else {
        "underdamped"
    }
}

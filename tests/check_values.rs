//! Values from outside the project, to the digits printed there, each with its source and mark:
//! [P] published and seen, [S] seen in a secondary page, [M] from memory and confirmed by calculation,
//! [D] calculated independently from the stated equations.
#![allow(clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]
mod support;

use support::printed::assert_printed;
use support::{Case, Part, Slider};
use underfoot::arrest::{ArrestError, Happening, Outcome, Settings, solve};

const POUND: f64 = 0.453_592_37;
const FOOT: f64 = 0.3048;
const INCH: f64 = 0.0254;
const POUND_FORCE: f64 = 4.448_221_615_260_5;

fn arrest(case: &Case) -> Outcome {
    solve(&case.fall(), &Settings::default()).expect("a solved arrest")
}

fn lowest(outcome: &Outcome) -> (f64, f64) {
    let low = outcome.lowest.expect("a lowest point");
    (low.time_s - outcome.time_taut_s, low.travel_m)
}

/// From taut, s.
fn first_slack(outcome: &Outcome) -> f64 {
    outcome.time_first_slack_s.expect("a slack line") - outcome.time_taut_s
}

/// From taut, s.
fn first(outcome: &Outcome, what: Happening) -> f64 {
    let found = outcome.happenings.iter().find(|happening| happening.1 == what);
    found.expect("such a happening").0 - outcome.time_taut_s
}

/// An impact without gravity in units of `1/w0`, `v0/w0` and `m w0 v0`.
fn unit_impact(ratio: f64) -> Outcome {
    arrest(&Case::on(1.0, 0.0, Part::damped(1.0, 2.0 * ratio)).thrown(0.0, 1.0))
}

fn rope(mass: f64, fall_factor: f64, modulus: f64) -> Case {
    let length = 2.6;
    Case::on(mass, fall_factor * length, Part::spring(modulus / length))
}

// EN 892 / UIAA 101 test fall [S]; moduli [D].
#[test]
fn the_standard_rope_fall_gives_back_the_force_its_modulus_was_solved_for() {
    for (printed, force) in [("24.091", 9e3), ("45.090", 12e3), ("18.533", 8e3)] {
        let factor = 4.6 / 2.6;
        let weight = 80.0 * 9.80665;
        let modulus = force * (force - 2.0 * weight) / (2.0 * weight * factor);
        assert_printed(printed, modulus / 1e3);
        let outcome = arrest(&rope(80.0, factor, modulus));
        assert!((outcome.peak_force_n / force - 1.0).abs() < 1e-12);
        assert_printed("9.5", outcome.speed_at_taut_m_per_s);
        if printed == "45.090" {
            assert_printed("26.6", outcome.line_elongation_peak_m / 2.6 * 100.0);
        }
    }
}

fn guided_mass() -> Case {
    Case::on(17.0, 0.0, Part::damped(715.0, 100.0)).thrown(9.81, 13.0)
}

// Univ. of Oklahoma eCourses, Dynamics 10.2 [P]; peaks [D].
#[test]
fn a_guided_mass_on_spring_and_damper_peaks_as_calculated() {
    let outcome = arrest(&guided_mass());
    assert_printed("0.2091935742", lowest(&outcome).0);
    assert_printed("1.265641806", lowest(&outcome).1);
    assert_printed("1358.555884", outcome.peak_force_n);
    assert_printed("0.04631918215", outcome.time_peak_force_s);
    assert_printed("0.233", outcome.hang_travel_m);
}

// Univ. of Oklahoma eCourses, Dynamics 10.2 [P]: x = 0.233 + exp(-2.94 t) (2.13 sin 5.78 t - 0.233 cos 5.78 t).
#[test]
fn a_guided_mass_follows_the_published_formula() {
    let outcome = arrest(&guided_mass());
    for step in 0..40_u32 {
        let t = f64::from(step) * 0.01;
        let published = 0.233 + (-2.94 * t).exp() * (2.13 * (5.78 * t).sin() - 0.233 * (5.78 * t).cos());
        let off = outcome.motion.at(t).travel_m - published;
        assert!(off.abs() < 0.004, "off by {off} at {t}");
    }
}

// Gere, problem 2.8-1 [P].
#[test]
fn a_weight_falling_on_an_elastic_rod_strains_it_as_published() {
    let weight = 150.0 * POUND_FORCE;
    let pressure = POUND_FORCE / (INCH * INCH);
    let stiffness = 30e6 * pressure * 0.75 * INCH * INCH / (48.0 * INCH);
    let mut case = Case::on(150.0 * POUND, 2.0 * INCH, Part::spring(stiffness));
    case.gravity = weight / case.mass;
    let outcome = arrest(&case);
    assert_printed("0.0361", outcome.arrest_distance_m / INCH);
    assert_printed("226", outcome.peak_force_n / (0.75 * INCH * INCH) / pressure / 100.0);
    assert_printed("113", outcome.arrest_distance_m / outcome.hang_travel_m);
}

// Gere, second case of problem 2.8 [P].
#[test]
fn a_collar_falling_on_a_steel_bar_strains_it_as_published() {
    let area = std::f64::consts::PI * 0.0125 * 0.0125;
    let case = Case { gravity: 9.81, ..Case::on(10.0, 0.3, Part::spring(200e9 * area / 2.6)) };
    let outcome = arrest(&case);
    assert_printed("96.24", outcome.peak_force_n / area / 1e6);
    assert_printed("1.25", outcome.arrest_distance_m * 1e3);
}

// A person on an elastic cord, g 9.8 [P]: 61 kg on 25 m of 160 N/m, 53 kg on 13 m stopped at 35 m; last digits [D].
#[test]
fn a_person_on_an_elastic_cord_stops_where_published() {
    let outcome = arrest(&Case { gravity: 9.8, ..Case::on(61.0, 25.0, Part::spring(160.0)) });
    assert_printed("42.9", 25.0 + outcome.arrest_distance_m);
    assert_printed("42.9056559", 25.0 + outcome.arrest_distance_m);
    let stiffness = 2.0 * 53.0 * 9.8 * 35.0 / (22.0 * 22.0);
    assert_printed("75.1", stiffness);
    let outcome = arrest(&Case { gravity: 9.8, ..Case::on(53.0, 13.0, Part::spring(stiffness)) });
    assert_printed("35.0000000", 13.0 + outcome.arrest_distance_m);
}

/// Peak force times stroke of the impact without gravity.
fn impact_product(ratio: f64) -> f64 {
    let outcome = unit_impact(ratio);
    outcome.peak_force_n * outcome.arrest_distance_m
}

/// Fourth-order central difference.
fn slope(f: impl Fn(f64) -> f64, x: f64, step: f64) -> f64 {
    (8.0 * (f(x + step) - f(x - step)) - (f(x + 2.0 * step) - f(x - 2.0 * step))) / (12.0 * step)
}

// Peters, SIAM Review 39(1):118-122, 1997 [P].
#[test]
fn the_best_damper_for_an_impact_is_the_published_one() {
    let (mut low, mut high) = (0.35, 0.45);
    for _ in 0..60 {
        let middle = 0.5 * (low + high);
        if slope(impact_product, middle, 1e-3) < 0.0 { low = middle } else { high = middle }
    }
    assert_printed("0.4039727533", low);
    assert_printed("0.520598617699", impact_product(low));
}

/// Time at which the travel first passes a share of the hang travel, in units of `1/w0`.
fn passes(outcome: &Outcome, share: f64) -> f64 {
    let (mut low, mut high) = (0.0, outcome.lowest.map_or(20.0, |low| low.time_s));
    for _ in 0..80 {
        let middle = 0.5 * (low + high);
        if outcome.motion.at(middle).travel_m < share * outcome.hang_travel_m { low = middle } else { high = middle }
    }
    low
}

// Nise, table of second-order step responses [P]: a load hung on a slack-free line is the step.
#[test]
fn a_step_load_rises_from_a_tenth_to_nine_tenths_as_tabled() {
    let table = ["1.104", "1.203", "1.321", "1.463", "1.638", "1.854", "2.126", "2.467", "2.883"];
    for (tenths, printed) in (1_u32..).zip(table) {
        let ratio = f64::from(tenths) / 10.0;
        let outcome = arrest(&Case { gravity: 1.0, ..Case::on(1.0, 0.0, Part::damped(1.0, 2.0 * ratio)) });
        assert_printed(printed, passes(&outcome, 0.9) - passes(&outcome, 0.1));
    }
}

fn rigid_with_absorber(mass: f64, free_fall: f64, force: f64, stroke: f64) -> Outcome {
    arrest(&Case::on(mass, free_fall, Part::rigid()).with_slider(Slider::constant(force, force, stroke)))
}

// EN 355 test fall [P].
#[test]
fn an_absorber_in_the_standard_test_fall_extends_as_published() {
    let outcome = rigid_with_absorber(100.0, 4.0, 6e3, 1.75);
    assert_printed("0.7815", outcome.deployed_m);
    let weight = 100.0 * 9.80665;
    assert_printed("3922.66", weight * 4.0);
    let account = outcome.energy.absorber_j - weight * outcome.arrest_distance_m;
    assert_printed("3922.66", account);
    let least = weight * (4.0 + 1.75) / 1.75;
    assert_printed("3222.2", least);
    let outcome = rigid_with_absorber(100.0, 4.0, least, 2.0);
    assert_printed("1.750000000", outcome.deployed_m);
    let short = Case::on(100.0, 4.0, Part::rigid()).with_slider(Slider::constant(6e3, 6e3, 0.7815));
    let refused = solve(&short.fall(), &Settings::default());
    assert!(matches!(refused, Err(ArrestError::Rigid { .. })), "nothing gives way once the stroke is used up");
}

// 128 kg (282 lb) test of an absorber [P].
#[test]
fn an_absorber_at_nine_hundred_pounds_extends_below_its_limit() {
    let outcome = rigid_with_absorber(282.0 * POUND, 6.0 * FOOT, 900.0 * POUND_FORCE, 48.0 * INCH);
    assert_printed("32.85", outcome.deployed_m / INCH);
    assert!(!outcome.stroke_used_up);
}

// 29 CFR limits together [P]: 6 ft of free fall stopped in 3.5 ft.
#[test]
fn free_fall_and_deceleration_limits_together_ask_for_the_published_force() {
    let mass = 310.0 * POUND;
    let factor = 1.0 + 6.0 / 3.5;
    assert_printed("2.7143", factor);
    let outcome = rigid_with_absorber(mass, 6.0 * FOOT, factor * mass * 9.80665, 5.0 * FOOT);
    assert_printed("3.500000000", outcome.arrest_distance_m / FOOT);
    assert_printed("841.4", outcome.peak_force_n / POUND_FORCE);
}

// F = W + sqrt(W^2 + 2 W K f) [D].
#[test]
fn an_undamped_line_gives_the_force_of_the_textbook_formula() {
    let light = ["4.8226170", "6.4411008", "7.6901392", "8.7455653", "10.518972"];
    let heavy = ["7.3200896", "9.8921690", "11.872933", "13.545222", "16.353410"];
    for (mass, factor, row) in [(80.0, 1.0, light), (100.0, 2.0, heavy)] {
        for (modulus, printed) in [10e3, 20e3, 30e3, 40e3, 60e3].into_iter().zip(row) {
            assert_printed(printed, arrest(&rope(mass, factor, modulus)).peak_force_n / 1e3);
        }
    }
}

// Damped impact without gravity [D].
#[test]
fn a_damped_impact_without_gravity_peaks_as_calculated() {
    for (ratio, time, travel, force) in [
        (0.05, "1.522680011", "0.926692021", "0.9313448608"),
        (0.2, "1.397677220", "0.7561349268", "0.8209185218"),
        (0.4, "1.264877612", "0.6029318873", "0.8635100928"),
        (0.7, "1.113781141", "0.4585679496", "1.4000000000"),
        (1.0, "1.000000000", "0.3678794412", "2.0000000000"),
        (2.0, "0.7603459963", "0.2185605923", "4.0000000000"),
    ] {
        let outcome = unit_impact(ratio);
        assert_printed(time, lowest(&outcome).0);
        assert_printed(travel, lowest(&outcome).1);
        assert_printed(force, outcome.peak_force_n);
        assert_eq!(outcome.time_peak_force_s == 0.0, ratio >= 0.5, "ratio {ratio}");
    }
}

// Kelvin-Voigt line, 100 kg, 10 kN/m, 4 m [D].
#[test]
fn a_lightly_damped_line_peaks_and_lets_go_as_calculated() {
    let outcome = arrest(&Case::on(100.0, 4.0, Part::damped(1e4, 200.0)));
    assert_printed("0.1589534809", lowest(&outcome).0);
    assert_printed("0.8498893152", lowest(&outcome).1);
    assert_printed("8651.802438", outcome.peak_force_n);
    assert_printed("0.1388190717", outcome.time_peak_force_s - outcome.time_taut_s);
    assert_printed("0.3221740918", first_slack(&outcome));
}

// Same, ratio 0.6 [D].
#[test]
fn a_strongly_damped_line_peaks_at_contact_and_never_lets_go() {
    let outcome = arrest(&Case::on(100.0, 4.0, Part::damped(1e4, 1200.0)));
    assert_printed("0.1277360697", lowest(&outcome).0);
    assert_printed("0.4840311651", lowest(&outcome).1);
    assert_printed("10628.85732", outcome.peak_force_n);
    assert_eq!(outcome.time_peak_force_s, outcome.time_taut_s);
    assert_eq!(outcome.time_first_slack_s, None);
}

// Constant absorber, rigid line [D].
#[test]
fn a_constant_absorber_on_a_rigid_line_stops_as_calculated() {
    let outcome = rigid_with_absorber(100.0, 2.0, 4e3, 2.0);
    assert_printed("0.649590059", outcome.deployed_m);
    assert_printed("0.207433565", lowest(&outcome).0);
}

// Elastic line 50 kN/m and absorber 4 kN, 100 kg, 2 m [D].
#[test]
fn an_undamped_line_with_absorber_runs_through_its_events_as_calculated() {
    let case = Case::on(100.0, 2.0, Part::spring(5e4)).with_slider(Slider::constant(4e3, 4e3, 2.0));
    let outcome = arrest(&case);
    assert_printed("0.01282027618", first(&outcome, Happening::DeploymentStart));
    assert_printed("0.2158957983", first(&outcome, Happening::DeploymentEnd));
    assert_printed("0.6225818599", outcome.deployed_m);
    assert_printed("0.7025818599", outcome.arrest_distance_m);
    assert_printed("0.3009375477", first_slack(&outcome));
    let slack = outcome.time_first_slack_s.expect("a slack line");
    assert_printed("1.277081047", -outcome.motion.at(slack).speed_m_per_s);
    let catches = outcome.happenings.iter().filter(|happening| happening.1 == Happening::Taut);
    let second = catches.map(|happening| happening.0).nth(1).expect("a second catch");
    assert_printed("0.2604520497", second - slack);
    assert_printed("0.6421951599", outcome.hang_travel_m);
}

// 140 kg, 4 m, 50 kN/m, 6 kN [D].
#[test]
fn a_heavy_subject_with_absorber_runs_through_its_events_as_calculated() {
    let case = Case::on(140.0, 4.0, Part::spring(5e4)).with_slider(Slider::constant(6e3, 6e3, 2.0));
    let outcome = arrest(&case);
    assert_printed("0.01359534599", first(&outcome, Happening::DeploymentStart));
    assert_printed("1.144671869", outcome.deployed_m);
    assert_printed("1.264671869", outcome.arrest_distance_m);
    assert_printed("0.3758431682", first_slack(&outcome));
}

/// A spring `k_inf` beside a spring `k1` in series with a dashpot `c`, turned into a damped part in series with a
/// spring. Both show `k_inf + k1` at once and `k_inf` at last; equal relaxation at held travel, with rate
/// `k1/c = (k_d + k_s)/c_d`, gives the damper.
fn three_parameter(k_inf: f64, k1: f64, c: f64) -> (Part, Part) {
    let at_once = k_inf + k1;
    let damped = k_inf * at_once / k1;
    (Part::damped(damped, c * (damped + at_once) / k1), Part::spring(at_once))
}

// Three-parameter line, 100 kg, 2 m [D]. The times are those of a 30-digit matrix exponential of the parallel form.
#[test]
fn a_three_parameter_line_peaks_and_lets_go_as_calculated() {
    let (line, other) = three_parameter(1e4, 1e4, 1e3);
    let outcome = arrest(&Case::on(100.0, 2.0, line).with_other(other));
    assert_printed("8035.781068", outcome.peak_force_n);
    assert_printed("0.113706", outcome.time_peak_force_s - outcome.time_taut_s);
    assert_printed("0.1137060216", outcome.time_peak_force_s - outcome.time_taut_s);
    assert_printed("0.5380062058", lowest(&outcome).1);
    assert_printed("0.1337496407", lowest(&outcome).0);
    assert_printed("0.2584601019", first_slack(&outcome));
}

// Schwager and Poeschel 2007, Granular Matter 9:465-469 [M].
#[test]
fn a_damped_contact_let_go_at_no_force_bounces_back_as_published() {
    for (ratio, printed) in [(0.1, "0.7440793977"), (0.3, "0.4509754529"), (1.0, "0.1353352832")] {
        let outcome = unit_impact(ratio);
        let slack = outcome.time_first_slack_s.expect("a contact that lets go");
        assert_printed(printed, -outcome.motion.at(slack).speed_m_per_s);
    }
}

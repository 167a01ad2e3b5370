//! Two inputs across a grid: cells against single runs, lines against closed forms and against both sides of them.
#![expect(clippy::unwrap_used, reason = "a test stops at what it cannot have")]
use std::fs;
use std::ops::{ControlFlow, RangeInclusive};
use underfoot::margin::{CheckKind, Verdict, worst};
use underfoot::scenario::read;
use underfoot::study::{Axis, Edge, Evaluator, Field, Of, StudyError, field, zero_line};

const SHORT: &str = "scenarios/low-scaffold-short.toml";

fn evaluator_of(path: &str) -> Evaluator {
    Evaluator::new(&read(path, &fs::read_to_string(path).unwrap()).unwrap()).unwrap()
}

fn axis(evaluator: &Evaluator, path: &str, range: RangeInclusive<f64>, steps: usize) -> Axis {
    Axis { input: evaluator.index_of(path).unwrap(), range, steps }
}

fn whole(evaluator: &Evaluator, across: Axis, up: Axis) -> Field {
    field(evaluator, across, up, &mut |_| ControlFlow::Continue(())).unwrap()
}

/// A field with holding, short and failed cells.
fn mixed(evaluator: &Evaluator) -> Field {
    let across = axis(evaluator, "line.length", 0.6..=2.4, 25);
    whole(evaluator, across, axis(evaluator, "place.anchor", 3.0..=12.0, 19))
}

fn points(field: &Field) -> Vec<Edge> {
    field.line.iter().flatten().copied().collect()
}

#[test]
fn every_cell_is_the_run_at_its_values() {
    let evaluator = evaluator_of(SHORT);
    let field = mixed(&evaluator);
    assert_eq!((field.cells.len(), field.rows(), field.partial), (25 * 19, 19, false));
    for up in 0..19 {
        for across in 0..25 {
            let values = [(field.across.input, field.across.value(across)), (field.up.input, field.up.value(up))];
            let run = evaluator.at(&values).unwrap();
            let cell = field.cell(across, up).unwrap();
            assert_eq!(cell.verdict(), worst(run.checks.iter().map(|c| c.verdict)));
            assert_eq!(cell.checks, run.checks);
            assert_eq!(cell.failure, run.failure);
        }
    }
    assert!(field.cell(25, 0).is_none() && field.cell(0, 19).is_none());
}

#[test]
fn failed_cells_are_open_and_counted() {
    let evaluator = evaluator_of(SHORT);
    let field = mixed(&evaluator);
    assert!(field.failed() > 0);
    assert!(field.cells.iter().all(|cell| cell.failure.is_none() || cell.verdict() == Verdict::Open));
    let words = [Verdict::Holds, Verdict::Thin, Verdict::Open, Verdict::Short];
    assert_eq!(words.iter().map(|word| field.count(*word)).sum::<usize>(), field.cells.len());
    assert!(field.count(Verdict::Holds) > 0 && field.count(Verdict::Short) > 0);
}

#[test]
fn the_line_of_a_linear_margin_is_the_straight_line_on_any_grid() {
    let evaluator = evaluator_of(SHORT);
    let kind = CheckKind::Clearance(0);
    let typical = *evaluator.typical().check(kind).unwrap();
    let top = evaluator.inputs()[evaluator.index_of("obstacle.1.top").unwrap()].measure.si();
    // The clearance falls by as much as the ground is raised; the reserve is the limit.
    let sum = typical.demand.unwrap() + top;
    for steps in [[2, 2], [5, 3], [40, 31]] {
        let across = axis(&evaluator, "obstacle.1.top", sum - 3.0..=sum, steps[0]);
        let up = axis(&evaluator, "obstacle.1.reserve", 0.1..=2.7, steps[1]);
        let field = whole(&evaluator, across, up);
        let line = zero_line(&evaluator, &field, Of::One(kind)).unwrap();
        assert!(!line.is_empty());
        for point in line.iter().flatten() {
            assert!((point.x + point.y - sum).abs() < 1e-8, "{point:?} is not on {sum}");
            assert!(point.through_zero && point.kind == Some(kind));
        }
    }
}

#[test]
fn a_point_has_no_margin_left_or_lies_at_a_jump() {
    let evaluator = evaluator_of(SHORT);
    let field = mixed(&evaluator);
    let step = field.across.value(1) - field.across.value(0);
    let rise = field.up.value(1) - field.up.value(0);
    let (mut zeros, mut jumps) = (0, 0);
    for point in points(&field) {
        let at = |dx: f64, dy: f64| {
            evaluator.at(&[(field.across.input, point.x + dx), (field.up.input, point.y + dy)]).unwrap()
        };
        let all = |run: underfoot::study::Run| worst(run.checks.iter().map(|c| c.verdict)) == Verdict::Holds;
        if point.through_zero {
            let room = at(0.0, 0.0).check(point.kind.unwrap()).unwrap().relative();
            assert!(room.abs() <= 1e-6, "{point:?} leaves {room}");
            // A margin that is zero all along one side is no crossing: both sides are near.
            let (dx, dy) = (1e-4 * step, 1e-4 * rise);
            let near = [(dx, 0.0), (-dx, 0.0), (0.0, dy), (0.0, -dy)].map(|d| all(at(d.0, d.1)));
            assert!(near.contains(&true) && near.contains(&false), "{point:?} has one side alone: {near:?}");
            zeros += 1;
        } else {
            assert!(all(at(0.0, 0.0)), "{point:?} is not on the side that holds");
            let (dx, dy) = (2e-4 * step, 2e-4 * rise);
            assert!([(dx, 0.0), (-dx, 0.0), (0.0, dy), (0.0, -dy)].iter().any(|d| !all(at(d.0, d.1))), "{point:?}");
            jumps += 1;
        }
    }
    assert!(zeros > 10 && jumps > 0, "{zeros} zeros, {jumps} jumps");
}

#[test]
fn every_edge_of_the_grid_that_parts_the_field_has_one_point() {
    let evaluator = evaluator_of(SHORT);
    let field = mixed(&evaluator);
    let holds = |across: usize, up: usize| field.cell(across, up).unwrap().verdict() == Verdict::Holds;
    // An edge inside the grid borders on two cells, one at its rim on one: a piece ends there once for each.
    let mut ends = 0;
    for up in 0..19 {
        for across in 0..25 {
            if across + 1 < 25 && holds(across, up) != holds(across + 1, up) {
                ends += if up == 0 || up == 18 { 1 } else { 2 };
            }
            if up + 1 < 19 && holds(across, up) != holds(across, up + 1) {
                ends += if across == 0 || across == 24 { 1 } else { 2 };
            }
        }
    }
    assert!(ends > 40);
    assert_eq!(points(&field).len(), ends);
}

#[test]
fn the_field_is_the_same_on_any_number_of_threads() {
    let evaluator = evaluator_of(SHORT);
    let on = |threads: usize| {
        let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
        pool.install(|| mixed(&evaluator))
    };
    let one = on(1);
    assert_eq!(one, on(2));
    assert_eq!(one, on(8));
}

#[test]
fn a_stopped_field_keeps_whole_rows_and_says_that_it_is_partial() {
    let evaluator = evaluator_of(SHORT);
    let (across, up) =
        (axis(&evaluator, "line.length", 1.2..=2.4, 100), axis(&evaluator, "place.anchor", 3.0..=12.0, 40));
    let mut told = Vec::new();
    let mut watch = |done: usize| {
        told.push(done);
        if done > 1000 { ControlFlow::Break(()) } else { ControlFlow::Continue(()) }
    };
    let part = field(&evaluator, across.clone(), up.clone(), &mut watch).unwrap();
    assert!(told.is_sorted() && told.last() == Some(&part.cells.len()));
    assert!(part.partial && part.line.is_empty());
    assert!(part.cells.len() < 4000 && part.cells.len().is_multiple_of(100));
    let all = whole(&evaluator, across, up);
    assert_eq!(part.cells[..], all.cells[..part.cells.len()]);
}

#[test]
fn a_field_that_cannot_be_is_refused() {
    let evaluator = evaluator_of(SHORT);
    let good = axis(&evaluator, "line.length", 1.0..=2.0, 5);
    let wrong = [
        axis(&evaluator, "place.anchor", 5.0..=5.0, 5),
        axis(&evaluator, "place.anchor", 3.0..=f64::NAN, 5),
        axis(&evaluator, "place.anchor", 3.0..=4.0, 1),
        axis(&evaluator, "place.anchor", 3.0..=4.0, 401),
        good.clone(),
    ];
    for bad in wrong {
        let found = field(&evaluator, good.clone(), bad, &mut |_| ControlFlow::Continue(()));
        assert!(matches!(found, Err(StudyError::Axis { .. })));
    }
    let nowhere = Axis { input: 999, range: 0.0..=1.0, steps: 3 };
    let found = field(&evaluator, good, nowhere, &mut |_| ControlFlow::Continue(()));
    assert!(matches!(found, Err(StudyError::NoInput { .. })));
}

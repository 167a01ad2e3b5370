//! The nearest joint change of two inputs at which every check holds.
use super::StudyError;
use super::held::{Held, Judge, Look};
use super::nearest::{DIGITS, HALVINGS, ROUNDS, rounded, way};
use super::remedy::{Pair, Span};
use std::f64::consts::TAU;

/// Directions in which both inputs are changed together, evenly about today's values.
const DIRECTIONS: u32 = 32;
/// Cells along one direction.
const CELLS: u32 = 48;
/// The best direction is refined by halving steps down to this share of a turn.
const LEAST_TURN: f64 = 1e-4;
/// A joint change is told where it is nearer than the best of both alone by this share of it at least, and each input makes
/// at least this share of it.
const NEARER: f64 = 0.01;

/// The search of one pair.
pub(super) struct PairSearch<'a> {
    pub spans: [&'a Span; 2],
    pub judge: Judge<'a>,
    pub held: Held,
    /// The smaller change of both inputs alone; infinite where neither has one.
    pub alone: f64,
}

/// A change along a direction: the turn, and the root of the sum of the squares of both changes.
#[derive(Clone, Copy)]
struct Hit {
    turn: f64,
    size: f64,
}

impl PairSearch<'_> {
    /// The nearest joint change; none where it is no nearer than one input alone, or none was found.
    pub fn pair(mut self) -> Result<Option<Pair>, StudyError> {
        if self.spans.iter().any(|span| span.scale.whole().is_none()) {
            return Ok(None);
        }
        for _ in 0..ROUNDS {
            let Some(hit) = self.nearest()? else { return Ok(None) };
            let Some(pair) = self.rounded(hit)? else { return Ok(None) };
            let values = [(self.spans[0].index, pair.ways[0].value), (self.spans[1].index, pair.ways[1].value)];
            match self.judge.look(&values)? {
                Look::Holds => return Ok(self.is_worth(&pair).then_some(pair)),
                Look::Fails(places) => {
                    if places.iter().filter(|place| self.judge.add(place)).count() == 0 {
                        return Ok(None);
                    }
                }
                Look::Unclear => return Ok(None),
            }
        }
        Ok(None)
    }

    fn is_worth(&self, pair: &Pair) -> bool {
        let moves = |span: &Span, value: f64| span.share(value) > NEARER * pair.relative;
        pair.relative < self.alone * (1.0 - NEARER)
            && moves(self.spans[0], pair.ways[0].value)
            && moves(self.spans[1], pair.ways[1].value)
    }

    /// Both values of a change.
    fn values(&self, hit: Hit) -> [f64; 2] {
        let (sine, cosine) = (hit.turn * TAU).sin_cos();
        let value = |span: &Span, part: f64| span.today() + hit.size * part * span.scale.whole().unwrap_or(0.0);
        [value(self.spans[0], cosine), value(self.spans[1], sine)]
    }

    fn holds(&self, values: [f64; 2]) -> Result<bool, StudyError> {
        let inside = |span: &Span, value: f64| value >= span.range.0 && value <= span.range.1;
        if !(inside(self.spans[0], values[0]) && inside(self.spans[1], values[1])) {
            return Ok(false);
        }
        self.judge.holds(&[(self.spans[0].index, values[0]), (self.spans[1].index, values[1])])
    }

    /// The least change over all directions: an even scan of them, then halving steps about the best.
    fn nearest(&self) -> Result<Option<Hit>, StudyError> {
        let mut best: Option<Hit> = None;
        for i in 0..DIRECTIONS {
            best = self.nearer(f64::from(i) / f64::from(DIRECTIONS), best)?;
        }
        let mut step = 0.5 / f64::from(DIRECTIONS);
        while let Some(hit) = best.filter(|_| step > LEAST_TURN) {
            for turn in [hit.turn - step, hit.turn + step] {
                best = self.nearer(turn, best)?;
            }
            if best.is_some_and(|now| now.turn == hit.turn) {
                step /= 2.0;
            }
        }
        Ok(best)
    }

    /// The first change along a direction that holds, where it is smaller than the best so far.
    fn nearer(&self, turn: f64, best: Option<Hit>) -> Result<Option<Hit>, StudyError> {
        let most = best.map_or(self.alone.min(self.reach(turn)), |best| best.size);
        if !most.is_finite() {
            return Ok(best);
        }
        let mut last = 0.0;
        for i in 1..=CELLS {
            let size = most * f64::from(i) / f64::from(CELLS);
            if self.holds(self.values(Hit { turn, size }))? {
                let (mut short, mut good) = (last, size);
                for _ in 0..HALVINGS {
                    let middle = f64::midpoint(short, good);
                    if middle == short || middle == good {
                        break;
                    }
                    *(if self.holds(self.values(Hit { turn, size: middle }))? { &mut good } else { &mut short }) =
                        middle;
                }
                let hit = Hit { turn, size: good };
                return Ok(Some(best.filter(|best| best.size <= hit.size).unwrap_or(hit)));
            }
            last = size;
        }
        Ok(best)
    }

    /// How far a direction goes within both ranges.
    fn reach(&self, turn: f64) -> f64 {
        let (sine, cosine) = (turn * TAU).sin_cos();
        let reach = |span: &Span, part: f64| {
            let end = if part > 0.0 { span.range.1 } else { span.range.0 };
            if part.abs() < 1e-12 { f64::INFINITY } else { span.share(end) / part.abs() }
        };
        reach(self.spans[0], cosine).min(reach(self.spans[1], sine))
    }

    /// Both values as the file would state them: few digits, checked as they read, of those that hold the nearest.
    fn rounded(&self, hit: Hit) -> Result<Option<Pair>, StudyError> {
        let values = self.values(hit);
        for digits in DIGITS {
            let text = |d: usize, way: f64| rounded(values[d], self.spans[d].input.measure.unit, digits, way, 0.0);
            let mut found: Option<Pair> = None;
            for (a, b) in [(-1.0, -1.0), (-1.0, 1.0), (1.0, -1.0), (1.0, 1.0)] {
                let (Some(a), Some(b)) = (text(0, a), text(1, b)) else { continue };
                if self.holds([a.0, b.0])? {
                    let pair = self.of([a, b]);
                    if found.as_ref().is_none_or(|found| pair.relative < found.relative) {
                        found = Some(pair);
                    }
                }
            }
            if found.is_some() {
                return Ok(found);
            }
        }
        Ok(None)
    }

    fn of(&self, [a, b]: [(f64, String); 2]) -> Pair {
        let narrowed = |span: &Span| self.held == Held::Worst && span.input.measure.band.is_wide();
        let one = |span: &Span, (value, shown): (f64, String)| way(span, value, shown, narrowed(span), 1, Vec::new());
        let relative = self.spans[0].share(a.0).hypot(self.spans[1].share(b.0));
        Pair {
            inputs: self.spans.map(|span| span.input.clone()),
            ways: [one(self.spans[0], a), one(self.spans[1], b)],
            relative,
        }
    }
}

//! Clearance needed, as sums of their terms with the datum they count from.
use super::geometry::Layout;

/// What a clearance sum counts from. The two differ by the height of the anchor: a sum without its datum says nothing.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Datum {
    /// Down from the anchor.
    Anchor,
    /// Down from the standing surface (a load: from its underside before the fall).
    StandingSurface,
}

impl Datum {
    /// The datum in words, to follow a sum.
    #[must_use]
    pub const fn words(self) -> &'static str {
        match self {
            Self::Anchor => "below the anchor",
            Self::StandingSurface => "below the standing surface",
        }
    }
}

/// One term of a sum.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Term {
    /// What it is.
    pub what: &'static str,
    /// Its length, m.
    pub value_m: f64,
}

/// A sum with its terms, in order.
#[derive(Clone, Debug, PartialEq)]
pub struct ClearanceSum {
    /// What it counts from.
    pub datum: Datum,
    /// The terms.
    pub terms: Vec<Term>,
    /// Their sum, m.
    pub total_m: f64,
}

impl ClearanceSum {
    fn of<const N: usize>(datum: Datum, terms: [(&'static str, f64); N]) -> Self {
        let terms: Vec<Term> = terms.into_iter().map(|(what, value_m)| Term { what, value_m }).collect();
        let total_m = terms.iter().map(|term| term.value_m).sum();
        Self { datum, terms, total_m }
    }
}

/// What a fall needs below the point where the line comes taut, m.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Need {
    /// Travel from taut to the lowest point: absorber and stretch of everything.
    pub arrest_m: f64,
    /// Harness stretch and shift of the attachment.
    pub stretch_allowance_m: f64,
    /// Attachment above the feet (a load: above its underside).
    pub attachment_height_m: f64,
    /// Clear space that must be left.
    pub reserve_m: f64,
}

/// Clearance needed below the anchor, where the line comes taut this deep below it, m (on the fall line: its length).
#[must_use]
pub fn below_anchor(taut_below_anchor_m: f64, need: &Need) -> ClearanceSum {
    ClearanceSum::of(
        Datum::Anchor,
        [
            ("depth of the attachment below the anchor when the line comes taut", taut_below_anchor_m),
            ("arrest distance", need.arrest_m),
            ("harness stretch and attachment shift", need.stretch_allowance_m),
            ("attachment above the lowest point of the subject", need.attachment_height_m),
            ("reserve", need.reserve_m),
        ],
    )
}

/// Clearance needed below the standing surface after a free fall, m.
#[must_use]
pub fn below_standing_surface(free_fall_m: f64, need: &Need) -> ClearanceSum {
    ClearanceSum::of(
        Datum::StandingSurface,
        [
            ("free fall", free_fall_m),
            ("arrest distance", need.arrest_m),
            ("harness stretch and attachment shift", need.stretch_allowance_m),
            ("reserve", need.reserve_m),
        ],
    )
}

/// Both sums for one layout: below the anchor, then below the standing surface.
///
/// They differ by the height of the anchor above the standing surface:
/// `below the anchor = below the standing surface + anchor above the attachment + attachment height`.
#[must_use]
pub fn both(layout: &Layout, free_fall_m: f64, need: &Need) -> [ClearanceSum; 2] {
    [below_anchor(layout.taut_below_anchor_m(), need), below_standing_surface(free_fall_m, need)]
}

//! Horizontal lifeline: a massless elastic cable between two supports with a load at one point.
//!
//! The load is held at its horizontal place and moves vertically; off the middle it is not in horizontal balance (in
//! truth it would slide towards the middle). The cable's own weight is neglected. All deflections count from the
//! chord, the straight line between the supports, downwards.
use super::TableError;

mod curve;
mod shape;
mod yielding;

pub use curve::{EndLoad, Loading, SpanCurve};
pub use yielding::YieldingSpan;

/// How tight the cable is before the load comes on.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Tightness {
    /// Tension of the straight cable T0, N, `>= 0`.
    Pretension {
        /// T0, N.
        force_n: f64,
    },
    /// Unloaded sag below the middle of the chord, m, `0 <= sag <= length`; the cable is as long as that parabola.
    Sag {
        /// Sag, m.
        mid_m: f64,
    },
}

/// Absorber in line with the cable at one end: rigid-plastic in the cable tension.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct InlineAbsorber {
    /// Deployment force F, N, above the pretension.
    pub force_n: f64,
    /// Stroke S, m, `> 0`.
    pub stroke_m: f64,
}

/// A horizontal lifeline as it is built.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Span {
    /// Horizontal distance between the supports of one span, m, `> 0`.
    pub length_m: f64,
    /// Right support above the left one, m.
    pub level_difference_m: f64,
    /// Horizontal distance of the load from the left support, m, between 0 and `length_m`.
    pub at_m: f64,
    /// Pretension or sag.
    pub tightness: Tightness,
    /// Axial stiffness of the cable EA (force per unit strain), N, `> 0`.
    pub modulus_n: f64,
    /// Stiffness of each of the two end supports along the cable, N/m, `> 0`; none when rigid.
    pub support_stiffness_n_per_m: Option<f64>,
    /// Absorber at one end.
    pub absorber: Option<InlineAbsorber>,
    /// Equal masses that fall together at the place of the load, `>= 1`; each line feels an equal share.
    pub workers: u32,
    /// Equal spans the cable runs through without friction, `>= 1`; one is loaded, the others stay straight.
    pub spans: u32,
}

impl Span {
    /// A level single span between rigid supports, straight and without tension, loaded in the middle by one mass.
    #[must_use]
    pub const fn level(length_m: f64, modulus_n: f64) -> Self {
        Self {
            length_m,
            level_difference_m: 0.0,
            at_m: 0.5 * length_m,
            tightness: Tightness::Pretension { force_n: 0.0 },
            modulus_n,
            support_stiffness_n_per_m: None,
            absorber: None,
            workers: 1,
            spans: 1,
        }
    }
}

/// Why a span has no curve.
#[derive(Clone, Copy, Debug, PartialEq, thiserror::Error)]
pub enum SpanError {
    /// An input is out of range.
    #[error("the span's {what} is `{value}`")]
    Input {
        /// Which input.
        what: &'static str,
        /// Its value, SI.
        value: f64,
    },
    /// The load does not hang between the supports.
    #[error("the load at `{at_m:.3}` m from the left support is not inside the span of `{length_m:.3}` m")]
    LoadOutside {
        /// Place of the load, m.
        at_m: f64,
        /// Length of the span, m.
        length_m: f64,
    },
    /// A sag no lifeline has.
    #[error("the unloaded sag of `{sag_m:.3}` m is larger than the span of `{length_m:.3}` m")]
    SagTooLarge {
        /// Sag, m.
        sag_m: f64,
        /// Length of the span, m.
        length_m: f64,
    },
    /// The absorber would deploy with no load on the span.
    #[error("the in-line absorber deploys at `{force_n}` N, not above the pretension of `{pretension_n}` N")]
    AbsorberBelowPretension {
        /// Deployment force, N.
        force_n: f64,
        /// Pretension, N.
        pretension_n: f64,
    },
    /// The knots do not make a law.
    #[error("the curve of the span gives no table: {0}")]
    Table(#[from] TableError),
}

fn check(span: &Span) -> Result<(), SpanError> {
    let positive = |what, value: f64| {
        if value > 0.0 && value.is_finite() { Ok(()) } else { Err(SpanError::Input { what, value }) }
    };
    positive("length", span.length_m)?;
    positive("cable modulus", span.modulus_n)?;
    positive("support stiffness", span.support_stiffness_n_per_m.unwrap_or(1.0))?;
    positive("number of workers", f64::from(span.workers))?;
    positive("number of spans", f64::from(span.spans))?;
    if !span.level_difference_m.is_finite() {
        return Err(SpanError::Input { what: "level difference", value: span.level_difference_m });
    }
    if !(span.at_m > 0.0 && span.at_m < span.length_m) {
        return Err(SpanError::LoadOutside { at_m: span.at_m, length_m: span.length_m });
    }
    let pretension_n = check_tightness(span)?;
    let Some(absorber) = span.absorber else { return Ok(()) };
    positive("absorber force", absorber.force_n)?;
    positive("absorber stroke", absorber.stroke_m)?;
    if absorber.force_n <= pretension_n {
        return Err(SpanError::AbsorberBelowPretension { force_n: absorber.force_n, pretension_n });
    }
    Ok(())
}

/// The pretension, N, 0 for a sagging cable.
fn check_tightness(span: &Span) -> Result<f64, SpanError> {
    match span.tightness {
        Tightness::Pretension { force_n } if force_n >= 0.0 && force_n.is_finite() => Ok(force_n),
        Tightness::Pretension { force_n } => Err(SpanError::Input { what: "pretension", value: force_n }),
        Tightness::Sag { mid_m } if mid_m > span.length_m => {
            Err(SpanError::SagTooLarge { sag_m: mid_m, length_m: span.length_m })
        }
        Tightness::Sag { mid_m } if mid_m >= 0.0 => Ok(0.0),
        Tightness::Sag { mid_m } => Err(SpanError::Input { what: "sag", value: mid_m }),
    }
}

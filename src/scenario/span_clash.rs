//! Values of a span that are possible alone and impossible together.
use super::anchor::{Span, SpanTension};
use super::clash::Clash;
use crate::quantity::{Measure, format_measure};

/// Every clash of a span's typical values.
pub(super) fn clashes(span: &Span) -> Vec<Clash> {
    let mut found = Vec::new();
    found.extend(place(span));
    found.extend(level(span));
    found.extend(tension(span));
    found.extend(absorber(span));
    found.extend(whole("workers", span.workers.as_ref()));
    found.extend(whole("spans", span.spans.as_ref()));
    found
}

fn place(span: &Span) -> Option<Clash> {
    let at = span.at?;
    (at.si() <= 0.0 || at.si() >= span.length.si()).then(|| {
        let length = format_measure(&span.length);
        Clash::new(
            "anchor.span.at",
            format!("a load at `{}` does not hang on a span of `{length}`", format_measure(&at)),
            format!("expected more than 0 and less than {length}"),
            "it counts from the left support; write `kind = \"fixed\"` for a line on a support itself",
        )
    })
}

fn level(span: &Span) -> Option<Clash> {
    let level = span.level_difference?;
    (level.si().abs() >= span.length.si()).then(|| {
        let length = format_measure(&span.length);
        Clash::new(
            "anchor.span.level_difference",
            format!("a span of `{length}` is too short for a level difference of `{}`", format_measure(&level)),
            format!("expected less than {length}"),
            "`length` is the horizontal distance; a cable steeper than 45 degrees is no horizontal lifeline",
        )
    })
}

fn tension(span: &Span) -> Option<Clash> {
    match &span.tension {
        SpanTension::Pretension(pretension) if pretension.si() >= span.modulus.si() => Some(Clash::new(
            "anchor.span.pretension",
            format!(
                "a pretension of `{}` stretches a cable of modulus `{}` to twice its length or more",
                format_measure(pretension),
                format_measure(&span.modulus)
            ),
            format!("expected far less than {}", format_measure(&span.modulus)),
            "the modulus is a force per unit strain, the Young's modulus times the area; check both units",
        )),
        SpanTension::Sag(sag) if sag.si() >= 0.5 * span.length.si() => Some(Clash::new(
            "anchor.span.sag",
            format!("a span of `{}` is too short for a sag of `{}`", format_measure(&span.length), format_measure(sag)),
            "expected less than half the span".to_owned(),
            "the sag is that of the unloaded cable in the middle; a span is nearly straight",
        )),
        _ => None,
    }
}

/// An absorber that would deploy without a load.
fn absorber(span: &Span) -> Option<Clash> {
    let (SpanTension::Pretension(pretension), Some(absorber)) = (&span.tension, &span.absorber) else { return None };
    (absorber.deploy_force.si() <= pretension.si()).then(|| {
        Clash::new(
            "anchor.span.absorber.deploy_force",
            format!(
                "an absorber of `{}` deploys under the pretension of `{}`",
                format_measure(&absorber.deploy_force),
                format_measure(pretension)
            ),
            format!("expected more than {}", format_measure(pretension)),
            "it would be used up before the fall; check both forces and their units",
        )
    })
}

/// People and spans are counted.
fn whole(key: &str, measure: Option<&Measure>) -> Option<Clash> {
    let measure = measure?;
    (measure.band.is_wide() || measure.si().fract() != 0.0).then(|| {
        Clash::new(
            &format!("anchor.span.{key}"),
            format!("`{}` is not a number of {key}", format_measure(measure)),
            "expected one whole number".to_owned(),
            "write a whole number such as `2`; run the file once for each",
        )
    })
}

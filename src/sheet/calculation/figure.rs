//! A drawing as SVG with its title and text alternative.
use super::drawing::{Anchor, Shape};
use super::value::Figure;
use crate::sheet::drawing::px;
use maud::{Markup, html};

/// The figure as an `svg` element; `role="img"` with title and description.
pub fn svg(figure: &Figure) -> Markup {
    let drawing = &figure.drawing;
    let (title, text) = (format!("{}-title", figure.id), format!("{}-text", figure.id));
    html! {
        svg xmlns="http://www.w3.org/2000/svg" role="img" aria-labelledby=(format!("{title} {text}"))
            viewBox=(format!("0 0 {} {}", px(drawing.width), px(drawing.height))) {
            title id=(title) { (figure.title) }
            desc id=(text) { (figure.text) }
            @for shape in &drawing.shapes { (self::shape(shape)) }
        }
    }
}

fn shape(shape: &Shape) -> Markup {
    match shape {
        Shape::Line { class, from, to } => html! {
            line class=(class) x1=(px(from.0)) y1=(px(from.1)) x2=(px(to.0)) y2=(px(to.1)) {}
        },
        Shape::Path { class, points } => html! { polyline class=(class) points=(list(points)) {} },
        Shape::Area { class, at, size } => html! {
            rect class=(class) x=(px(at.0)) y=(px(at.1)) width=(px(size.0)) height=(px(size.1)) {}
        },
        Shape::Words { class, at, anchor, words } => html! {
            text class=(class) x=(px(at.0)) y=(px(at.1)) text-anchor=(end(*anchor)) { (words) }
        },
    }
}

const fn end(anchor: Anchor) -> &'static str {
    match anchor {
        Anchor::Start => "start",
        Anchor::Middle => "middle",
        Anchor::End => "end",
    }
}

fn list(points: &[(f64, f64)]) -> String {
    points.iter().map(|&(x, y)| format!("{},{}", px(x), px(y))).collect::<Vec<_>>().join(" ")
}

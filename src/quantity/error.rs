//! Why a text is not a quantity, with the place in the text and what would fit.
use super::{Dimension, Unit};
use std::ops::Range;

/// Why a text is not a quantity; ranges are bytes into the text.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum QuantityError {
    /// Nothing where a number should stand.
    #[error("there is no number in `{found}`")]
    NoNumber {
        /// Where.
        at: Range<usize>,
        /// What stands there.
        found: String,
        /// What was to be measured.
        dimension: Dimension,
    },
    /// A comma, blank or underscore inside the digits: `1,800` is 1.8 to some readers.
    #[error("`{found}` separates digits, which can be read in two ways")]
    Separator {
        /// Where.
        at: Range<usize>,
        /// The number as written.
        found: String,
    },
    /// `.5` or `5.`: too close to the dots of a band.
    #[error("`{found}` has a point without a digit on both sides")]
    LonePoint {
        /// Where.
        at: Range<usize>,
        /// The number as written.
        found: String,
    },
    /// Beyond what can be computed with.
    #[error("`{found}` is too large or too close to zero to compute with")]
    NotFinite {
        /// Where.
        at: Range<usize>,
        /// The number as written.
        found: String,
    },
    /// A number without its unit.
    #[error("`{found}` has no unit")]
    MissingUnit {
        /// Where.
        at: Range<usize>,
        /// The number as written.
        found: String,
        /// What was to be measured.
        dimension: Dimension,
    },
    /// A unit that no file knows.
    #[error("unknown unit `{found}`")]
    UnknownUnit {
        /// Where.
        at: Range<usize>,
        /// The unit as written.
        found: String,
        /// What was to be measured.
        dimension: Dimension,
    },
    /// A known unit of something else.
    #[error("`{}` measures {}, not {}", unit.symbol(), unit.dimension().word(), dimension.word())]
    WrongDimension {
        /// Where.
        at: Range<usize>,
        /// The unit as written.
        unit: Unit,
        /// What was to be measured.
        dimension: Dimension,
    },
    /// Feet and inches that are not whole feet and less than twelve inches.
    #[error("`{found}` is not whole feet and less than twelve inches")]
    FeetAndInches {
        /// Where.
        at: Range<usize>,
        /// The value as written.
        found: String,
    },
    /// More than three values in a band.
    #[error("a band has at most three values, this one has {count}")]
    TooManyValues {
        /// Where.
        at: Range<usize>,
        /// How many were found.
        count: usize,
    },
    /// A band whose values carry different units.
    #[error("the values of a band have two units, `{first}` and `{second}`")]
    MixedUnits {
        /// Where.
        at: Range<usize>,
        /// One unit.
        first: &'static str,
        /// The other.
        second: &'static str,
    },
    /// A band out of order.
    #[error("the band `{found}` is not in order")]
    BandOrder {
        /// Where.
        at: Range<usize>,
        /// The band as written.
        found: String,
    },
    /// A band where one value is wanted.
    #[error("`{found}` is a band")]
    BandNotAllowed {
        /// Where.
        at: Range<usize>,
        /// The band as written.
        found: String,
    },
}

impl QuantityError {
    /// The bytes of the text to point at; never beyond the text.
    #[must_use]
    pub fn span(&self) -> Range<usize> {
        match self {
            Self::NoNumber { at, .. }
            | Self::Separator { at, .. }
            | Self::LonePoint { at, .. }
            | Self::NotFinite { at, .. }
            | Self::MissingUnit { at, .. }
            | Self::UnknownUnit { at, .. }
            | Self::WrongDimension { at, .. }
            | Self::FeetAndInches { at, .. }
            | Self::TooManyValues { at, .. }
            | Self::MixedUnits { at, .. }
            | Self::BandOrder { at, .. }
            | Self::BandNotAllowed { at, .. } => at.clone(),
        }
    }

    /// What was expected there, a few words for the marker.
    #[must_use]
    pub fn expected(&self) -> String {
        match self {
            Self::NoNumber { dimension, .. } if *dimension == Dimension::Ratio => "expected a number".to_owned(),
            Self::NoNumber { dimension, .. } => format!("expected {} with its unit", dimension.word()),
            Self::Separator { .. } | Self::LonePoint { .. } | Self::NotFinite { .. } => {
                "expected a plain number".into()
            }
            Self::MissingUnit { dimension, .. } | Self::UnknownUnit { dimension, .. } => {
                format!("expected a unit of {}", dimension.word())
            }
            Self::WrongDimension { dimension, .. } => format!("expected {}", dimension.word()),
            Self::FeetAndInches { .. } => "expected feet and inches".to_owned(),
            Self::TooManyValues { .. } => "expected low..typical..high or low..high".to_owned(),
            Self::MixedUnits { .. } => "expected one unit".to_owned(),
            Self::BandOrder { .. } => "expected low <= typical <= high".to_owned(),
            Self::BandNotAllowed { .. } => "expected one value".to_owned(),
        }
    }

    /// What to do next.
    #[must_use]
    pub fn hint(&self) -> String {
        match self {
            Self::UnknownUnit { found, dimension, .. } => match near_unit(found, *dimension) {
                Some(unit) => format!("did you mean `{}`? {}", unit.symbol(), units_that_fit(*dimension)),
                None => units_that_fit(*dimension),
            },
            Self::NoNumber { dimension, .. }
            | Self::MissingUnit { dimension, .. }
            | Self::WrongDimension { dimension, .. } => units_that_fit(*dimension),
            Self::Separator { .. } => "write `1800` for eighteen hundred and `1.8` for one point eight".to_owned(),
            Self::LonePoint { .. } => {
                "write `0.5` for one half, and two points between the values of a band".to_owned()
            }
            Self::NotFinite { .. } => "write a value that can occur".to_owned(),
            Self::FeetAndInches { .. } => "write `6 ft 6 in`, `6.5 ft` or `78 in`".to_owned(),
            Self::TooManyValues { .. } => "write `80..100..120 kg` or `80..120 kg`".to_owned(),
            Self::MixedUnits { .. } => "write the unit once, at the end: `80..100..120 kg`".to_owned(),
            Self::BandOrder { .. } => "write the smallest value first: `80..100..120 kg`".to_owned(),
            Self::BandNotAllowed { .. } => "write a single value here".to_owned(),
        }
    }
}

/// `units that fit: m, cm, ..`: the hint for a number without a usable unit.
fn units_that_fit(dimension: Dimension) -> String {
    if dimension == Dimension::Ratio {
        return "write a plain number such as `0.08`, or a percentage such as `8 %`".to_owned();
    }
    let names: Vec<String> = Unit::for_dimension(dimension).iter().map(|u| format!("`{}`", u.symbol())).collect();
    let feet = if dimension == Dimension::Length { ", or feet and inches `6 ft 6 in`" } else { "" };
    format!("units that fit: {}{feet}", names.join(", "))
}

/// The unit that was probably meant: same letters in other case, or the usual long name.
fn near_unit(found: &str, dimension: Dimension) -> Option<Unit> {
    let lower = found.to_lowercase();
    let meant = match lower.as_str() {
        "kilogram" | "kilograms" | "kgs" | "kilo" | "kilos" => "kg",
        "pound" | "pounds" | "lbs" if dimension == Dimension::Mass => "lb",
        "pound" | "pounds" | "lb" | "lbs" | "kip" => "lbf",
        "metre" | "metres" | "meter" | "meters" => "m",
        "foot" | "feet" | "'" => "ft",
        "inch" | "inches" | "\"" => "in",
        "newton" | "newtons" => "N",
        "sec" | "secs" | "seconds" => "s",
        "percent" => "%",
        other => other,
    };
    Unit::for_dimension(dimension).into_iter().find(|unit| unit.symbol().eq_ignore_ascii_case(meant))
}

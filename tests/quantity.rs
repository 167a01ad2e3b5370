//! Numbers with units: reading, refusing, printing, and there and back.
#![allow(clippy::unwrap_used, clippy::panic, reason = "helpers of tests fail loudly")]
use proptest::prelude::*;
use underfoot::quantity::{
    Dimension, QuantityError, Unit, UnitSystem, format_measure, format_si, format_unit, parse_measure, parse_quantity,
};

fn si(text: &str, dimension: Dimension) -> f64 {
    parse_quantity(text, dimension).unwrap_or_else(|e| panic!("{text}: {e}")).0
}

fn refused(text: &str, dimension: Dimension) -> QuantityError {
    match parse_measure(text, dimension) {
        Err(error) => error,
        Ok(measure) => panic!("`{text}` was read as {measure:?}"),
    }
}

#[test]
fn every_unit_reads_with_its_exact_factor() {
    use Dimension::*;
    // Factors: international yard and pound agreement 1959; pound-force = pound * 9.80665 (NIST SP 811).
    let cases = [
        ("1.8 m", Length, 1.8),
        ("180 cm", Length, 1.8),
        ("1800 mm", Length, 1.8),
        ("6 ft", Length, 6.0 * 0.3048),
        ("72 in", Length, 72.0 * 0.0254),
        ("6 ft 6 in", Length, 78.0 * 0.0254),
        ("-6 ft 6 in", Length, -78.0 * 0.0254),
        ("6ft 6.5in", Length, 78.5 * 0.0254),
        ("100 kg", Mass, 100.0),
        ("220 lb", Mass, 220.0 * 0.453_592_37),
        ("6 kN", Force, 6000.0),
        ("6000 N", Force, 6000.0),
        ("1800 lbf", Force, 1800.0 * 4.448_221_615_260_5),
        ("50 kN/m", Stiffness, 50_000.0),
        ("300 lbf/in", Stiffness, 300.0 * (4.448_221_615_260_5 / 0.0254)),
        ("300 lbf/ft", Stiffness, 300.0 * (4.448_221_615_260_5 / 0.3048)),
        ("300 N s/m", Damping, 300.0),
        ("300 N·s/m", Damping, 300.0),
        ("0.3 kN s/m", Damping, 300.0),
        ("9.80665 m/s2", Acceleration, 9.80665),
        ("9.81 m/s²", Acceleration, 9.81),
        ("32 ft/s^2", Acceleration, 32.0 * 0.3048),
        ("5 %", Ratio, 0.05),
        ("0.05", Ratio, 0.05),
        ("1.2e3 N", Force, 1200.0),
        ("+4 J", Energy, 4.0),
        ("-0 m", Length, 0.0),
    ];
    for (text, dimension, expected) in cases {
        let value = si(text, dimension);
        assert!((value - expected).abs() <= expected.abs() * f64::EPSILON, "{text}: {value} is not {expected}");
        assert!(value.is_sign_positive() || value < 0.0, "{text} reads as minus zero");
    }
}

#[test]
fn a_pound_force_is_a_pound_under_standard_gravity() {
    assert_eq!(si("1 lb", Dimension::Mass) * 9.80665, si("1 lbf", Dimension::Force));
    let (inches, foot) = (si("12 in", Dimension::Length), si("1 ft", Dimension::Length));
    assert!((inches - foot).abs() <= f64::EPSILON * foot, "{inches} is not {foot}");
}

#[test]
fn bands_read_low_typical_high() {
    let band = parse_measure("80..95..120 kg", Dimension::Mass).unwrap().band;
    assert_eq!((band.low, band.typical, band.high), (80.0, 95.0, 120.0));
    let band = parse_measure("80 .. 120 kg", Dimension::Mass).unwrap().band;
    assert_eq!((band.low, band.typical, band.high), (80.0, 100.0, 120.0));
    let band = parse_measure("80 kg..120 kg", Dimension::Mass).unwrap().band;
    assert_eq!((band.low, band.high), (80.0, 120.0));
    let band = parse_measure("-2..-1 m", Dimension::Length).unwrap().band;
    assert_eq!((band.low, band.typical, band.high), (-2.0, -1.5, -1.0));
    let band = parse_measure("0.05..0.08..0.12", Dimension::Ratio).unwrap().band;
    assert_eq!((band.low, band.typical, band.high), (0.05, 0.08, 0.12));
    assert!(parse_measure("6 ft 2 in..6 ft 6 in", Dimension::Length).unwrap().feet_and_inches);
}

#[test]
fn refusals_name_the_fault_its_place_and_a_way_out() {
    use Dimension::*;
    // text, dimension, message, pointed-at text, a piece of the hint
    let cases = [
        ("", Length, "there is no number in ``", "", "`6 ft 6 in`"),
        ("kN", Force, "there is no number in `kN`", "kN", "`kN`, `N`, `lbf`"),
        ("nan m", Length, "there is no number in `nan m`", "nan m", "`m`"),
        ("inf m", Length, "there is no number in `inf m`", "inf m", "`m`"),
        ("1.8", Length, "`1.8` has no unit", "1.8", "`ft`"),
        ("80..120", Mass, "`120` has no unit", "120", "`kg`, `lb`"),
        ("100 kN", Mass, "`kN` measures force, not mass", "kN", "`kg`, `lb`"),
        ("100 KG", Mass, "unknown unit `KG`", "KG", "did you mean `kg`"),
        ("5 furlong", Length, "unknown unit `furlong`", "furlong", "`mm`"),
        ("180 lb", Force, "`lb` measures mass, not force", "lb", "`lbf`"),
        ("1,800 lbf", Force, "`1,800` separates digits, which can be read in two ways", "1,800", "`1800`"),
        ("1,8 m", Length, "`1,8` separates digits, which can be read in two ways", "1,8", "`1.8`"),
        ("1 800 lbf", Force, "`1 800` separates digits, which can be read in two ways", "1 800", "`1800`"),
        ("80...120 kg", Mass, "`.120` has a point without a digit on both sides", ".120", "two points"),
        ("5. m", Length, "`5.` has a point without a digit on both sides", "5.", "`0.5`"),
        ("1e999 m", Length, "`1e999` is too large or too close to zero to compute with", "1e999", "can occur"),
        ("1e308 kN", Force, "`1e308` is too large or too close to zero to compute with", "1e308", "can occur"),
        ("1e-999 m", Length, "`1e-999` is too large or too close to zero to compute with", "1e-999", "can occur"),
        ("6 ft 14 in", Length, "`6 ft 14 in` is not whole feet and less than twelve inches", "6 ft 14 in", "`78 in`"),
        (
            "6.5 ft 6 in",
            Length,
            "`6.5 ft 6 in` is not whole feet and less than twelve inches",
            "6.5 ft 6 in",
            "`78 in`",
        ),
        ("6 ft 6 m", Length, "`6 ft 6 m` is not whole feet and less than twelve inches", "6 ft 6 m", "`78 in`"),
        ("1..2..3..4 m", Length, "a band has at most three values, this one has 4", "1..2..3..4 m", "80..120"),
        ("1 ft..2 m", Length, "the values of a band have two units, `ft` and `m`", "1 ft..2 m", "once"),
        ("120..80 kg", Mass, "the band `120..80 kg` is not in order", "120..80 kg", "smallest value first"),
        ("80..130..120 kg", Mass, "the band `80..130..120 kg` is not in order", "80..130..120 kg", "first"),
    ];
    for (text, dimension, message, pointed_at, hint) in cases {
        let error = refused(text, dimension);
        assert_eq!(error.to_string(), message, "{text}");
        assert_eq!(&text[error.span()], pointed_at, "{text}");
        assert!(error.hint().contains(hint), "{text}: {}", error.hint());
        assert!(error.expected().starts_with("expected"), "{text}");
    }
    let band = parse_quantity("80..120 kg", Dimension::Mass).unwrap_err();
    assert_eq!(band.to_string(), "`80..120 kg` is a band");
}

#[test]
fn shown_numbers_have_readable_digits_and_a_unit() {
    use Dimension::*;
    use UnitSystem::{Metric, Us};
    let cases = [
        (5123.0, Force, Metric, "5.12 kN"),
        (39_240.0, Force, Metric, "39.2 kN"),
        (142_345.0, Force, Metric, "142.3 kN"),
        (9_996.0, Force, Metric, "10.0 kN"),
        (8_006.8, Force, Us, "1800 lbf"),
        (1.8, Length, Metric, "1.80 m"),
        (13.2, Length, Metric, "13.20 m"),
        (0.0361, Length, Metric, "0.0361 m"),
        (1.8288, Length, Us, "6.00 ft"),
        (-0.0, Length, Metric, "0.00 m"),
        (-1e-17, Length, Metric, "0.00 m"),
        (3.2e-13, Ratio, Metric, "3.20e-13"),
        (2.5e-6, Length, Metric, "2.50e-6 m"),
        (-0.583, Length, Metric, "-0.583 m"),
        (100.0, Mass, Metric, "100 kg"),
        (99.79, Mass, Metric, "99.8 kg"),
        (100.0, Mass, Us, "220.5 lb"),
        (60_000.0, Stiffness, Metric, "60.0 kN/m"),
        (300.0, Damping, Metric, "300 N s/m"),
        (300.0, Damping, Us, "20.6 lbf s/ft"),
        (3922.66, Energy, Metric, "3923 J"),
        (3922.66, Energy, Us, "2893 ft lbf"),
        (5.94, Speed, Metric, "5.94 m/s"),
        (5.94, Speed, Us, "19.5 ft/s"),
        (0.612, Time, Us, "0.612 s"),
        (4.2, GravityMultiple, Metric, "4.20 g"),
        (0.08, Ratio, Metric, "0.0800"),
        (f64::NAN, Length, Metric, "not a number"),
    ];
    for (value, dimension, system, expected) in cases {
        assert_eq!(format_si(value, dimension, system), expected);
    }
}

#[test]
fn a_measure_is_written_as_it_stood() {
    for text in ["80..100..130 kg", "80..120 kg", "6 ft 6 in", "-6 ft 6.25 in", "62 kN/m", "5 %", "0.08", "1.7 mm"] {
        let dimension = Unit::ALL
            .iter()
            .map(|unit| unit.dimension())
            .find(|dimension| parse_measure(text, *dimension).is_ok())
            .unwrap();
        assert_eq!(format_measure(&parse_measure(text, dimension).unwrap()), text);
    }
}

fn any_unit() -> impl Strategy<Value = Unit> {
    proptest::sample::select(Unit::ALL)
}

proptest! {
    #[test]
    fn printing_and_reading_a_value_of_up_to_twelve_digits_gives_it_back(
        unit in any_unit(), digits in -999_999_999_999_i64..=999_999_999_999, power in -6_i32..=6,
    ) {
        let text = format!("{digits}e{power} {}", unit.symbol());
        let value = si(&text, unit.dimension());
        let printed = format_unit(value, unit);
        prop_assert_eq!(si(&printed, unit.dimension()), value, "{} printed as {}", text, printed);
    }

    #[test]
    fn any_value_reads_back_within_twelve_digits(unit in any_unit(), value in -1e9_f64..1e9) {
        let back = si(&format_unit(value, unit), unit.dimension());
        prop_assert!((back - value).abs() <= value.abs() * 1e-11, "{} came back as {}", value, back);
    }

    #[test]
    fn feet_and_inches_read_back(feet in -300_i32..300, sixteenths in 0_u32..192) {
        let inches = f64::from(sixteenths) / 16.0;
        let measure = parse_measure(&format!("{feet} ft {inches} in"), Dimension::Length).unwrap();
        let printed = format_measure(&measure);
        let again = parse_measure(&printed, Dimension::Length).unwrap();
        prop_assert!((again.si() - measure.si()).abs() <= 1e-12 * measure.si().abs(), "{}", printed);
    }

    #[test]
    fn a_conversion_there_and_back_is_exact_to_two_ulp(unit in any_unit(), value in 1e-6_f64..1e9) {
        let back = value * unit.factor() / unit.factor();
        prop_assert!((back - value).abs() <= 2.0 * f64::EPSILON * value);
    }

    #[test]
    fn shown_text_always_keeps_three_digits_of_the_value(value in -1e12_f64..1e12, scale in 0_i32..16) {
        let value = value * 10_f64.powi(-scale);
        let text = format_si(value, Dimension::Length, UnitSystem::Metric);
        let back = si(&text, Dimension::Length);
        prop_assert!((back - value).abs() <= 0.005_f64.mul_add(value.abs(), 1e-9), "{} shown as {}", value, text);
    }

    #[test]
    fn no_text_panics_and_every_marker_lies_in_the_text(text in "\\PC{0,24}|[-+0-9., ftinkgNm/s2%e·]{0,20}") {
        for unit in Unit::ALL {
            match parse_measure(&text, unit.dimension()) {
                Ok(measure) => prop_assert!(measure.si().is_finite()),
                Err(error) => prop_assert!(text.get(error.span()).is_some(), "{:?}", error),
            }
        }
    }
}

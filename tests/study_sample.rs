//! Sequences and shapes against a general scientific library (`scipy.stats` 1.17.1), frozen as data.
#![allow(clippy::unwrap_used, clippy::panic, reason = "a test stops at what it cannot have")]
use approx::assert_relative_eq;
use underfoot::quantity::{Band, Shape};
use underfoot::study::{MOST_DIMENSIONS, Quantile, Sobol};

fn quantiles(low: f64, typical: f64, high: f64, shape: Shape) -> impl Fn(f64) -> f64 {
    let quantile = Quantile::new(Band { low, typical, high, shape });
    move |u| quantile.at(u)
}

/// `qmc.Sobol(64, scramble=False, bits=32).random(1024)`: exact.
#[test]
fn the_plain_sequence_is_that_of_the_published_direction_numbers() {
    let sobol = Sobol::plain(MOST_DIMENSIONS);
    let mut seen = 0;
    for line in include_str!("study_data/sobol_points.csv").lines().skip(1) {
        let cells: Vec<&str> = line.split(',').collect();
        let (index, dimension, value): (usize, usize, f64) =
            (cells[0].parse().unwrap(), cells[1].parse().unwrap(), cells[2].parse().unwrap());
        assert_eq!(sobol.coordinate(index, dimension), value, "point {index}, dimension {dimension}");
        seen += 1;
    }
    assert_eq!(seen, 225);
}

#[test]
fn a_scrambled_sequence_has_one_point_in_every_strip_of_every_dimension() {
    let sobol = Sobol::scrambled(MOST_DIMENSIONS, 7);
    for dimension in 0..MOST_DIMENSIONS {
        let mut strips = vec![0; 1024];
        for index in 0..1024 {
            #[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "below 1024")]
            let strip = (sobol.coordinate(index, dimension) * 1024.0) as usize;
            strips[strip] += 1;
        }
        assert!(strips.iter().all(|count| *count == 1), "dimension {dimension}");
    }
}

#[test]
fn another_seed_gives_other_points_and_the_same_seed_the_same() {
    let point = |seed| Sobol::scrambled(5, seed).point(12);
    assert_eq!(point(1), point(1));
    assert_ne!(point(1), point(2));
}

/// `truncnorm.ppf(u, (low - typical)/s, (high - typical)/s, loc=typical, scale=s)`, s = (high - low)/4.
#[test]
fn a_normal_band_is_cut_at_low_and_high() {
    let symmetric = quantiles(80.0, 100.0, 120.0, Shape::Normal);
    let skew = quantiles(90.0, 100.0, 130.0, Shape::Normal);
    let even = [81.519_164_604_086_68, 95.015_971_175_780_62, 100.0, 111.840_324_666_939_05, 119.826_256_205_020_2];
    let uneven = [
        90.341_323_361_367_83,
        97.741_362_809_661_82,
        101.984_478_996_034_47,
        113.699_619_946_790_39,
        128.494_284_363_264_46,
    ];
    for (at, u) in [0.01, 0.3, 0.5, 0.9, 0.999].into_iter().enumerate() {
        assert_relative_eq!(symmetric(u), even[at], epsilon = 40.0 * 1e-10);
        assert_relative_eq!(skew(u), uneven[at], epsilon = 40.0 * 1e-10);
    }
    assert_relative_eq!(skew(0.0), 90.0, epsilon = 40.0 * 1e-10);
    assert_relative_eq!(skew(1.0), 130.0, epsilon = 40.0 * 1e-10);
}

/// `triang.ppf(u, 0.25, loc=90, scale=40)`.
#[test]
fn a_triangular_band_is_most_likely_at_typical() {
    let triangular = quantiles(90.0, 100.0, 130.0, Shape::Triangular);
    let expected = [92.0, 100.0, 105.505_102_572_168_23, 119.045_548_849_896_68, 128.904_554_884_989_66];
    for (u, value) in [0.01, 0.25, 0.5, 0.9, 0.999].into_iter().zip(expected) {
        assert_relative_eq!(triangular(u), value, max_relative = 1e-13);
    }
    let at_one_end = quantiles(90.0, 90.0, 130.0, Shape::Triangular);
    assert_eq!([at_one_end(0.0), at_one_end(1.0)], [90.0, 130.0]);
}

#[test]
fn a_uniform_band_is_straight_and_a_narrow_one_a_point() {
    let uniform = quantiles(2.0, 2.5, 6.0, Shape::Uniform);
    assert_eq!([uniform(0.0), uniform(0.25), uniform(1.0), uniform(7.0)], [2.0, 3.0, 6.0, 6.0]);
    assert_eq!(quantiles(2.0, 2.0, 2.0, Shape::Normal)(0.3), 2.0);
}

//! Sequences and shapes against a general scientific library (SciPy 1.17.1, `scipy.stats`), frozen as data.
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
    let even = [81.51916460408668, 95.01597117578062, 100.0, 111.84032466693905, 119.8262562050202];
    let uneven = [90.34132336136783, 97.74136280966182, 101.98447899603447, 113.69961994679039, 128.49428436326446];
    for (at, u) in [0.01, 0.3, 0.5, 0.9, 0.999].into_iter().enumerate() {
        assert_relative_eq!(symmetric(u), even[at], max_relative = 1e-12);
        assert_relative_eq!(skew(u), uneven[at], max_relative = 1e-12);
    }
    assert_relative_eq!(skew(0.0), 90.0, max_relative = 1e-12);
    assert_relative_eq!(skew(1.0), 130.0, max_relative = 1e-12);
}

/// `triang.ppf(u, 0.25, loc=90, scale=40)`.
#[test]
fn a_triangular_band_is_most_likely_at_typical() {
    let triangular = quantiles(90.0, 100.0, 130.0, Shape::Triangular);
    let expected = [92.0, 100.0, 105.50510257216823, 119.04554884989668, 128.90455488498966];
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

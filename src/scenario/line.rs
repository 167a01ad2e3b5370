//! The line and its energy absorber.
use crate::quantity::Measure;

/// Kind of line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LineKind {
    /// Lanyard.
    Lanyard,
    /// Rope.
    Rope,
    /// Webbing.
    Webbing,
    /// Wire cable.
    Cable,
    /// Line that pays out and locks; it has no stated length.
    Retractable,
    /// Vertical line with a grab that slides before it holds.
    Vertical,
}

/// The one law of the line's stretch, as the file states it.
#[derive(Clone, Debug, PartialEq)]
pub enum StretchLaw {
    /// Stiffness, N/m.
    Stiffness(Measure),
    /// Force per unit strain, N.
    Modulus(Measure),
    /// A rated drop: largest force, mass, fall factor.
    RatedImpact {
        /// Largest force of the rated drop, N.
        force: Measure,
        /// Mass of the rated drop, kg.
        mass: Measure,
        /// Fall factor of the rated drop.
        fall_factor: Measure,
    },
    /// Elongation in percent between two loads (forces in N; a mass was turned into its weight).
    StaticElongation {
        /// Elongation between the loads, as a ratio (0.05 for 5 %).
        percent: Measure,
        /// The smaller load, as written (mass or force).
        from: Measure,
        /// The larger load, as written (mass or force).
        to: Measure,
    },
    /// Elongation in m and force in N, from (0, 0), both strictly rising.
    Curve(Vec<(f64, f64)>),
}

/// Damping of the line, as the file states it.
#[derive(Clone, Debug, PartialEq)]
pub enum DampingLaw {
    /// No key: no damping.
    None,
    /// Viscous damping, N s/m.
    Damping(Measure),
    /// Ratio about the subject's mass and the line's own stiffness.
    Ratio(Measure),
}

/// The line.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// Kind.
    pub kind: LineKind,
    /// Length with any packed absorber, m.
    pub length: Option<Measure>,
    /// The law of its stretch.
    pub stretch: StretchLaw,
    /// Its damping.
    pub damping: DampingLaw,
    /// The spring in series of the three-parameter line, N/m.
    pub series_stiffness: Option<Measure>,
    /// Breaking strength, N.
    pub strength: Option<Measure>,
    /// Mass per length, kg/m; information only.
    pub mass_per_length: Option<Measure>,
    /// Travel until it locks, m; stated for a retractable line and for no other.
    pub lock_travel: Option<Measure>,
    /// Slide of the grab before it holds, m, vertical lines only; 0 where absent.
    pub grab_slide: Option<Measure>,
    /// Slack at the start, m, retractable lines only; 0 where absent.
    pub slack: Option<Measure>,
}

/// Energy absorber.
#[derive(Clone, Debug, PartialEq)]
pub struct Absorber {
    /// Deployment force, N, dry; either this or the table.
    pub deploy_force: Option<Measure>,
    /// Deployed length in m and dry force in N, from length 0; lengths rising, forces never falling.
    pub force_table: Option<Vec<(f64, f64)>>,
    /// Force at which deployment first starts, N, dry; the force at length 0 where absent.
    pub onset_force: Option<Measure>,
    /// Largest deployed length, m; stated beside a deployment force, the last length of a table where absent.
    pub stroke: Option<Measure>,
    /// Factor of a wet or frozen absorber on all its forces; 1 where absent.
    pub wet_cold_factor: Option<Measure>,
    /// Largest mass it is rated for, kg.
    pub rated_mass: Option<Measure>,
    /// Largest free fall it is rated for, m.
    pub rated_free_fall: Option<Measure>,
    /// Length it takes while packed, part of the line's length, m.
    pub packed_length: Option<Measure>,
}

impl Absorber {
    /// Largest deployed length, m: the stroke, else the last length of the table.
    #[must_use]
    pub fn stroke_m(&self) -> f64 {
        let last = || self.force_table.as_ref().and_then(|table| table.last()).map_or(0.0, |row| row.0);
        self.stroke.map_or_else(last, |stroke| stroke.si())
    }

    /// Force at deployed length 0 before any wet and cold factor, N: low, typical, high.
    #[must_use]
    pub fn first_force_n(&self) -> [f64; 3] {
        let first = || self.force_table.as_ref().and_then(|table| table.first()).map_or(0.0, |row| row.1);
        match self.deploy_force {
            Some(Measure { band, .. }) => [band.low, band.typical, band.high],
            None => [first(); 3],
        }
    }

    /// Factor on all forces, 1 where the file has none.
    #[must_use]
    pub fn force_factor(&self) -> f64 {
        self.wet_cold_factor.map_or(1.0, |factor| factor.si())
    }
}

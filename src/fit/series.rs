//! A table of readings fitted branch by branch: loading and unloading are two laws.

mod cautions;

use crate::{
    diagnostic::Caution,
    fit::{
        MonotoneTable, Outlier, PowerLaw,
        outliers::outliers,
        power::points,
        readings::{Abscissa, Direction, Ordinate, Reading, Readings},
    },
    numerics::interpolation::log_log,
};

/// What is laid through the readings.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Form {
    /// A power law.
    Law,
    /// A table that never falls.
    Table,
}

/// What was laid through the readings of a branch.
#[derive(Clone, Debug, PartialEq)]
pub enum Shape {
    /// A power law.
    Law(PowerLaw),
    /// A table that never falls.
    Table(MonotoneTable),
}

impl Shape {
    /// Conductance at an abscissa, SI.
    pub fn at(&self, x: f64) -> f64 {
        match self {
            Self::Law(law) => law.at(x),
            Self::Table(table) => log_log(&table.rows, x),
        }
    }

    /// How far another joint may be off: one standard deviation as a factor.
    pub fn factor(&self) -> f64 {
        match self {
            Self::Law(law) => law.factor(),
            Self::Table(table) => table.factor(),
        }
    }
}

/// The readings of one direction of load with their law.
#[derive(Clone, Debug, PartialEq)]
pub struct Branch {
    /// The direction; none where the table states none.
    pub direction: Option<Direction>,
    /// The readings, all of them.
    pub readings: Vec<Reading>,
    /// The law.
    pub shape: Shape,
    /// Readings that stand apart from a power law, with their places in `readings`; none is dropped.
    pub outliers: Vec<Outlier>,
}

/// How far unloading lies above loading.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hysteresis {
    /// Where both are compared: the middle of what both cover, SI.
    pub at: f64,
    /// Conductance on unloading over that on loading.
    pub ratio: f64,
    /// Its 90 % interval; none between tables.
    pub interval: Option<[f64; 2]>,
}

/// Readings fitted.
#[derive(Clone, Debug, PartialEq)]
pub struct Series {
    /// What was varied.
    pub abscissa: Abscissa,
    /// What was measured.
    pub ordinate: Ordinate,
    /// One branch, or loading before unloading.
    pub branches: Vec<Branch>,
    /// Unloading against loading.
    pub hysteresis: Option<Hysteresis>,
    /// What to know of the fit.
    pub cautions: Vec<Caution>,
}

/// Why readings cannot be fitted.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum Failure {
    /// Nothing was varied.
    #[error("the table has no column of pressure, force or torque, so there is no law to fit")]
    NothingVaried,
    /// What was measured does not go with what was varied.
    #[error("a law of {measured} against {varied} is no part of a joint file")]
    Unfit {
        /// What was varied.
        varied: &'static str,
        /// What was measured.
        measured: &'static str,
    },
    /// Too few readings.
    #[error("{readings} {branch}readings at {places} places do not fix {form}")]
    TooFew {
        /// Which branch, with a blank behind it, or nothing.
        branch: String,
        /// How many readings.
        readings: usize,
        /// At how many different abscissas.
        places: usize,
        /// What was to be fixed.
        form: &'static str,
    },
}

impl Failure {
    /// The way out.
    pub const fn help(&self) -> &'static str {
        match self {
            Self::NothingVaried => {
                "add a column such as `pressure [MPa]`, or fit an unknown of a joint: `ringsum fit joint.toml points.csv --unknown roughness`"
            }
            Self::Unfit { .. } => {
                "h or R in m²·K/W goes with pressure, W/K or K/W with the force or the torque of a bolt; divide W/K by the area of the specimen"
            }
            Self::TooFew { .. } => {
                "a law needs three readings at two places or more (two with `sigma`), a table four places, repeated readings or `sigma`"
            }
        }
    }
}

impl Series {
    /// Fits every branch of a table in a form.
    pub fn of(readings: &Readings, form: Form) -> Result<Self, Failure> {
        let abscissa = readings.abscissa.ok_or(Failure::NothingVaried)?;
        if readings.ordinate.is_per_area() != (abscissa == Abscissa::Pressure)
            || (form == Form::Table && abscissa != Abscissa::Pressure)
        {
            return Err(Failure::Unfit {
                varied: abscissa.name(),
                measured: match (readings.ordinate.is_per_area(), form) {
                    (true, _) => "conductance per area",
                    (false, Form::Law) => "conductance in W/K",
                    (false, Form::Table) => "conductance in W/K as a table",
                },
            });
        }
        let mut directions: Vec<Option<Direction>> =
            readings.rows.iter().map(|row| row.direction).collect();
        directions.sort_unstable();
        directions.dedup();
        let branches = directions
            .into_iter()
            .map(|direction| Branch::of(readings, direction, form))
            .collect::<Result<Vec<Branch>, Failure>>()?;
        let mut series = Self {
            abscissa,
            ordinate: readings.ordinate,
            hysteresis: hysteresis(&branches),
            branches,
            cautions: Vec::new(),
        };
        series.cautions = cautions::of(&series);
        Ok(series)
    }

    /// The branch of a direction: the one asked for, else loading, else the only one.
    pub fn branch(&self, asked: Option<Direction>) -> Option<&Branch> {
        match asked {
            Some(_) => self
                .branches
                .iter()
                .find(|branch| branch.direction == asked),
            None => self.branches.first(),
        }
    }
}

impl Branch {
    fn of(readings: &Readings, direction: Option<Direction>, form: Form) -> Result<Self, Failure> {
        let rows = readings.rows.iter();
        let own: Vec<Reading> = rows
            .filter(|row| row.direction == direction)
            .cloned()
            .collect();
        let shape = match form {
            Form::Law => PowerLaw::of(&own).map(Shape::Law),
            Form::Table => MonotoneTable::of(&own).map(Shape::Table),
        };
        let Some(shape) = shape else {
            let mut places: Vec<f64> = own.iter().filter_map(|row| row.abscissa).collect();
            places.sort_by(f64::total_cmp);
            places.dedup();
            return Err(Failure::TooFew {
                branch: direction.map_or_else(String::new, |way| format!("{} ", way.name())),
                readings: own.len(),
                places: places.len(),
                form: match form {
                    Form::Law => "a power law with its scatter",
                    Form::Table => "a table with its scatter",
                },
            });
        };
        Ok(Self {
            direction,
            outliers: outliers(&points(&own)),
            readings: own,
            shape,
        })
    }

    /// Least and largest abscissa.
    pub fn range(&self) -> [f64; 2] {
        let places = || self.readings.iter().filter_map(|row| row.abscissa);
        [
            places().fold(f64::INFINITY, f64::min),
            places().fold(f64::NEG_INFINITY, f64::max),
        ]
    }
}

/// Unloading over loading in the middle of what both cover; none where nothing is covered by both.
fn hysteresis(branches: &[Branch]) -> Option<Hysteresis> {
    let of = |way| branches.iter().find(|branch| branch.direction == Some(way));
    let (up, down) = (of(Direction::Loading)?, of(Direction::Unloading)?);
    let (one, other) = (up.range(), down.range());
    let (low, high) = (one[0].max(other[0]), one[1].min(other[1]));
    if low > high {
        return None;
    }
    let at = (low * high).sqrt();
    let ratio = down.shape.at(at) / up.shape.at(at);
    let interval = match (&up.shape, &down.shape) {
        (Shape::Law(up), Shape::Law(down)) => {
            // Each by its own reach: for unlike degrees of freedom this errs on the wide side.
            let wide = (up.reach * up.deviation(at)).hypot(down.reach * down.deviation(at));
            Some([ratio / wide.exp(), ratio * wide.exp()])
        }
        _ => None,
    };
    Some(Hysteresis {
        at,
        ratio,
        interval,
    })
}

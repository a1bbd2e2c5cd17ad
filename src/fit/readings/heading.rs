//! The heading of a table of points: which column holds what, in which unit.

use crate::{
    diagnostic::{Fault, nearest},
    fit::readings::{
        cells::{Cell, Line},
        fault,
    },
    units::{self, Quantity},
};

/// What was varied.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Abscissa {
    /// Pressure between the faces.
    Pressure,
    /// Force of one bolt.
    Force,
    /// Tightening torque of one bolt.
    Torque,
}

impl Abscissa {
    /// As people say it.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Pressure => "pressure",
            Self::Force => "force per bolt",
            Self::Torque => "torque",
        }
    }

    /// What it is.
    pub const fn quantity(self) -> Quantity {
        match self {
            Self::Pressure => Quantity::Pressure,
            Self::Force => Quantity::Force,
            Self::Torque => Quantity::Torque,
        }
    }
}

/// What was measured.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ordinate {
    /// Conductance per area, W/(m² K).
    Film,
    /// Resistance times area, m² K/W.
    AreaResistance,
    /// Conductance, W/K.
    Conductance,
    /// Resistance, K/W.
    Resistance,
}

impl Ordinate {
    const ALL: [Self; 4] = [
        Self::Film,
        Self::AreaResistance,
        Self::Conductance,
        Self::Resistance,
    ];

    /// Whether it is the inverse of a conductance.
    pub const fn is_resistance(self) -> bool {
        matches!(self, Self::AreaResistance | Self::Resistance)
    }

    /// Whether it holds for an area alone.
    pub const fn is_per_area(self) -> bool {
        matches!(self, Self::Film | Self::AreaResistance)
    }

    /// The conductance that is fitted.
    pub const fn fitted(self) -> Quantity {
        if self.is_per_area() {
            Quantity::FilmCoefficient
        } else {
            Quantity::Conductance
        }
    }

    const fn quantity(self) -> Quantity {
        match self {
            Self::Film => Quantity::FilmCoefficient,
            Self::AreaResistance => Quantity::AreaResistance,
            Self::Conductance => Quantity::Conductance,
            Self::Resistance => Quantity::Resistance,
        }
    }
}

/// One column, with its unit in SI.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) enum Column {
    /// What was varied.
    Abscissa(Abscissa, f64),
    /// What was measured.
    Ordinate(f64),
    /// Standard deviation as a share of the value.
    Share(f64),
    /// Standard deviation in the unit of the value.
    Absolute(f64),
    /// Direction of the load.
    Direction,
    /// Name of the specimen.
    Specimen,
}

/// Columns of a table.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Heading {
    /// In file order.
    pub columns: Vec<Column>,
    /// What was measured.
    pub ordinate: Ordinate,
    /// What separates cells.
    pub separator: char,
}

/// What a column can be, and the words for it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Role {
    Abscissa(Abscissa),
    Ordinate,
    Deviation,
    Direction,
    Specimen,
}

const WORDS: [(&str, Role); 22] = [
    ("pressure", Role::Abscissa(Abscissa::Pressure)),
    ("p", Role::Abscissa(Abscissa::Pressure)),
    ("force", Role::Abscissa(Abscissa::Force)),
    ("force per bolt", Role::Abscissa(Abscissa::Force)),
    ("f", Role::Abscissa(Abscissa::Force)),
    ("preload", Role::Abscissa(Abscissa::Force)),
    ("torque", Role::Abscissa(Abscissa::Torque)),
    ("h", Role::Ordinate),
    ("g", Role::Ordinate),
    ("conductance", Role::Ordinate),
    ("conductance per bolt", Role::Ordinate),
    ("r", Role::Ordinate),
    ("resistance", Role::Ordinate),
    ("area resistance", Role::Ordinate),
    ("sigma", Role::Deviation),
    ("σ", Role::Deviation),
    ("sd", Role::Deviation),
    ("standard deviation", Role::Deviation),
    ("direction", Role::Direction),
    ("load", Role::Direction),
    ("specimen", Role::Specimen),
    ("sample", Role::Specimen),
];

impl Heading {
    /// Reads the heading; none when it is at fault.
    pub fn read(line: &Line, faults: &mut Vec<Fault>) -> Option<Self> {
        let before = faults.len();
        let mut roles: Vec<(Role, &Cell, Option<String>)> = Vec::new();
        for cell in &line.cells {
            let Some((role, unit)) = role(cell, faults) else {
                continue;
            };
            let same =
                |other: &Role| std::mem::discriminant(other) == std::mem::discriminant(&role);
            if let Some((_, first, _)) = roles.iter().find(|(other, ..)| same(other)) {
                faults.push(fault(
                    "points/heading",
                    cell.span.clone(),
                    &format!("`{}` says the same as `{}`", cell.short(), first.short()),
                    "expected each quantity once",
                ));
                continue;
            }
            roles.push((role, cell, unit));
        }
        let measured = roles.iter().find(|(role, ..)| *role == Role::Ordinate);
        let ordinate = match measured {
            Some((_, cell, unit)) => ordinate(cell, unit.as_deref(), faults),
            // A heading that is not known may be the one that is missed.
            None if faults.len() > before => None,
            None => {
                faults.push(fault(
                    "points/heading",
                    line.span.clone(),
                    "no column holds what was measured",
                    "expected a column `h`, `conductance`, `R` or `resistance`",
                ));
                None
            }
        };
        let columns: Vec<Column> = roles
            .iter()
            .filter_map(|(role, cell, unit)| {
                column(*role, (cell, unit.as_deref()), (ordinate, faults))
            })
            .collect();
        let ordinate = ordinate?;
        (faults.len() == before).then_some(Self {
            columns,
            ordinate,
            separator: line.separator,
        })
    }

    /// What was varied, if anything.
    pub fn abscissa(&self) -> Option<Abscissa> {
        self.columns.iter().find_map(|column| match column {
            Column::Abscissa(kind, _) => Some(*kind),
            _ => None,
        })
    }
}

/// What a heading says the column is, and its unit as written.
fn role(cell: &Cell, faults: &mut Vec<Fault>) -> Option<(Role, Option<String>)> {
    let (name, unit) = match cell.text.split_once('[') {
        Some((name, unit)) => (name.trim(), Some(unit.trim().trim_end_matches(']').trim())),
        None => (cell.text.trim(), None),
    };
    let folded = name.to_lowercase();
    if let Some((_, role)) = WORDS.iter().find(|(word, _)| *word == folded) {
        return Some((
            *role,
            unit.filter(|unit| !unit.is_empty()).map(str::to_owned),
        ));
    }
    let mut told = fault(
        "points/heading",
        cell.span.clone(),
        &format!("`{}` is not a column of measured points", cell.short()),
        "expected a quantity with its unit in brackets",
    );
    if let Some(near) = nearest(&folded, WORDS.iter().map(|(word, _)| *word)) {
        told.help = Some(format!("did you mean `{near}`?"));
    }
    faults.push(told);
    None
}

/// The unit of a heading in SI, if it is one of the quantity.
fn unit(written: &str, quantity: Quantity) -> Result<f64, String> {
    units::parse(&format!("1 {written}"), quantity).map_err(|fault| fault.message)
}

fn no_unit(cell: &Cell) -> Fault {
    fault(
        "points/heading",
        cell.span.clone(),
        &format!("the column `{}` has no unit", cell.short()),
        "expected a unit in brackets",
    )
}

fn ordinate(cell: &Cell, written: Option<&str>, faults: &mut Vec<Fault>) -> Option<Ordinate> {
    let Some(written) = written else {
        faults.push(no_unit(cell));
        return None;
    };
    let found = Ordinate::ALL
        .into_iter()
        .find(|kind| unit(written, kind.quantity()).is_ok());
    if found.is_none() {
        faults.push(fault(
            "points/heading",
            cell.span.clone(),
            &format!(
                "`{}` has no unit of a conductance or resistance",
                cell.short()
            ),
            "expected W/(m²·K), m²·K/W, W/K or K/W",
        ));
    }
    found
}

fn column(
    role: Role,
    (cell, written): (&Cell, Option<&str>),
    (ordinate, faults): (Option<Ordinate>, &mut Vec<Fault>),
) -> Option<Column> {
    let mut size = |quantity: Quantity| -> Option<f64> {
        let Some(written) = written else {
            faults.push(no_unit(cell));
            return None;
        };
        match unit(written, quantity) {
            Ok(size) => Some(size),
            Err(message) => {
                faults.push(fault(
                    "points/heading",
                    cell.span.clone(),
                    &message,
                    &format!("expected a unit of {}", quantity.name()),
                ));
                None
            }
        }
    };
    match role {
        Role::Abscissa(kind) => size(kind.quantity()).map(|unit| Column::Abscissa(kind, unit)),
        // What is wrong with its unit has been told.
        Role::Ordinate => size(ordinate?.quantity()).map(Column::Ordinate),
        Role::Deviation => match written {
            Some(written) if unit(written, Quantity::Ratio).is_ok() => {
                size(Quantity::Ratio).map(Column::Share)
            }
            None => {
                faults.push(no_unit(cell));
                None
            }
            // Whose unit it is not known of here may be as it will.
            _ => size(ordinate?.quantity()).map(Column::Absolute),
        },
        Role::Direction => Some(Column::Direction),
        Role::Specimen => Some(Column::Specimen),
    }
}

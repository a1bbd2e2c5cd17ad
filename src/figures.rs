//! Drawings from results only: the same marks as SVG and as PNG.

mod arrange;
mod axis;
mod clip;
mod comparison;
mod cumulative;
mod evidence;
mod fit;
mod flags;
mod fonts;
mod joint;
mod legend;
mod lettering;
mod output;
mod picture;
mod plan;
mod ramp;
mod section;
mod setting;
mod sheet;
mod tornado;
mod torque;
mod warmth;

pub use arrange::ArrangePlot;
pub use comparison::{ComparisonPlot, ComparisonRow};
pub use cumulative::{CumulativePlot, Curve, RadiusMark};
pub use evidence::{EvidenceAxis, EvidencePanel, EvidencePlot, EvidenceRow};
pub use fit::{FitPlot, ProfilePlot};
pub use joint::{CutBolt, CutEnd, CutHead, JointCut, JointPlot};
pub use plan::{
    DetailKind, FacePair, PlanBolt, PlanDetail, PlanMap, PlanOutline, PlanPair, PlanShape, Scale,
};
pub use ramp::Ramp;
pub use section::SectionPlot;

use setting::{Setting, Width};

use crate::{estimate::TorqueSweep, uncertainty::Ranking, units::System};

/// The file a drawing becomes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Format {
    /// Scalable; text stays text, with fallback fonts named.
    Svg,
    /// Pixels at twice the nominal size; text from the bundled font.
    Png,
}

/// Everything that can be drawn.
#[derive(Clone, Debug, PartialEq)]
pub enum Drawing {
    /// The joint in plan and cut along a row of bolts.
    Joint(Box<JointPlot>),
    /// A field over the plan of the joint.
    Plan(Box<PlanMap>),
    /// Pressure and gap over the same plan.
    PressureAndGap(Box<PlanPair>),
    /// Temperatures of both faying faces on one scale.
    Faces(Box<FacePair>),
    /// Temperatures on a cut through the stack, and through it at two places.
    Section(Box<SectionPlot>),
    /// Conductance gathered from the hole outwards.
    Cumulative(CumulativePlot),
    /// Resistance against torque.
    Torque(Box<TorqueSweep>),
    /// Layouts of a search.
    Arrange(Box<ArrangePlot>),
    /// Several joints side by side.
    Comparison(Box<ComparisonPlot>),
    /// What each input alone does to an answer.
    Tornado(Box<Ranking>),
    /// Own readings with the law through them.
    Fit(Box<FitPlot>),
    /// Likelihood of an unknown over its range.
    Profile(Box<ProfilePlot>),
    /// Expected against found.
    Evidence(Box<EvidencePlot>),
}

/// Most points across or down a figure.
const LONGEST: usize = 4000;

/// Why a drawing cannot be made.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum FigureError {
    /// No value to draw.
    #[error("nothing to draw: {0} holds no value")]
    Empty(&'static str),
    /// A value that is infinite, not a number where one must be, or beyond 1e±60 in the shown unit.
    #[error("cannot draw {0}: a value is not finite or too far from unity")]
    NotFinite(&'static str),
    /// The numbers do not fit together, such as a field with too few cells.
    #[error("cannot draw {0}: its sizes do not fit together")]
    Shape(&'static str),
    /// More than a sheet holds, in points.
    #[error("the figure would be {0} points long, and {LONGEST} are the most; draw fewer at once")]
    TooLong(usize),
    /// The drawing library or the image encoder failed.
    #[error("the figure could not be written: {0}")]
    Output(String),
}

/// The drawing as a file of the format in SI, ready to be saved.
pub fn render(drawing: &Drawing, format: Format) -> Result<Vec<u8>, FigureError> {
    render_in(drawing, format, System::Si)
}

/// The drawing as a file of the format in a system of units.
///
/// Ranges are told in the units of the system before ticks are chosen, so that these are round in
/// it. The drawing of the evidence stays in the units of its sources.
pub fn render_in(drawing: &Drawing, format: Format, units: System) -> Result<Vec<u8>, FigureError> {
    match format {
        Format::Svg => svg_in(drawing, units).map(String::into_bytes),
        Format::Png => output::png(&sheet(drawing, full(units))?),
    }
}

/// The drawing as one `<svg>` element without prolog: a file of its own or part of a page.
pub fn svg(drawing: &Drawing) -> Result<String, FigureError> {
    svg_in(drawing, System::Si)
}

/// The drawing as one `<svg>` element in a system of units.
pub fn svg_in(drawing: &Drawing, units: System) -> Result<String, FigureError> {
    output::svg(&sheet(drawing, full(units))?)
}

/// The drawing as one `<svg>` element that a narrow screen shows with letters of the same size; of a
/// drawing that no page holds as wide as any.
pub fn narrow_svg_in(drawing: &Drawing, units: System) -> Result<String, FigureError> {
    let width = Width::Narrow;
    output::svg(&sheet(drawing, Setting { units, width })?)
}

/// The drawing as PNG, two pixels to the nominal one.
pub fn png(drawing: &Drawing) -> Result<Vec<u8>, FigureError> {
    output::png(&sheet(drawing, full(System::Si))?)
}

fn full(units: System) -> Setting {
    let width = Width::Full;
    Setting { units, width }
}

fn sheet(drawing: &Drawing, setting: Setting) -> Result<sheet::Sheet, FigureError> {
    match drawing {
        Drawing::Joint(plot) => joint::draw(plot, setting),
        Drawing::Plan(map) => plan::draw(map, setting),
        Drawing::PressureAndGap(pair) => plan::draw_pair(pair, setting),
        Drawing::Faces(pair) => plan::draw_faces(pair, setting),
        Drawing::Section(plot) => section::draw(plot, setting),
        Drawing::Cumulative(plot) => cumulative::draw(plot, setting),
        Drawing::Torque(sweep) => torque::draw(sweep, setting),
        Drawing::Arrange(plot) => arrange::draw(plot, setting.units),
        Drawing::Comparison(plot) => comparison::draw(plot, setting),
        Drawing::Tornado(ranking) => tornado::draw(ranking, setting.width),
        Drawing::Fit(plot) => fit::draw(plot, setting.units),
        Drawing::Profile(plot) => fit::draw_profile(plot),
        Drawing::Evidence(plot) => evidence::draw(plot),
    }
}

/// The value itself when it can be drawn: finite and neither huge nor tiny beyond use.
fn drawable(value: f64, what: &'static str) -> Result<f64, FigureError> {
    const FARTHEST: f64 = 1e60;
    if value.is_finite() && value.abs() < FARTHEST {
        // Below this size a number is zero on any axis, and its logarithm would spoil one.
        Ok(if value.abs() < 1.0 / FARTHEST {
            0.0
        } else {
            value
        })
    } else {
        Err(FigureError::NotFinite(what))
    }
}

#[cfg(test)]
mod tests;

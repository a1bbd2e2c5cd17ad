//! Temperatures and flux of a solved heat: at a glance, over the faces, on a section of the stack.

mod section;

pub use section::{
    OutlinePlate, SectionBolt, SectionPlate, Solid, StackOutline, StackSection, Through,
    stack_outline, stack_section,
};

use crate::estimate::{Chain, Failure, maps::window};

/// Temperatures of a solved heat at a glance: per watt, above the mean sink surface, K/W.
#[derive(Clone, Debug, PartialEq)]
pub struct Temperatures {
    /// Hottest point of the first plate.
    pub hottest: f64,
    /// Where it is: x and y in the first plate's own coordinates, height above its lowest face, m.
    pub hottest_at: [f64; 3],
    /// Names of the plates, warm side first.
    pub names: Vec<String>,
    /// Volume mean of every plate, warm side first.
    pub plate_means: Vec<f64>,
    /// Area mean of the drop across every interface, warm side first.
    pub interface_drops: Vec<f64>,
}

/// Both faying faces at a point.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FacePoint {
    /// Temperature of the warm and of the cold face, per watt above the mean sink surface, K/W.
    pub rises: [f64; 2],
    /// Heat flux across the interface per watt through the joint, 1/m².
    pub flux: f64,
    /// The same over its mean over all of the interface, 1.
    pub concentration: f64,
}

/// Both faying faces over the plan of the joint.
#[derive(Clone, Debug, PartialEq)]
pub struct HeatMap {
    /// Left, lower, right and upper edge of the window, m.
    pub window: [f64; 4],
    /// Columns and rows.
    pub size: [usize; 2],
    /// Temperature of the warm and of the cold face at cell centres, row by row from below, per
    /// watt above the mean sink surface, K/W; NaN off the faces.
    pub rises: [Vec<f64>; 2],
    /// Heat flux per watt through the joint, 1/m²; likewise.
    ///
    /// Times the area of a cell it adds up to the share of the heat that crosses there, the better
    /// the more cells there are; shanks of bolts carry the rest.
    pub flux: Vec<f64>,
    /// Heat flux over its mean, 1; likewise.
    pub concentration: Vec<f64>,
}

/// Temperatures of both faying faces of an interface and the flux between them in the first case at
/// nominal, `columns` points wide; none for the cone, which solves no temperatures.
///
/// The mean of the flux is that over the whole interface, what lies beside feet included.
pub fn heat_map(
    chain: &Chain,
    interface: usize,
    columns: usize,
) -> Result<Option<HeatMap>, Failure> {
    let window = window(chain.joint());
    let [left, lower, right, upper] = window;
    let step = (right - left) / columns as f64;
    let rows = ((upper - lower) / step).round().max(1.0) as usize;
    let points: Vec<[f64; 2]> = (0..rows)
        .flat_map(|row| {
            let y = lower + (upper - lower) * (row as f64 + 0.5) / rows as f64;
            (0..columns).map(move |column| [left + (column as f64 + 0.5) * step, y])
        })
        .collect();
    let Some(found) = chain.face_points_in(interface, &points)? else {
        return Ok(None);
    };
    let values = |of: &dyn Fn(&FacePoint) -> f64| -> Vec<f64> {
        let each = found.iter();
        each.map(|point| point.as_ref().map_or(f64::NAN, of))
            .collect()
    };
    Ok(Some(HeatMap {
        window,
        size: [columns, rows],
        rises: [
            values(&|point| point.rises[0]),
            values(&|point| point.rises[1]),
        ],
        flux: values(&|point| point.flux),
        concentration: values(&|point| point.concentration),
    }))
}

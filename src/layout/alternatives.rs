//! The joint with larger bolts, one more bolt in each row, or a filler: what may open a shut torque window.

use crate::{
    catalog,
    joint::{Joint, Tightening},
    layout::{
        Constraints, Failure,
        rewritten::{placed, threaded},
    },
    uncertainty::Alternative,
};

/// Next larger threads that are tried.
const LARGER: usize = 2;
/// One filler of each kind that comes off again: grease, foils, pad.
const FILLERS: [&str; 4] = ["filled grease", "graphite foil", "indium foil", "gap pad"];
/// Places nearer than that stand in one row, m.
const SAME: f64 = 1e-6;

/// Reads a joint from its text and further overrides, or tells the first fault.
pub type Again<'a> = dyn Fn(&str, &[String]) -> Result<Joint, String> + 'a;

/// Like joints, each changed in one thing, for a group whose torque is swept.
///
/// What keeps no edge distance, pitch or seat is told with the reason.
pub fn alternatives(
    (joint, group): (&Joint, usize),
    text: &str,
    again: &Again,
) -> Vec<Alternative> {
    if !matches!(joint.fasteners[group].tightening, Tightening::Torque(_)) {
        return Vec::new();
    }
    let mut found = larger((joint, group), text, again);
    found.push(more((joint, group), text, again));
    found.extend(filled(joint, text, again));
    found
}

/// The next larger coarse threads of the same system.
fn larger((joint, group): (&Joint, usize), text: &str, again: &Again) -> Vec<Alternative> {
    let thread = &joint.fasteners[group].thread;
    let mut sizes: Vec<&catalog::Thread> = catalog::threads()
        .iter()
        .filter(|each| each.inch == thread.inch && !each.name.contains(['x', '×']))
        .filter(|each| each.diameter > thread.diameter && each.stress_area > thread.stress_area)
        .collect();
    sizes.sort_by(|one, other| one.diameter.total_cmp(&other.diameter));
    // Inch sizes come coarse and fine: one of each diameter.
    sizes.dedup_by(|one, other| one.diameter <= other.diameter);
    let tried = sizes.into_iter().take(LARGER).map(|size| Alternative {
        change: format!("{} instead of {}", size.name, thread.name),
        joint: read(threaded(text, group, &size.name), again)
            .and_then(|changed| kept(changed, group)),
    });
    tried.collect()
}

/// One more bolt in each row.
fn more((joint, group): (&Joint, usize), text: &str, again: &Again) -> Alternative {
    let places = &joint.fasteners[group].places;
    let denser = denser(places);
    let count = denser.as_ref().map_or(0, Vec::len);
    Alternative {
        change: if count > 0 {
            format!(
                "{count} bolts instead of {}, one more in each row",
                places.len()
            )
        } else {
            "one more bolt in each row".to_owned()
        },
        joint: denser
            .ok_or_else(|| "the bolts stand in no rows".to_owned())
            .and_then(|denser| read(placed(text, group, &denser), again))
            .and_then(|changed| kept(changed, group)),
    }
}

/// Fillers at interfaces that are bare and follow no measurement.
fn filled(joint: &Joint, text: &str, again: &Again) -> Vec<Alternative> {
    if joint.every_filler().next().is_some() || joint.measured.is_some() {
        return Vec::new();
    }
    let tried = FILLERS.iter().map(|name| Alternative {
        change: format!("{name} between the faces"),
        joint: again(text, &[format!("filler.name=\"{name}\"")]),
    });
    tried.collect()
}

fn read(text: Result<String, Failure>, again: &Again) -> Result<Joint, String> {
    again(&text.map_err(|failure| failure.to_string())?, &[])
}

/// A joint whose group keeps edge distance and pitch; why it does not.
fn kept(joint: Joint, group: usize) -> Result<Joint, String> {
    let arrange = joint.arrange.clone().unwrap_or_default();
    let constraints = Constraints::of_group((&joint, group), &arrange);
    let places = &joint.fasteners[group].places;
    let edge = places.iter().map(|place| constraints.place_miss(*place));
    let edge = edge.fold(0.0, f64::max);
    let mut pitch: f64 = 0.0;
    for (index, one) in places.iter().enumerate() {
        for other in &places[..index] {
            pitch = pitch.max(constraints.pair_miss(*one, *other));
        }
    }
    let missed = if edge > 0.0 {
        format!(
            "{:.1} mm are missing to edge, keep-out zone or the next group (axis to edge {:.1} mm)",
            1e3 * edge,
            1e3 * constraints.edge_distance
        )
    } else if pitch > 0.0 {
        format!(
            "{:.1} mm are missing to the pitch of {:.1} mm",
            1e3 * pitch,
            1e3 * constraints.pitch
        )
    } else {
        return Ok(joint);
    };
    Err(missed)
}

/// The same rows with one bolt more each, evenly between their ends; none where the bolts stand in no
/// rows. Rows run along the side on which they are longer.
fn denser(places: &[[f64; 2]]) -> Option<Vec<[f64; 2]>> {
    let span = |side: usize| {
        let along = || places.iter().map(|place| place[side]);
        along().fold(f64::NEG_INFINITY, f64::max) - along().fold(f64::INFINITY, f64::min)
    };
    let first = usize::from(span(1) > span(0));
    [first, 1 - first]
        .into_iter()
        .find_map(|side| denser_along(places, side))
}

fn denser_along(places: &[[f64; 2]], side: usize) -> Option<Vec<[f64; 2]>> {
    let mut sorted = places.to_vec();
    sorted.sort_by(|one, other| {
        one[1 - side]
            .total_cmp(&other[1 - side])
            .then(one[side].total_cmp(&other[side]))
    });
    let mut rows: Vec<Vec<[f64; 2]>> = Vec::new();
    for place in sorted {
        match rows.last_mut() {
            Some(row) if (row[0][1 - side] - place[1 - side]).abs() < SAME => row.push(place),
            _ => rows.push(vec![place]),
        }
    }
    if rows.iter().any(|row| row.len() < 2) {
        return None;
    }
    let denser = rows.iter().flat_map(|row| {
        let ends = [row[0], row[row.len() - 1]].map(|place| place[side]);
        (0..=row.len()).map(move |index| {
            let mut place = row[0];
            let along = ends[0] + (ends[1] - ends[0]) * index as f64 / row.len() as f64;
            // Files state whole micrometres.
            place[side] = (along * 1e6).round() * 1e-6;
            place
        })
    });
    Some(denser.collect())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn rows_get_one_bolt_more_along_their_length() {
        let places = [
            [0.0, 0.0],
            [0.1, 0.0],
            [0.1, 0.04],
            [0.0, 0.04],
            [0.05, 0.04],
        ];
        let denser = denser(&places).unwrap();
        let close = |one: [f64; 2], other: [f64; 2]| {
            (one[0] - other[0]).abs() < 1e-9 && (one[1] - other[1]).abs() < 1e-9
        };
        assert_eq!(denser.len(), 7);
        assert!(close(denser[1], [0.05, 0.0]), "{denser:?}");
        // Whole micrometres of a third of 0.1 m.
        assert!(close(denser[4], [0.033333, 0.04]), "{denser:?}");
        // A row upright has its bolt upright.
        let upright = super::denser(&[[0.0, 0.0], [0.0, 0.1]]).unwrap();
        assert!(close(upright[1], [0.0, 0.05]), "{upright:?}");
        // Neither along nor across are there rows in a triangle.
        assert!(super::denser(&[[0.0, 0.0], [0.1, 0.01], [0.05, 0.08]]).is_none());
    }
}

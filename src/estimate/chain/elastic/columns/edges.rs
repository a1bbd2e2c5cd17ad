//! Where the contact reaches an edge of plate or foot.

use crate::{
    estimate::chain::{PressedEdge, elastic::columns::problem::Order},
    joint::Joint,
    pressure::elastic::Field,
};

/// Share of the peak pressure below which an edge counts as free.
const EDGE_FLOOR: f64 = 0.01;

/// The place of the highest pressure at an edge of the faying faces of an interface, holes not
/// looked at; none where the contact stays inside.
///
/// A column stands at an edge when a step to a neighbouring line leaves plate or foot.
pub(super) fn pressed_edge(
    (joint, interface): (&Joint, usize),
    (field, order): (&Field, Order),
) -> Option<PressedEdge> {
    let own = order.plate(interface, joint.interfaces());
    let (plan, face) = (&field.mesh.plan, &field.faces[own]);
    let floor = EDGE_FLOOR * field.face(own).peak_pressure();
    let meets = |point: [f64; 2]| {
        let mut plates = joint.meeting(interface).into_iter();
        plates.all(|plate| plate.covers(point) && plate.stands_at(point))
    };
    let beside = |lines: &[f64], at: usize| {
        let step = |to: Option<&f64>| to.map_or(f64::INFINITY, |line| (line - lines[at]).abs());
        let width = step(lines.get(at + 1)).min(step(lines.get(at.wrapping_sub(1))));
        [lines[at] - 0.99 * width, lines[at] + 0.99 * width]
    };
    let at_edge = |column: usize| {
        let [i, j] = [column / plan.y.len(), column % plan.y.len()];
        let (xs, ys) = (beside(&plan.x, i), beside(&plan.y, j));
        let [x, y] = plan.place(column);
        xs.iter().any(|x| !meets([*x, y])) || ys.iter().any(|y| !meets([x, *y]))
    };
    (0..face.weight.len())
        .filter(|column| face.pressure[*column] > floor)
        .filter(|column| face.weight[*column] >= 0.5 * face.full_weight[*column])
        .filter(|column| at_edge(*column))
        .max_by(|one, other| face.pressure[*one].total_cmp(&face.pressure[*other]))
        .map(|column| PressedEdge {
            at: plan.place(column),
            pressure: face.pressure[column],
        })
}

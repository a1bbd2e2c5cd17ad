//! Bolts in plan, as drawings show them, with their numbers.

use crate::figures::{
    clip::Frame,
    lettering::{Anchor, Lettering},
    plan::{
        LARGEST, PlanBolt, View, grown,
        parts::{CONTACT, HEAD, HOLE},
    },
    sheet::{INK, LABEL, NARROW, PAPER, Sheet, Stroke, WIDE, circle},
};

const CENTRE: Stroke = Stroke::solid(NARROW, INK);
/// Laid under ink where the field may be as dark as the ink.
const HALO: Stroke = Stroke::solid(1.75, PAPER);
/// Radius of a head, points, below which fine work would clot.
const SMALL: f64 = 10.0;

/// Hole, head, edge of contact and centre lines of one bolt.
pub(super) fn draw(sheet: &mut Sheet, view: &View, bolt: &PlanBolt) {
    let centre = view.point(bolt.at);
    if !view.frame.holds(centre) {
        return;
    }
    let frame = grown(view.frame, 10.0);
    let radius = |metres: f64| (metres * view.points_per_metre).clamp(0.0, 2.0 * LARGEST);
    let ring = |sheet: &mut Sheet, metres: f64, stroke| {
        sheet.circle_within(frame, (centre, radius(metres)), stroke);
    };
    if let Some(contact) = bolt.contact_radius.filter(|r| r.is_finite()) {
        ring(sheet, contact, CONTACT);
    }
    let large = radius(bolt.head_radius) > SMALL;
    if large {
        ring(sheet, bolt.head_radius, HALO);
    }
    ring(sheet, bolt.head_radius, HEAD);
    let hole = circle(centre, radius(bolt.hole_radius));
    sheet.area(frame.area(&hole), view.ground.unwrap_or(PAPER));
    ring(sheet, bolt.hole_radius, if large { HOLE } else { HEAD });
    let radii = [radius(bolt.hole_radius), radius(bolt.head_radius)];
    centre_mark(sheet, frame, centre, radii);
}

/// The centre lines of a hole: a small cross, a gap, and lines out past the head.
fn centre_mark(sheet: &mut Sheet, frame: Frame, centre: [f64; 2], [hole, head]: [f64; 2]) {
    let arm = (0.45 * hole).clamp(1.5, 6.0);
    let (inner, reach) = (arm + 2.0, head.max(hole) + 4.0);
    for [dx, dy] in [[1.0, 0.0], [-1.0, 0.0], [0.0, 1.0], [0.0, -1.0]] {
        let at = |along: f64| [centre[0] + dx * along, centre[1] + dy * along];
        if head > SMALL {
            let line = [at(inner.max(hole + WIDE)), at(reach + 0.5)];
            sheet.line_within(frame, &line, HALO);
        }
        sheet.line_within(frame, &[at(0.0), at(arm)], CENTRE);
        sheet.line_within(frame, &[at(inner), at(reach)], CENTRE);
    }
}

/// Numbers in balloons beside the heads, where one finds room.
pub(super) fn number(sheet: &mut Sheet, view: &View, bolts: &[PlanBolt]) {
    const BALLOON: f64 = 7.5;
    const MOST: usize = 100;
    let shown: Vec<([f64; 2], [f64; 2])> = bolts
        .iter()
        .take(MOST)
        .map(|bolt| {
            let outer = bolt.contact_radius.unwrap_or(0.0).max(bolt.head_radius);
            let radii = [outer, bolt.head_radius].map(|r| r * view.points_per_metre);
            (view.point(bolt.at), radii)
        })
        .collect();
    let mut taken: Vec<[f64; 2]> = Vec::new();
    let apart = |a: [f64; 2], b: [f64; 2]| (a[0] - b[0]).hypot(a[1] - b[1]);
    for (index, (centre, radii)) in shown.iter().enumerate() {
        // Outside the edge of contact where that is free, else beside the head.
        let mut places = [0, 1].iter().flat_map(|kind| {
            [[1.0, -1.0], [-1.0, -1.0], [1.0, 1.0], [-1.0, 1.0]].map(|[dx, dy]| {
                let away = (radii[*kind] + BALLOON + 1.5) * std::f64::consts::FRAC_1_SQRT_2;
                (*kind, [centre[0] + dx * away, centre[1] + dy * away])
            })
        });
        let place = places.find(|(kind, p)| {
            grown(view.frame, -BALLOON - 1.0).holds(*p)
                && taken
                    .iter()
                    .all(|other| apart(*p, *other) > 2.0 * BALLOON + 1.0)
                && shown.iter().enumerate().all(|(other, (c, r))| {
                    other == index || apart(*p, *c) > r[*kind] + BALLOON + 1.0
                })
        });
        let Some((_, place)) = place else { continue };
        taken.push(place);
        sheet.disc(place, BALLOON, PAPER);
        let around = grown(view.frame, 10.0);
        sheet.circle_within(around, (place, BALLOON), Stroke::solid(NARROW, INK));
        let size = LABEL - 2.0;
        let lettering = Lettering::plain(size, INK, Anchor::Middle);
        let at = [place[0], place[1] + 0.36 * size];
        sheet.text(at, (index + 1).to_string(), lettering);
    }
}

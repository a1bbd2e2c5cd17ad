//! The nominal fields of a joint at points and in rings, for drawings and tables.

use crate::{
    estimate::{Chain, Failure, FieldMap, Realisation, RingRow},
    joint::{Joint, Plate},
};

/// Pressure, gap and local conductance of an interface, counted from the warm side, over the window of
/// all plates, `columns` points wide.
pub fn field_map(chain: &Chain, interface: usize, columns: usize) -> Result<FieldMap, Failure> {
    let state = chain.state(0, &Realisation::default())?;
    let pressure = chain.pressure(0, &state)?;
    let peak = chain.interfaces(0, (&state, &pressure))?[interface].peak;
    let local = &state.conditions.faces[interface];
    let faces = local.over_many_points(peak);
    let window = window(chain.joint());
    let [left, lower, right, upper] = window;
    let step = (right - left) / columns as f64;
    let rows = ((upper - lower) / step).round().max(1.0) as usize;
    let mut map = FieldMap {
        window,
        size: [columns, rows],
        pressure: Vec::with_capacity(columns * rows),
        conductance: Vec::with_capacity(columns * rows),
        gap: chain
            .knows_the_gap()
            .then(|| Vec::with_capacity(columns * rows)),
    };
    for row in 0..rows {
        let y = lower + (upper - lower) * (row as f64 + 0.5) / rows as f64;
        for column in 0..columns {
            let x = left + (column as f64 + 0.5) * step;
            let met = chain.met_in(interface, [x, y], &state);
            map.pressure.push(met.map_or(f64::NAN, |met| met.pressure));
            map.conductance
                .push(met.map_or(f64::NAN, |met| match met.gap {
                    Some(gap) if gap > 0.0 => local.local.parted(gap),
                    _ => faces(met.pressure),
                }));
            if let Some(gaps) = &mut map.gap {
                // Beside feet the gap is their height, which would drown the gaps under them.
                let on_feet = chain
                    .joint()
                    .meeting(interface)
                    .iter()
                    .all(|plate| plate.stands_at([x, y]));
                let gap = met.filter(|_| on_feet).and_then(|met| met.gap);
                gaps.push(gap.unwrap_or(f64::NAN));
            }
        }
    }
    Ok(map)
}

/// The rings around every bolt in an interface, in file order.
pub fn ring_tables(chain: &Chain, interface: usize) -> Result<Vec<Vec<RingRow>>, Failure> {
    let state = chain.state(0, &Realisation::default())?;
    Ok(chain.rings(interface, &state))
}

/// The rectangle that holds all plates: left, lower, right, upper, m.
pub(super) fn window(joint: &Joint) -> [f64; 4] {
    joint
        .plates
        .iter()
        .map(Plate::bounds)
        .reduce(|one, other| {
            [
                one[0].min(other[0]),
                one[1].min(other[1]),
                one[2].max(other[2]),
                one[3].max(other[3]),
            ]
        })
        .expect("a joint has two plates")
}

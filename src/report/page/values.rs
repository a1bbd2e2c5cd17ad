//! Values under the pointer: the fields of the maps, thinned to what a reader can point at.

use serde_json::{Value, json};

use crate::{
    report::page::Fields,
    units::{Shown, System},
};

/// Significant digits of a value under the pointer.
const DIGITS: i32 = 3;

/// The fields of a page as JSON that may stand in a script element: no `<` is left in it.
pub(super) fn script(fields: &Fields, units: System) -> String {
    let map = fields.map;
    let told = |name: &str, shown: Shown, values: &[f64]| {
        let unit = units.unit(shown);
        layer((name, unit.name), (values, unit.size.recip()))
    };
    let mut layers = vec![told("pressure", Shown::Pressure, &map.pressure)];
    if let Some(gap) = &map.gap {
        layers.push(told("gap", Shown::Gap, gap));
    }
    layers.push(told(
        "local conductance",
        Shown::Conductance,
        &map.conductance,
    ));
    if let Some(heat) = fields.heat.filter(|heat| heat.size == map.size) {
        let (factor, unit) = match fields.watts {
            Some(watts) => (watts, "K"),
            None => (1.0, "K/W"),
        };
        for (name, values) in ["warm face", "cold face"].into_iter().zip(&heat.rises) {
            layers.push(layer((name, unit), (values, factor)));
        }
        layers.push(layer(
            ("heat flux", "times its mean"),
            (&heat.concentration, 1.0),
        ));
    }
    let length = units.unit(Shown::Length);
    let window = map.window.map(|edge| length.of(edge));
    // A place is told to about a two thousandth of the window.
    let wide = (window[2] - window[0]).max(window[3] - window[1]);
    let places = (3.4 - wide.max(1e-9).log10()).floor().clamp(0.0, 6.0) as u32;
    let object = json!({
        "window": window.map(rounded),
        "length": length.name,
        "places": places,
        "size": map.size,
        "layers": layers,
    });
    object.to_string().replace('<', "\\u003c")
}

fn layer((name, unit): (&str, &str), (values, factor): (&[f64], f64)) -> Value {
    let shown: Vec<Value> = values.iter().map(|value| rounded(value * factor)).collect();
    json!({ "name": name, "unit": unit, "values": shown })
}

/// A value with few digits; null where there is none.
fn rounded(value: f64) -> Value {
    if !value.is_finite() {
        return Value::Null;
    }
    if value == 0.0 {
        return json!(0);
    }
    let step = 10.0_f64.powi(value.abs().log10().floor() as i32 + 1 - DIGITS);
    // Written and read again, so that no digits of the division are left.
    let text = format!(
        "{:.*e}",
        (DIGITS - 1) as usize,
        (value / step).round() * step
    );
    let short: f64 = text.parse().unwrap_or(value);
    if short.fract() == 0.0 && short.abs() < 1e9 {
        json!(short as i64)
    } else {
        json!(short)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn values_keep_three_digits_and_nothing_stays_nothing() {
        assert_eq!(rounded(0.123_456), json!(0.123));
        assert_eq!(rounded(65_432_100.0), json!(65_400_000));
        assert_eq!(rounded(-0.0), json!(0));
        assert_eq!(rounded(f64::NAN), Value::Null);
    }
}

//! How figures tell temperatures: at the heat of the joint, or per watt where none is stated.

use crate::figures::axis::plain;

/// The unit of a temperature.
pub(super) fn unit(heat: Option<f64>) -> &'static str {
    match heat {
        Some(_) => "K",
        None => "K/W",
    }
}

/// What is shown, and at which heat.
pub(super) fn told(heat: Option<f64>) -> String {
    match heat {
        Some(heat) => format!(
            "temperature above the mean sink surface at {}\u{a0}W",
            plain(heat)
        ),
        None => "temperature above the mean sink surface per watt".into(),
    }
}

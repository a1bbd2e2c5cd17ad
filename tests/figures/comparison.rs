//! Joints side by side as a figure.

use ringsum::{
    estimate::Band,
    figures::{ComparisonPlot, ComparisonRow, Drawing, FigureError, PlanMap, png, svg},
};

use crate::{field, furnished};

pub fn comparison() -> ComparisonPlot {
    let row = |(name, nominal): (&str, f64), best: bool| ComparisonRow {
        name: name.into(),
        notes: vec![
            "4 bolts, 0.12 kg".into(),
            "best is better in 97 of 100".into(),
        ],
        band: Band {
            low: Some(0.8 * nominal),
            nominal,
            high: Some(1.3 * nominal),
        },
        best,
        pressure: furnished(PlanMap::pressure("Box", &field())),
    };
    ComparisonPlot {
        title: "Box on panel".into(),
        subtitle: "source to sink and contact pressure".into(),
        rows: vec![
            row(("as stated", 0.21), false),
            row(
                (
                    "eight bolts with a name so long that it takes a second line",
                    0.15,
                ),
                true,
            ),
        ],
        required: Some(0.25),
    }
}

fn drawn(plot: ComparisonPlot) -> Result<String, FigureError> {
    svg(&Drawing::Comparison(Box::new(plot)))
}

#[test]
fn bands_maps_and_requirement_are_all_there() {
    let text = drawn(comparison()).expect("it is drawn");
    for word in [
        "as stated",
        "4 bolts, 0.12 kg",
        "source to sink, K/W",
        "contact pressure, MPa",
        "nominal in the band from 5 % to 95 %",
        "requirement",
        "0.2100",
    ] {
        assert!(text.contains(word), "{word}");
    }
    // One picture for each map and one for the bar.
    assert_eq!(text.matches("<image").count(), 3);
    let drawing = Drawing::Comparison(Box::new(comparison()));
    assert_eq!(
        png(&drawing).expect("pixels"),
        png(&drawing).expect("pixels")
    );
}

#[test]
fn what_cannot_be_drawn_is_an_error() {
    let mut infinite = comparison();
    infinite.rows[0].band.high = Some(f64::INFINITY);
    assert!(matches!(drawn(infinite), Err(FigureError::NotFinite(_))));
    let mut empty = comparison();
    empty.rows.clear();
    assert!(matches!(drawn(empty), Err(FigureError::Empty(_))));
    let mut short = comparison();
    short.rows[1].pressure.values.pop();
    assert!(matches!(drawn(short), Err(FigureError::Shape(_))));
    let mut single = comparison();
    single.required = None;
    for row in &mut single.rows {
        row.band = Band {
            low: None,
            nominal: row.band.nominal,
            high: None,
        };
    }
    let text = drawn(single).expect("bars are no must");
    assert!(!text.contains("from 5 %") && !text.contains("requirement"));
}

//! A radiating back in the joint file: which of sink and surroundings follows from the heat.

use crate::{
    joint::{
        Case, RadiatingBack,
        collector::{Collector, Wording, fault},
        plates::PlateDraft,
        radiative_film,
        record::Record,
        walk::missing,
    },
    units::{self, Quantity},
};

/// A radiating back with its table.
#[derive(Debug)]
pub(in crate::joint) struct Radiating {
    back: RadiatingBack,
    /// Stated temperature of the surroundings, K.
    surroundings: Option<f64>,
    record: Record,
    plate: String,
}

/// Reads the radiation of the last plate; none where it does not radiate.
pub(super) fn read(last: &PlateDraft, collector: &mut Collector) -> Option<Radiating> {
    let records = last.record.records("cooled");
    let record = records.iter().find_map(|each| each.record("radiation"))?;
    let outline = last.outline.as_ref()?;
    let cutouts = last.parts.iter().flat_map(|parts| &parts.cutouts);
    let openings: f64 = cutouts.map(|(cutout, _)| cutout.area()).sum();
    let surroundings = record.number("temperature");
    if record.has("temperature") && surroundings.is_none() {
        return None;
    }
    let back = RadiatingBack {
        emissivity: record.number("emissivity")?,
        film: records.iter().filter_map(|each| each.number("film")).sum(),
        area: (outline.area() - openings).max(0.0),
    };
    if back.area <= 0.0 {
        // The openings are refused elsewhere.
        return None;
    }
    collector.assume(
        record.path.clone(),
        format!(
            "the whole back, {} mm², linear about the mean sink surface",
            (back.area * 1e6).round()
        ),
        "the flux grows with the slope 4 ε σ T³; outline less cut-outs, ribs see each other and add nothing",
    );
    Some(Radiating {
        back,
        surroundings,
        record: record.clone(),
        plate: last.name.clone(),
    })
}

impl Radiating {
    /// The case whose sink surface follows from surroundings and heat; the outer option is none
    /// when nothing follows, the inner one when it should but cannot.
    #[expect(
        clippy::option_option,
        reason = "not asked for and faulty are two things"
    )]
    pub(in crate::joint) fn surface(
        &self,
        (service, temperatures): (&Record, &Record),
        heat: Option<f64>,
        collector: &mut Collector,
    ) -> Option<Option<Case>> {
        let surroundings = self.surroundings?;
        let stated = ["sink", "hot", "cold"]
            .into_iter()
            .find(|key| temperatures.has(key));
        if let Some(key) = stated {
            collector.report(
                fault(
                    "file/conflict",
                    &self.record.span("temperature"),
                    format!("surroundings are stated beside `{}`", temperatures.at(key)),
                )
                .expecting("expected one of the two")
                .help("the sink surface follows from surroundings and heat, or the surroundings from the other two"),
            );
            return Some(None);
        }
        let Some(heat) = heat else {
            if !service.has("heat") {
                collector.report(missing(service, "heat", "heat = \"22 W\"").help(
                    "the temperature of a radiating sink follows from the heat: `heat = \"22 W\"`; or state \
                     `service.temperature`",
                ));
            }
            return Some(None);
        };
        let Some(temperature) = self.back.surface(surroundings, heat) else {
            collector.report(self.too_much(heat, "any temperature"));
            return Some(None);
        };
        collector.assume(
            temperatures.at("sink"),
            units::show(temperature, Quantity::Temperature),
            format!(
                "from the balance: {} leave by radiation{} to {}",
                units::show(heat, Quantity::Power),
                if self.back.film > 0.0 {
                    " and film"
                } else {
                    ""
                },
                units::show(surroundings, Quantity::Temperature)
            ),
        );
        Some(Some(Case {
            name: "service",
            temperature,
        }))
    }

    /// Tells the surroundings that belong to stated sink temperatures, or that none do.
    pub(in crate::joint) fn tell_surroundings(
        &self,
        cases: &[Case],
        heat: Option<f64>,
        collector: &mut Collector,
    ) {
        let (None, Some(heat)) = (self.surroundings, heat) else {
            return;
        };
        let mut told = Vec::new();
        for case in cases {
            let Some(found) = self.back.surroundings(case.temperature, heat) else {
                let shown = units::show(case.temperature, Quantity::Temperature);
                collector.report(self.too_much(heat, &shown));
                return;
            };
            let shown = units::show(found, Quantity::Temperature);
            told.push(if cases.len() > 1 {
                format!("{}: {shown}", case.name)
            } else {
                shown
            });
        }
        let film = radiative_film(self.back.emissivity, cases[0].temperature);
        collector.assume(
            self.record.at("temperature"),
            told.join(", "),
            format!(
                "not stated; these surroundings take {} from the sink surface, and move no resistance (slope {})",
                units::show(heat, Quantity::Power),
                units::show(film, Quantity::FilmCoefficient)
            ),
        );
    }

    fn too_much(&self, heat: f64, at: &str) -> crate::diagnostic::Fault {
        fault(
            "cooled/too-much-heat",
            &self.record.place,
            format!(
                "plate `{}` cannot give off {} at {at}, even to surroundings at absolute zero",
                self.plate,
                units::show(heat, Quantity::Power)
            ),
        )
        .expecting("expected less heat, a warmer sink or a larger back")
        .help(
            "state the surroundings instead of `service.temperature`: \
             `radiation = { emissivity = 0.8, temperature = \"-60 °C\" }`; the sink then takes the temperature it needs",
        )
    }
}

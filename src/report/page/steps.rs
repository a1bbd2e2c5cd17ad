//! The chain of a page, step by step: what was done, with which numbers, by which laws.

use crate::{
    diagnostic::registry::{self, Entry},
    estimate::{CaseResult, Estimate},
    joint::{ConeRule, Contact, FillerKind, Friction, Joint, Law, Medium, Tightening},
    report::number::{four, optional, percent, spread},
};

/// One step.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Step {
    /// What is found in it.
    pub(super) title: &'static str,
    /// How, and what came of it.
    pub(super) told: Vec<String>,
    /// The laws.
    pub(super) laws: Vec<&'static Entry>,
}

/// The steps in the order in which force and heat flow; the numbers are those of the first case.
pub(super) fn steps(joint: &Joint, estimate: &Estimate) -> Vec<Step> {
    let Some(case) = estimate.cases.first() else {
        return Vec::new();
    };
    vec![
        preload(joint, case),
        service(joint, case),
        pressure(joint, (estimate, case)),
        conductance(joint, case),
        heat(estimate, case),
        scatter(estimate, case),
    ]
}

fn step(title: &'static str, told: Vec<String>, laws: &[&str]) -> Step {
    let mut found: Vec<&'static Entry> = Vec::new();
    for law in laws {
        let entry = registry::entry(law);
        found.extend(entry.filter(|entry| !found.contains(entry)));
    }
    Step {
        title,
        told,
        laws: found,
    }
}

fn preload(joint: &Joint, case: &CaseResult) -> Step {
    let mut told = Vec::new();
    let mut laws = Vec::new();
    let mut first = 0;
    for group in &joint.fasteners {
        let bolt = case.bolts.get(first);
        first += group.places.len();
        let name = crate::estimate::group_label(group);
        let force = bolt.map_or_else(String::new, |bolt| spread(&bolt.force, 1e3));
        match &group.tightening {
            Tightening::Torque(torque) => {
                laws.push(match torque.friction {
                    Friction::Coefficients { .. } => "law/torque",
                    Friction::NutFactor(_) => "law/nut-factor",
                });
                told.push(format!(
                    "{name}: {} N·m at the wrench, {} N·m of it running torque, tool ± {}: clamp force {force} kN at assembly.",
                    four(torque.torque),
                    four(torque.running),
                    percent(torque.tolerance),
                ));
            }
            Tightening::Preload(_) => {
                told.push(format!("{name}: clamp force {force} kN, as stated."));
            }
        }
        if let Some([nominal, highest]) = bolt.and_then(|bolt| bolt.strength_use) {
            laws.push("law/strength-use");
            told.push(format!(
                "Tightening takes {} of the yield strength, {} at the highest force.",
                percent(nominal),
                percent(highest)
            ));
        }
    }
    step("Torque to clamp force", told, &laws)
}

fn service(joint: &Joint, case: &CaseResult) -> Step {
    let mut laws = vec!["law/settling"];
    if joint
        .fasteners
        .iter()
        .any(|group| group.axial_load.is_some())
    {
        laws.push("law/axial-load");
    }
    if joint
        .fasteners
        .iter()
        .any(|group| group.disc_springs.is_some())
    {
        laws.push("law/disc-spring");
    }
    let clamping = case.bolts.iter().find(|bolt| !bolt.missing);
    let force = clamping.map_or_else(
        || "–".to_owned(),
        |bolt| spread(&bolt.force_in_service, 1e3),
    );
    let losses = if joint.losses.is_some() {
        laws.push("law/interaction");
        "Settling, relaxation and temperature act in all three forces"
    } else {
        "Temperature acts in all three forces; settling and relaxation act in the least force alone, because the file asks for no [losses]"
    };
    let told = vec![format!(
        "{losses}. In service a bolt holds {force} kN ({} case).",
        case.name
    )];
    step("Clamp force in service", told, &laws)
}

fn pressure(joint: &Joint, (estimate, case): (&Estimate, &CaseResult)) -> Step {
    let found = &case.pressure;
    let mut laws = Vec::new();
    let mut told = Vec::new();
    if estimate.field == "cone" {
        laws.push("law/cone");
        told.push(match joint.contact.cone {
            ConeRule::Fitted => "A closed form puts a cone of pressure around every bolt; it knows no gap beside it.".to_owned(),
            ConeRule::HalfAngle(angle) => format!(
                "A closed form puts a cone of pressure around every bolt, half-angle {} degrees as stated; it knows no gap beside it.",
                four(angle.to_degrees())
            ),
            ConeRule::Vdi => "A closed form puts a cone of pressure around every bolt, with the angle of the stiffness cone; it knows no gap beside it.".to_owned(),
        });
    } else {
        laws.push("law/elastic-contact");
        told.push("Elastic contact of the whole plates is solved: faces press and do not pull, and part where nothing presses them together.".to_owned());
        if joint.plates.iter().any(|plate| {
            plate.bow.is_some()
                || plate.flatness.is_some()
                || plate.flatness_map.is_some()
                || plate.sag.is_some()
        }) {
            laws.push("law/initial-gap");
        }
    }
    told.push(format!(
        "Pressure at most {} MPa, contact on {} mm², 95 % of the force within {} mm of a bolt axis.",
        four(found.peak / 1e6),
        four(found.contact_area * 1e6),
        four(found.radius_95 * 1e3),
    ));
    if let (Some(mean), Some(widest)) = (found.gap_mean, found.gap_max) {
        told.push(format!(
            "Gap between the faces {} µm on average, {} µm at the widest.",
            four(mean * 1e6),
            four(widest * 1e6)
        ));
    }
    step("Clamp force to pressure and gap", told, &laws)
}

fn conductance(joint: &Joint, case: &CaseResult) -> Step {
    let mut laws = Vec::new();
    let bare = (0..joint.interfaces()).any(|interface| joint.is_bare(interface));
    // Own measurements stand for the laws of bare contact.
    if bare && joint.measured.is_none() {
        laws.extend(spots(&joint.contact));
    }
    for filler in joint.every_filler() {
        laws.push(match filler.kind {
            FillerKind::Fluid { .. } => "law/fluid",
            FillerKind::Foil { .. } => "law/foil",
            FillerKind::Layer { .. } | FillerKind::Paste { .. } | FillerKind::Table { .. } => {
                "law/paste"
            }
        });
    }
    if bare {
        if let Medium::Gas { .. } = joint.service.medium {
            laws.push("law/gas-gap");
        }
        laws.push("law/radiation");
    }
    let plated = (0..joint.interfaces()).any(|interface| {
        let finishes = joint.finishes(interface);
        finishes.iter().any(|finish| finish.coating.is_some())
    });
    if plated {
        laws.push("law/plating");
    }
    let medium = joint.service.medium.word();
    let mut told = vec![match &joint.measured {
        Some(_) => "Own measurements of the file stand for the laws.".to_owned(),
        None => format!(
            "At every place pressure and gap give a local conductance: solid spots where the faces touch, {medium} and radiation beside them, or what fills the gap."
        ),
    }];
    for interface in &case.interfaces {
        told.push(format!(
            "Summed over the faces of {}: {} W/K. This is contact only; no spreading is in it.",
            interface.between(),
            four(interface.contact)
        ));
    }
    step("Pressure and gap to local conductance", told, &laws)
}

/// The laws of bare contact.
fn spots(contact: &Contact) -> [&'static str; 3] {
    [
        match contact.law {
            Law::ElasticPlastic => "law/elastic-plastic",
            Law::Plastic => "law/plastic",
            Law::Elastic => "law/elastic",
            Law::PlasticPower => "law/plastic-power",
        },
        "law/microhardness",
        "law/slope",
    ]
}

fn heat(estimate: &Estimate, case: &CaseResult) -> Step {
    let mut laws = vec!["law/planes"];
    let how = if estimate.field == "cone" {
        laws.extend(["law/cell", "law/ring-network", "law/lower-bound"]);
        "Heat through the plates is a network of rings and cells"
    } else {
        laws.push("law/conduction");
        "Heat through the plates is solved in full on the grid of the contact"
    };
    let told = vec![
        format!(
            "{how}, from {} to {}. Numerical error {} of source to sink.",
            estimate.source_plane,
            estimate.sink_plane,
            percent(case.numerical_error)
        ),
        format!(
            "Source to sink {} K/W at nominal; proved lower bound for this field {} K/W.",
            four(case.results.source_to_sink.resistance.nominal),
            optional(case.resistance_lower)
        ),
    ];
    step("Local conductance to resistance", told, &laws)
}

fn scatter(estimate: &Estimate, case: &CaseResult) -> Step {
    let told = if estimate.draws == 0 {
        vec!["Nominal inputs alone: no low and high were drawn.".to_owned()]
    } else {
        let mut told = vec![format!(
            "{} whole joints are drawn with a scrambled Sobol sequence from seed {} and run through the chain; bolts {}. Low and high are the 5 % and 95 % quantiles, widened to hold the nominal.",
            estimate.draws, estimate.seed, estimate.bolts_scatter
        )];
        if let Some(error) = case.draw_error {
            told.push(format!(
                "Draws are read from surfaces through solved states, off by {} at most at the states solved to check them.",
                percent(error)
            ));
        }
        told
    };
    step("Scatter of inputs to low and high", told, &[])
}

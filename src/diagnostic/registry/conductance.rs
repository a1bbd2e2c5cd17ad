//! Cautions on the conductance of the faces.

use crate::diagnostic::registry::{
    Entry,
    Gravity::{Note, Range},
};

pub(super) const ENTRIES: &[Entry] = &[
    Range.entry(
        "conductance/law-range",
        "Pressure outside the range of the contact law",
        [
            "The published power laws were fitted for relative pressures P/H of 10⁻⁶ to 0.02 (24 MPa on \
             aluminium); bolts reach 60 to 130 MPa under the head. The exact Gaussian integrals are \
             used there instead: the fit would be 4, 7 and 11 % low at 0.05, 0.08 and 0.11. No \
             measurements back either that far up.",
            "Nothing to do for multi-bolt plates, where contact this good hardly limits heat. For \
             small coupons widen the scatter.",
        ],
    ),
    Range.entry(
        "conductance/beyond-hardness",
        "The pressure nears the hardness of the softer face",
        [
            "At half the hardness the true contact is half of the area, neighbouring spots merge, \
             and theories of separate spots end. The value at that pressure is kept for anything \
             above.",
            "Check the clamp force and the seat: pressures like this usually mean that the plate \
             yields under the head. Otherwise take the joint there as perfect contact.",
        ],
    ),
    Range.entry(
        "conductance/slope-range",
        "Slope rule used outside its roughness range",
        [
            "The slope of the asperities was not given and follows from roughness, m = 0.125 σ^0.402 \
             (σ in µm), which is stated for Rq of 0.216 to 9.6 µm. Other published rules differ from \
             it by a factor 2.8 at the smooth end; conductance is proportional to slope.",
            "Measure the slope with the roughness (Rdq of the profile) and state it.",
        ],
    ),
    Range.entry(
        "conductance/light-load",
        "Very light load",
        [
            "Below P/H = 10⁻⁶ the faces rest on their few highest peaks. Gaussian statistics do not \
             hold for them: in vacuum below about 0.4 MPa the models are known to give too little.",
            "Take the solid part as a lower bound, and measure if the joint depends on it.",
        ],
    ),
    Note.entry(
        "conductance/finish-not-measured",
        "The faces were not measured",
        [
            "Roughness, slope and microhardness come from a drawing or a catalogue. Slope rules \
             differ by 1.9 to 2.8, microhardness by 1.3 to 2. For an unmeasured machined face a \
             factor 2 of local conductance either way is honest; tables in textbooks differ more \
             than that among themselves.",
            "Measure Rq and slope of both faces after their last treatment. In a multi-bolt joint \
             look first at `drivers`: the contact may hardly matter.",
        ],
    ),
    Range.entry(
        "filler/creep",
        "The filler creeps",
        [
            "Pads, foils, pastes and adhesives flow under pressure, most in the first days and when \
             warm. The bolt loses clamp force as the filler thins: what is gained in bond line is \
             lost in preload.",
            "Re-torque after a warm soak if the maker allows it, use disc springs, or \
             let metal stops carry the clamp force.",
        ],
    ),
    Range.entry(
        "filler/fluid-in-a-wide-gap",
        "A fluid is reckoned to fill a wide gap",
        [
            "A filler of the model `fluid` wets both faces at any opening, so that it conducts through its own \
             depth wherever the faces stand apart, beside feet too. A film as it is spread fills some 50 µm; \
             beyond that there is no more of it than was applied.",
            "State it as a paste with `applied`: the medium then crosses what it does not fill. Or see to it \
             that the gap is really filled.",
        ],
    ),
    Range.entry(
        "filler/outside-table",
        "Pressure outside the table of the filler",
        [
            "The value at the nearest end of the table is kept; nothing is extended beyond what was \
             measured. Between the bolts the pressure is near zero, below the first row of most \
             tables.",
            "Add a row at low pressure, or the maker's value at zero pressure, since most of the \
             area lies there.",
        ],
    ),
    Range.entry(
        "filler/paste-range",
        "Paste outside the range of its bond-line law",
        [
            "The scaling of bond line with pressure holds for about 0.1 to 1 MPa. Above it the \
             largest filler particles (10 to 40 µm, from memory) set the thickness; where the faces \
             stand apart the paste keeps the thickness it was applied with, or the gap.",
            "State `thinnest` from the particle size and `applied` from the stencil or roller; \
             spread thinly.",
        ],
    ),
    Range.entry(
        "filler/foil-flows",
        "A foil pressed beyond its hardness",
        [
            "Up to its hardness a soft foil yields under the asperities only. Beyond that it flows as a whole: it \
             thins under the heads and creeps out from there, and the bolt loses force as it does. The law holds \
             its boundaries at their value and keeps its thickness, both on the side of more resistance; most \
             of what is left is the foil itself, and that is little.",
            "Tighten again after a day and after the first heat. Contain the foil in a groove, or take wider \
             washers or less torque.",
        ],
    ),
    Range.entry(
        "measured/outside-range",
        "Pressure outside the measured range",
        [
            "The end values of your own data are kept beyond their ends. The slope there is not \
             continued, because it is where measurements are least sure.",
            "Measure down to the pressures between the bolts and up to those under the heads, or \
             accept the law for comparison.",
        ],
    ),
];

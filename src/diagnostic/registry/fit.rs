//! Faults in tables of measured points, and cautions on fits.

use crate::diagnostic::registry::{
    Entry,
    Gravity::{Grave, Note, Range, Standing},
    fault,
};

pub(super) const ENTRIES: &[Entry] = &[
    fault(
        "measured/no-torque",
        "A measured law of torque beside a stated preload",
        "The conductance is stated at a torque, and a fastener states its clamp force: what torque it \
         would take is not known.",
        "State the reference force in the law, or tighten the fastener by torque.",
    ),
    fault(
        "points/heading",
        "The heading of the measured points cannot be used",
        "The first line names each column with its unit in brackets: `pressure [MPa]`, `force [kN]` \
         (of one bolt) or `torque [N·m]`; `h [W/(m²·K)]`, `R [K·cm²/W]`, `conductance [W/K]` or `R [K/W]`; \
         and if known `sigma [%]` (one standard deviation, or in the unit of the value), `direction`, \
         `specimen`.",
        "Name every column once, with its unit. Columns are separated by `,`, `;` or tabs.",
    ),
    fault(
        "points/row",
        "A measured point cannot be read",
        "Every line below the heading is one reading, with one cell for each column: numbers above zero \
         with a decimal point and without unit, the direction as `loading` or `unloading`. Everything is \
         fitted in logarithms, so that a load of zero has no place.",
        "Write decimal points, and leave out what was not measured. Lines that begin with # are passed over.",
    ),
    fault(
        "points/too-few",
        "Too few or too many measured points",
        "A table holds at least one reading and at most ten thousand.",
        "Give the readings, not their number; average what a logger repeats.",
    ),
    Grave.entry(
        "fit/not-determined",
        "The measurements do not determine the unknown",
        [
            "The 90 % interval is the whole range in which the unknown was sought: any value explains \
             the readings about as well. Mostly the unknown hardly moves what was measured, because \
             heat spreads in the plates and the faces are a few per cent of the resistance, or other \
             inputs such as friction leave as much open as the unknown could tell.",
            "Do not use the likeliest value. Measure what the unknown moves: the faces alone on \
             a coupon, at several loads, in vacuum; state closely what else is uncertain.",
        ],
    ),
    Range.entry(
        "fit/one-sided",
        "The measurements bound the unknown on one side",
        [
            "One end of the 90 % interval is the end of the range. Beyond some value the unknown no \
             longer moves what was measured, or the range ends too early.",
            "Widen --from and --to where values beyond make sense; otherwise use the bound and not \
             the likeliest value.",
        ],
    ),
    Range.entry(
        "fit/several-ranges",
        "Several values explain the measurements alike",
        [
            "The likelihood has more than one top: what was measured first rises and then falls with \
             the unknown.",
            "Narrow --from and --to to the values that can be, or measure at another load.",
        ],
    ),
    Range.entry(
        "fit/model-misfit",
        "No value of the unknown explains the measurements",
        [
            "Even at the likeliest value the readings miss the model by more than their standard \
             deviations and the other inputs allow. Either `sigma` is too small, or the model lacks \
             something else.",
            "Check planes, units and the standard deviations; fit another unknown. The interval \
             rests on a model that was refuted.",
        ],
    ),
    Range.entry(
        "fit/coarse-profile",
        "The model was missed between its solved values",
        [
            "The likelihood is read from a curve through solved values of the model; where it was held \
             against the model it missed by more than a twentieth of what the readings leave open.",
            "Narrow --from and --to around the likeliest value.",
        ],
    ),
    Range.entry(
        "fit/outlier",
        "A reading stands apart",
        [
            "Its distance from the law of the other readings exceeds what chance gives in one of \
             twenty sound tables of this size (studentised deleted residual, threshold of Bonferroni, \
             readings taken in from the soundest half outwards so that outliers cannot mask one another). \
             It is kept: only who measured can know whether it is wrong.",
            "Look into the record of that reading. `--without LINE` leaves it out and says so.",
        ],
    ),
    Range.entry(
        "fit/curved",
        "The readings are no power law",
        [
            "A square term in the logarithm of the load is larger than chance gives in one of twenty \
             straight tables. A law drawn through a bend is wrong at both ends and in the middle.",
            "`--as table` follows the readings; or fit a narrower range.",
        ],
    ),
    Range.entry(
        "fit/scatter-understated",
        "The readings scatter more than stated",
        [
            "Chi squared is larger than chance gives in one of forty tables: either `sigma` leaves out \
             a part (mounting, thermocouples, drift) or the law does not fit. Bands and scatter are \
             widened to what the residuals show.",
            "Look for what `sigma` leaves out, and at the drawing for a bend.",
        ],
    ),
    Note.entry(
        "fit/scatter-overstated",
        "The readings scatter less than stated",
        [
            "Chi squared is smaller than chance gives in one of forty tables: `sigma` holds a part that \
             all readings share, such as a calibration, or is set on the safe side. It is kept.",
            "A shared part does not average out over readings: keep it out of `sigma` and add it to \
             the scatter of the block.",
        ],
    ),
    Range.entry(
        "fit/falling",
        "The conductance falls with load",
        [
            "The exponent is below zero with 95 % confidence. Faces pressed harder conduct better; a \
             fall tells of drift, a slipped column, or resistance taken for conductance.",
            "Check the columns and the order of the readings. Do not use the law.",
        ],
    ),
    Range.entry(
        "fit/hardly-rising",
        "The conductance hardly follows the load",
        [
            "The exponent may be zero within its 90 % interval. Bare faces conduct with about the 0.95th power of \
             the pressure, films and soft fillers with less; readings from heater to sink, or between sensors in the \
             plates, hold what the plates resist and hardly move. A block is taken as what the faces \
             conduct alone: made of such readings it counts the plates twice.",
            "Hold such readings against the whole joint: `ringsum fit joint.toml points.csv --unknown roughness`. \
             Take the block where the readings are of the faces alone, and measure over a wider range of loads.",
        ],
    ),
    Note.entry(
        "fit/levelled",
        "Rows of a table were put level",
        [
            "A joint file takes tables that do not fall. Neighbouring rows that fell as the load rose \
             were replaced by their weighted mean, the nearest table that does not fall.",
            "Nothing to do where the fall lies within the scatter; otherwise look for drift.",
        ],
    ),
    Range.entry(
        "fit/hysteresis",
        "Unloading conducts better than loading",
        [
            "Asperities that gave way under load stay flat: on the way down the faces conduct better, by \
             up to a factor of two or three at light load (from memory). Both branches are fitted apart.",
            "Take loading for a joint tightened once, unloading where it was tightened higher and \
             has lost clamp force. `--branch` chooses which one is written.",
        ],
    ),
    Standing.entry(
        "fit/one-specimen",
        "All readings are of one specimen",
        [
            "The scatter holds what one specimen repeats; specimens and assemblies mostly differ by more.",
            "Measure several specimens, name them in a column `specimen`, and raise the scatter of the \
             block until then.",
        ],
    ),
];

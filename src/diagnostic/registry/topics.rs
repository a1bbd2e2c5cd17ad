//! Topics of the handbook that a user asks for: the joint file, the field, spreads, many files.

use crate::diagnostic::registry::{Entry, Kind};

/// An entry of a topic: code, title, and how it is used with what to know beside it. Paragraphs
/// stand an empty line apart.
const fn topic(
    code: &'static str,
    title: &'static str,
    [meaning, remedy]: [&'static str; 2],
) -> Entry {
    Entry {
        code,
        kind: Kind::Topic,
        title,
        meaning,
        remedy,
        law: None,
    }
}

pub(super) const ENTRIES: &[Entry] = &[
    topic(
        "topic/joint-file",
        "What stands in a joint file",
        [
            "`ringsum new my_joint.toml` writes a commented one, `--from-demo NAME` a demo. Every value \
             carries its unit (\"1.7 N·m\", \"15 in·lbf\", \"Ra 0.8 µm\", \"#4-40\"); a bare number is refused \
             with the fix. All faults are told at once, each with file, line, column, what was found, what \
             is expected and an example. What the file leaves out is filled in and listed as an assumption.\
             \n\n\
             A plate is a rectangle, a disc or an `outline` by points, with `cutouts`, `feet` and `ribs`. Its \
             face is flat, has a `bow`, or a measured `flatness_map`: a table beside the joint file with the \
             header `x [mm], y [mm], z [µm]`, z positive towards the other plate. `sag` curves it by the heat \
             through it or by a second layer. joints/bracket_feet.toml and joints/bowed_base.toml show them.\
             \n\n\
             Under `[contact]` stand `law`, `head_model`, `faces` and `compliance`; a pad may state its \
             `modulus`. What is not stated (rigid heads, stuck faces, asperities that give, flatness convex \
             or concave) widens low and high.",
            "Limits of size: 3 m along a plate, 0.5 m of thickness or of height of ribs and feet, a thickness \
             from 50 µm to ten times the shortest side, seats of ten thread diameters. `ringsum schema` prints \
             the JSON Schema; joints/joint.schema.json gives completion in editors that read `#:schema`. `--set \
             key=value` overrides any field, and `-` reads the file from standard input.",
        ],
    ),
    topic(
        "topic/heat",
        "Where heat enters and leaves",
        [
            "Several heated zones: `heated = [{ centre = …, size = …, heat = \"12 W\" }, …]`; each has uniform \
             flux, overlaps add, the sum is the heat of the joint.\
             \n\n\
             Channel, heat pipe, spot: `cooled = { film = …, centre = …, size = … }`, or `temperature` in place \
             of `film`, in the coordinates of the cold plate.\
             \n\n\
             Edges: `cooled = { edge = [\"left\", \"right\"] }`, \"lower\", \"upper\", \"all\"; \"rim\" of a round \
             plate.\
             \n\n\
             Radiation: `cooled = { radiation = { emissivity = 0.8, temperature = \"-60 °C\" } }`; the sink takes \
             the temperature that gives off the heat. State that temperature instead, and the surroundings \
             are told.\
             \n\n\
             Several sinks: an array of such tables, all to one temperature.\
             \n\n\
             Layered plate: `conductivity = { in_plane = …, through = … }` in place of the material's.\
             \n\n\
             Paste of stated bond line: `[filler] bond_line = \"100 µm\"`; it also fills openings up to that. \
             Cured or solid with `model = \"layer\"`. Soft foil that yields: `[filler] name = \"indium foil\"`, \
             `model = \"foil\"`; any other with `conductivity`, `thickness` and `hardness`.\
             \n\n\
             Isolating washers: `isolating = { material = \"G-10\", thickness = \"1 mm\" }` in a `[fastener]`.",
            "joints/led_bar.toml shows most of them. Of these `--field cone` takes the washers and one film or \
             rim, and refuses the others. Half or more of a heated or cooled zone lies on metal; one narrower \
             than 1.5 thicknesses of its plate is told with what it may leave out.",
        ],
    ),
    topic(
        "topic/stacks",
        "More than two plates, and sandwich panels",
        [
            "Up to six plates make a stack: box, shim and shelf. Each has its own finish (`finish_below` for the \
             other face of a plate between others), each interface a filler of its own (`[[filler]]` with \
             `between = [\"shim\", \"shelf\"]`) or none. One elastic field and one heat solution hold them all; \
             contact only is the series of the interfaces, and each is told for itself. Bolts clamp the whole \
             stack, own measurements are for two plates, and where a plate between others ends, its \
             neighbours exchange no heat beside it. joints/avionics_shim.toml shows one.\
             \n\n\
             The first or the last plate may be a sandwich panel: `sandwich = { face_sheet = \"0.5 mm\", \
             core_conductivity = \"1.6 W/(m·K)\" }`, two face sheets of the plate's material on a honeycomb or \
             foam core, `thickness` the whole. Bolts end in inserts: `engagement = { kind = \"insert\", length = \
             \"12 mm\", flange = \"14 mm\", proud = \"20 µm\" }`.",
            "Sheets, core and inserts are bonded layers to contact and heat alike: the force stays on the stiff \
             flange, heat spreads in the sheet and drips through the core, and an insert that stands proud \
             keeps the faces apart beside it. The insert counts as solid below its flange over its length, \
             potting included; core and insert conduct as at room temperature. joints/honeycomb_panel.toml \
             shows one.",
        ],
    ),
    topic(
        "topic/field",
        "Solved field or closed form, and how finely",
        [
            "`estimate`, `torque`, `draw` and the other commands solve the elastic contact of the whole plates \
             and the heat through them in three dimensions unless told `--field cone`. One round bolt in \
             round plates is solved in radius and height. `--resolution fast | normal | fine` sets the grid; \
             the difference to the next coarser grid is the numerical error. `--draws 0` leaves out low and \
             high and with them most of the waiting. `--memory` bounds what the field may take. A joint that \
             mirrors is solved on a half or a quarter. The report tells whether bow or stated flatness closes \
             under the bolts, and what the cone would have said.\
             \n\n\
             The closed form puts a cone of pressure around every bolt and takes plates as sheets. It knows \
             neither the gap that opens between bolts nor edges and neighbours, and says so in its cautions. \
             It passes over a bow and a flatness with a caution, and refuses what it cannot carry: more than two \
             plates, outlines, cut-outs, feet, ribs, sandwiches, maps of flatness, sag, several sources or sinks.",
            "Use the cone to look at many variants, which takes milliseconds; decide on the solved field. In \
             gas the gap between the bolts decides, so that more torque may be worse; `torque` finds the best \
             one between its rows, `estimate --media vacuum,air` puts media side by side. The cone's band is widened for it, and where bow or \
             flatness is large no requirement counts as met.",
        ],
    ),
    topic(
        "topic/spreads",
        "Uncertain inputs, and what low and high mean",
        [
            "Nearly every value may carry its spread, thickness, bow, flatness, film and gas pressure among \
             them: \"5 mm ± 0.1 mm\", \"500 W/(m²·K) ± 30 %\", \"Ra 0.8 µm to 1.6 µm\" (even weight between the \
             ends), or a table: `{ low = …, high = …, distribution = \"triangular\" }`, `{ nominal = …, sigma = \
             \"5 %\", distribution = \"lognormal\" }`. Nominal is the median; normal and lognormal end at three \
             sigma. `[uncertainty] bolts = \"independent\"` lets every bolt scatter for itself.\
             \n\n\
             Low and high of a resistance are the 5 % and 95 % quantiles of drawn joints from a fixed seed, \
             widened to hold the nominal. Least and most force are the extremes of friction and tool. Worst \
             cases, every input at its unfavourable end, stand beside the band. Settling and relaxation act \
             in the low force, and in all three once the file has `[losses]`.\
             \n\n\
             The draws are divided among 16 independent scramblings of one Sobol sequence; how far the ends \
             move between them is their sampling error, told with the ends after a fourth, a half and all of \
             the draws. `--draws` goes to 1e7 in flat memory; any number is unbiased, a power of two costs \
             least error.",
            "`ringsum drivers` ranks which inputs the band comes from, by first-order and total Sobol indices with \
             their 95 % interval, and what knowing each would buy; `--of contact | added | node_to_node | rise` \
             asks for another answer. The cone refuses a spread of bow or flatness, which it cannot follow.",
        ],
    ),
    topic(
        "topic/variants",
        "Which of several joints",
        [
            "`compare` puts joint files, or the `[[variant]]` tables of one, in one table: results, strength, \
             mass, the worst lost bolt, and whether the choice matters. A variant is a name and what differs, \
             by the paths of `--set`, such as `fastener.pattern.count = [3, 2]`. `report` compares them on its page; \
             `estimate` and `report` take one with `--variant NAME`. Other commands leave variants aside and say \
             so.",
            "Both joints of a pair are drawn with common numbers: the same lot and the same tool stand in both, \
             so that wide bands that overlap still tell which is better. `estimate --without 3` leaves a bolt \
             out: its hole stays, it neither clamps nor conducts.",
        ],
    ),
    topic(
        "topic/layouts",
        "How `arrange` searches for a layout",
        [
            "Layouts of the first fastener group are screened on a quick model within edge distance, pitch, \
             keep-out zones, symmetry and the sizes of an `[arrange]` table. The best are solved on the elastic \
             field in every case at the nominal, the least and the largest force, and the bands of the best are \
             drawn (low, high), at whose worse end `meets` is judged. Groups that are not arranged stay and \
             count. Layouts that overstress the bolts are left out. `--for bolts | mass | resistance` sets the \
             goal, `--write DIR` makes a joint file of each marked row with your comments kept, `--draw \
             FIGURE.svg` shows them.",
            "Ctrl-C prints the best so far; `--checkpoint FILE` and `--resume FILE` go on later to the same \
             answer.",
        ],
    ),
    topic(
        "topic/measurements",
        "Own measurements",
        [
            "`ringsum fit POINTS.csv` turns a table of readings into a law with its scatter that a joint file \
             takes as it stands (`[measured]`), loading and unloading apart, readings that stand apart pointed \
             out and kept. `ringsum fit JOINT.toml POINTS.csv --unknown FIELD` holds the model against what the \
             whole joint conducted, to find one thing that is not known: roughness, friction, flatness, or any \
             field by its path. Where the readings cannot tell, the answer says so and why.",
            "`ringsum fit --help` shows the heading of the table, `--draw FIGURE.svg` draws the fit. A 90 % \
             interval holds the truth in 87 to 93 % of 500 made sets (a test of the program).",
        ],
    ),
    topic(
        "topic/many-files",
        "Many joints in one run",
        [
            "Commands take many files. `--jobs N` takes N cores, each for a joint of its own; results come in \
             the order given and with the same digits. `--out DIR` writes one JSON per joint and one table \
             (estimates.csv, torques.csv, drivers.csv, layouts.csv), of `draw` one folder per joint. A bad file \
             stops nothing and makes the exit code 1; its line of the table says `faulty`, `failed`, `interrupted` \
             or, where nothing was found, `empty`.\
             \n\n\
             `--shard K/N` takes every N-th file of the sorted paths, for a part of a batch on each machine: \
             `ringsum estimate joints/*.toml --out results --shard $SLURM_ARRAY_TASK_ID/$SLURM_ARRAY_TASK_COUNT`. \
             One process per file does as well: `parallel 'ringsum estimate {} --json > {.}.json' ::: \
             joints/*.toml`.",
            "JSON and tables are SI always, and the keys of the JSON are never changed, only added to. Exit \
             codes: 0 done, 1 failure, 2 faulty input, 3 cautions with `--strict`, 130 interrupted.",
        ],
    ),
    topic(
        "topic/evidence",
        "What the numbers were checked against",
        [
            "Clamp force: full torque balance or nut factor; friction range and tool tolerance, or the scatter \
             of the tightening method. Checked against tables of VDI 2230-1:2001 (162 + 76 numbers), proof \
             loads of ISO 898-1, Shigley's stiffness examples and unified thread areas. Load along the bolts \
             (`axial_load`), disc springs (`disc_springs`, DIN 2093 series A within 0.6 %), inserts and brittle \
             plates limit the torque as well.\
             \n\n\
             Elastic field: 34 public cases of one bolt (contact radius within 0.003 b); joints of four and six \
             bolts solved with body-fitted elements (gap within 3 %, pressure on 2 mm cells within 6 % at \
             `fine`; 8 % and 9 % at `fast`); plate theory, patch tests, symmetry and scaling. The heat on the \
             same grid is within 1 %.\
             \n\n\
             Local conductance: the elastic-plastic law by exact integrals (plastic and elastic can be \
             chosen), gas with rarefaction, radiation, fillers, platings, own measurements.\
             \n\n\
             Cone (`--field cone`): a closed form fitted to finite-element contact; contact radius within 4 %, \
             ring sum within 0.6 % of 27 reference solutions, and within 1.9 % and 0.3 % of 48 more made with \
             the program's own elastic contact solver for one bolt. Spreading under it: for one bolt in a round \
             pair a ring network with proved bounds on both sides; for several bolts both plates on one plan \
             grid, which on two joints solved in three dimensions reads 6 and 10 % high in vacuum. Its band is \
             widened for the gap it does not know, and held the solved joint at five forces.",
            "figures/evidence.svg shows every value from elsewhere beside what the program gives, misses \
             included, and tests/validation_*.rs make the checks. Every value of the catalogue says whether it \
             was seen in its source, given from memory, computed or judged: `ringsum list materials --json`.",
        ],
    ),
    topic(
        "topic/outputs",
        "Files that are written",
        [
            "A file appears whole or not at all, never over another without `--force` and never over one that the \
             command line names as input: it is written as `.ringsum-…` in the folder it belongs to and then renamed. Every target is checked before anything \
             is computed, but for those of `arrange --write`, which the search names.",
            "A file that fails leaves nothing of itself behind; those written before it stay, and the answer is told all \
             the same, with exit code 1. A process that is stopped in the very moment of writing (Ctrl-C, kill -9, power) cannot clean up: delete the `.ringsum-…` file it may leave, nothing reads it.",
        ],
    ),
];

//! Faults of reading: the file, its keys, its values and the command line.

use crate::diagnostic::registry::{Entry, fault};

pub(super) const ENTRIES: &[Entry] = &[
    fault(
        "file/not-found",
        "The file cannot be opened",
        "No file of this name can be read: it does not exist, is a folder, or its permissions \
         forbid it.",
        "Check the path and the spelling. `-` reads the joint from standard input.",
    ),
    fault(
        "file/not-utf8",
        "The file is not UTF-8 text",
        "A joint file is text in UTF-8. Old editors and spreadsheets write `µ`, `°` and `·` in \
         other encodings, which cannot be told apart safely.",
        "Save the file as UTF-8. `um`, `degC` and `N*m` need no special signs.",
    ),
    fault(
        "file/empty",
        "The file is empty",
        "There is nothing to estimate: the file holds no text, or white space alone.",
        "`ringsum new` writes a joint file to start from.",
    ),
    fault(
        "file/too-large",
        "The file is too large to be a joint file",
        "A joint file is written by hand and holds a few kilobytes. A far larger one is another \
         file, or a measured table that belongs in thinned form.",
        "Check the path; keep measured tables to the points that carry the curve.",
    ),
    fault(
        "file/syntax",
        "The file is not valid TOML",
        "The text breaks the rules of TOML, so what follows the marked place cannot be read: a \
         quote is not closed, a bracket is missing, a key has no `=`.",
        "Mend the marked place. Texts stand in double quotes, tables in single brackets, and each \
         plate and fastener group under its own double bracket such as `[[plate]]`.",
    ),
    fault(
        "file/unknown-key",
        "A key that the table does not have",
        "Unknown keys are refused and not passed over: a mistyped key would otherwise silently \
         leave its default in force.",
        "Use the key that is suggested, or remove the line. The JSON Schema of the joint file lists \
         every key, and editors complete from it.",
    ),
    fault(
        "file/missing-key",
        "A value that the joint cannot do without",
        "The estimate needs this value and no default would be honest: thickness, size, material, \
         thread and tightening decide the answer.",
        "Add the key to the marked table; the help beside the fault shows a line that works.",
    ),
    fault(
        "file/wrong-type",
        "A value of the wrong kind",
        "The key wants another kind of value: a text, a list, a table or a number.",
        "Write it as the help beside the fault shows. A value with a unit is a text in quotes.",
    ),
    fault(
        "file/format",
        "A format this version does not read",
        "The file states a format newer than this version knows. Reading it by old rules could \
         change what it means.",
        "Use the version that the message names, or write the file in format 1.",
    ),
    fault(
        "file/duplicate",
        "The same thing twice",
        "A name or a place is given twice: two plates of one name, two bolts at one place. Which of \
         the two counts cannot be known.",
        "Rename or remove one of the two.",
    ),
    fault(
        "unit/bare-number",
        "A number without a unit",
        "`thickness = 5` could be millimetres, inches or metres. Taking one of them for granted is \
         the classic way to be wrong by 25.4.",
        "Write the number and its unit as one text: `thickness = \"5 mm\"`.",
    ),
    fault(
        "unit/not-a-quantity",
        "A text that is not the quantity it should be",
        "The text is no number with a unit, or its unit measures something else: `6 N` is no \
         length. Slips of upper and lower case (`mpa`), decimal commas and units that read two ways \
         (`W/cm·K`) are refused with the spelling that was likely meant.",
        "Write it as the help beside the fault shows: one number with a decimal point, a space, \
         and the unit with what is below the bar in brackets.",
    ),
    fault(
        "value/range",
        "A value outside what is possible",
        "The value breaks a rule of geometry or physics, such as a thickness of zero, an emissivity \
         above 1 or a Poisson's ratio of 0.5 or more. No formula gives a meaning to it.",
        "Give a value inside the range that the message names; most often the unit or the decimal \
         point has slipped.",
    ),
    fault(
        "value/min-above-max",
        "A range whose lower end is above its upper end",
        "Low, nominal and high must rise in this order, since each end enters the spread of the \
         result on its own side.",
        "Swap the two, or correct the nominal value between them.",
    ),
    fault(
        "value/distribution",
        "A spread that is not one, or reaches where the value cannot be",
        "A value may carry its spread: `\"5 mm ± 2 %\"` and `\"0.8 µm to 1.6 µm\"` have the same \
         weight everywhere between their ends; a table names `uniform` or `triangular` between low \
         and high, `normal` or `lognormal` about nominal with sigma. Half of the weight lies on \
         each side of nominal. Normal and lognormal end at three sigma (0.27 % of the weight is cut \
         off), and nothing is clamped: an end where the value cannot be is refused.",
        "State a closer spread, or `distribution = \"lognormal\"` with sigma in percent, which \
         stays above zero.",
    ),
    fault(
        "name/unknown",
        "A name that the catalogue does not have",
        "No material, thread, grade, finish, gas, filler or plate of this name is known. Similar \
         names can stand for very different values (304 and 6061 differ tenfold in conductivity), \
         so none is chosen for you.",
        "Take the suggested name, look through `ringsum list`, or give the values in the file \
         itself.",
    ),
    fault(
        "set/bad-override",
        "An override that fits no place in the file",
        "`--set` replaces one value of the joint before it is checked. Its path must lead to a \
         place that the file may have, and its value must be TOML.",
        "Write it such as `--set plate.upper.thickness=\"6 mm\"`; inside a shell, quote the whole.",
    ),
    fault(
        "file/conflict",
        "Two statements that exclude each other",
        "Two keys say the same thing in two ways, such as `torque` and `preload`, or `size` and `diameter`: \
         one of them would have to be passed over in silence.",
        "Keep the one you mean and take the other out.",
    ),
    fault(
        "file/too-many",
        "More entries than this version reads",
        "A joint takes at most 10 000 bolts, a list at most 10 000 entries, an outline 500 points, and a \
         plate 100 cut-outs, feet or ribs each.",
        "Check the count of the pattern; estimate one cell of a very large field of bolts.",
    ),
    fault(
        "value/not-rising",
        "A table whose first values do not rise",
        "Between the points of a table the value is interpolated, so the pressures must rise, each standing once.",
        "List the points from the lowest pressure to the highest.",
    ),
    fault(
        "map/unreadable",
        "A table beside the joint file that cannot be read",
        "The joint file names a measured map of a face by its path, and there is no such text.",
        "Put the table beside the joint file; the path is relative to the folder of the joint file, \
         or to the current folder when the joint comes from standard input.",
    ),
    fault(
        "map/header",
        "A flatness map without the names and units of its columns",
        "The first line that is no comment names the columns x, y and z, each with its unit of \
         length in brackets. Without units a map could be wrong a thousandfold.",
        "Head the table with `x [mm], y [mm], z [µm]`; columns are separated by commas or by \
         semicolons, and lines that start with # are comments.",
    ),
    fault(
        "map/row",
        "A line of a flatness map that is not three numbers",
        "Every line below the header is one measured point: x, y and the height z, as finite \
         numbers in the units of the header.",
        "Write decimal points, and leave out points that were not measured.",
    ),
    fault(
        "map/points",
        "Points that are no map of the face",
        "A map needs three points or more that are not on one line, each once, near the plate they \
         describe and no more than 100 000. They are in the plate's own coordinates; z is the height \
         of the faying face, positive towards the other plate.",
        "Check the units of the header and the origin of the measurement; thin out a scan.",
    ),
];

/** What each code means and how it is usually mended. The documentation page `docs/errors.md` is made from this list. */
export const problemCodes = {
  "unknown-command": "The first word after `kvane` is no command.",
  "unknown-option": "The command has no such option.",
  "missing-argument": "A required argument or option was not given, or an option came without its value.",
  "conflicting-arguments": "Two things were given that exclude each other.",
  "invalid-argument": "An argument is not of the expected form.",
  "invalid-request":
    "A line of requests is no JSON, no object, too long, or has a field that its command does not take or that is of the wrong kind.",
  "invalid-number": "A number was expected; text, NaN, an infinite or an out-of-range value was found.",
  "number-overflow": "An exact fraction or integer grew beyond the safe range of 2^53; kvane never rounds instead.",
  "syntax": "A linear form, coordinate triplet, symbol or file breaks its grammar at the place named.",
  "unknown-group": "The space-group symbol or number is in no table.",
  "ambiguous-group": "The symbol stands for several tabulated settings; a setting or origin code is needed.",
  "not-a-group": "The given operators do not close into a space group.",
  "singular-basis": "A change of basis has determinant zero.",
  "invalid-cell":
    "The unit cell is impossible: a length not above zero, an angle outside (0, 180), or angles without a volume.",
  "cell-contradicts-group": "The unit cell has not the metric symmetry that the operators of the group need.",
  "invalid-site": "A site has no label, no coordinates, or coordinates that are no numbers.",
  "duplicate-site": "Two sites have one label, or two sites stand on the same orbit.",
  "invalid-k": "The wave vector is not three fractions, decimals or linear forms in u, v, w.",
  "k-needs-values": "The wave vector has open parameters, and the command needs numbers for them.",
  "k-not-on-manifold": "The point lies on no arm of the line or plane that was named.",
  "measured-k-ambiguous":
    "A decimal component is close to a fraction, but not within the tolerance for taking it as one.",
  "file-not-found": "A named file does not exist.",
  "file-unreadable": "A file exists but cannot be read as text.",
  "file-empty": "A file holds nothing to work with.",
  "file-too-large": "A file is larger than what can be meant for kvane.",
  "cif-syntax": "A CIF breaks the grammar of CIF 1.1 or 2.0 at the place named.",
  "cif-characters": "A CIF has characters that its version of the standard does not allow.",
  "cif-incomplete": "A data name of a CIF has no value, or the values of a loop do not make whole rows.",
  "cif-duplicate": "A data name, a block or a key stands twice where it may stand once.",
  "cif-block": "A CIF has several blocks with structures, or none of the name that was asked for.",
  "cif-missing": "A CIF lacks something that is needed: the cell, the symmetry, the sites or the atom of a moment.",
  "cif-value": "A value of a CIF is not of the kind that its data name asks for.",
  "cif-contradiction": "Two statements of a CIF contradict each other; it is said which one was taken.",
  "cif-doubtful":
    "Something in a CIF needs a look: sites that are split, shared, partly occupied or without coordinates.",
  "output-exists": "The output file or folder exists already; it is not overwritten unasked.",
  "output-failed": "The output could not be written; nothing partial was left.",
  "unknown-key": "A study file has a key that is not part of the format.",
  "missing-key": "A study file lacks a required key.",
  "wrong-type": "A value in a study file has the wrong type.",
  "invalid-peak": "A row of a peak list has a word in a number column, a missing value or an impossible value.",
  "invalid-scan":
    "A temperature scan has a word in a number column, a row without a temperature or too short, no rows, no column besides the temperature, uncertainties without values, or too many values.",
  "doubtful-column":
    "A column of a temperature scan was fitted as a peak, but looks like the uncertainties of the column before it.",
  "invalid-component":
    "A row of a list of Fourier components names no atom of the site, or one twice, or has not three complex numbers.",
  "peak-kind-unknown": "It is not said whether positions are d, Q, 2theta or hkl.",
  "missing-wavelength": "2theta positions need the wavelength.",
  "peak-out-of-range": "A peak position is impossible, for example 2theta above 180 degrees.",
  "too-few-peaks": "The list has too few peaks for what was asked.",
  "k-not-determined": "The matched peaks do not fix all free components of the wave vector.",
  "uncertainties-understated": "The peaks scatter about their lines by much more than their uncertainties say.",
  "repeated-peaks": "Peaks stand where other peaks of the list stand; each position counts once.",
  "no-intensities": "Intensities were to be used, and the list has none.",
  "shared-line": "Two peaks have only one and the same line of the wave vector within their tolerance.",
  "intensities-left-out": "Intensities that lie on no line, or on one that has another row already, were left out.",
  "search-stopped": "The search for k ended before every box was settled; what was not looked at is stated.",
  "search-saturated": "So many wave vectors fit the peaks that not all of them were weighed.",
  "half-wavelength":
    "Twice the wave vector is a reciprocal lattice vector, so that peaks through half the wavelength would fit too.",
  "no-candidate": "No wave vector of those searched explains enough of the peaks.",
  "not-built": "The command or option is planned but not part of this version.",
  "interrupted": "The work was cancelled before it ended.",
  "internal-fault": "A fault of kvane itself; please report it with the input that led to it.",
} as const;

/** A stable name of a kind of problem. */
export type ProblemCode = keyof typeof problemCodes;

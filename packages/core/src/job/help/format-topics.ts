import type { HelpTopic } from "./topics.js";

/** Files in and out. */
export const formatTopics: { readonly [topic: string]: HelpTopic } = {
  "study-file": {
    title: "The study file",
    text: `A YAML file that holds the question. Numbers are read as written: 1/3 and 0.5 are exact.
  title: Layered ferrite (invented), 1.5 K
  group: P n m a
  cell: {a: 10.21, b: 6.05, c: 4.71, alpha: 90, beta: 90, gamma: 90}
  sites:
    - {label: Fe1, ion: Fe3+, at: [0, 0, 0], spin: 5/2, occupancy: 1}   # and g, form-factor
  atoms:                              # without moments: they go into written files
    - {label: O1, ion: O2-, at: [0.412, 1/4, 0.118]}
  k: [[0, 1/2, 0]]                    # leave out to search
  peaks: {file: satellites.csv, as: two-theta, wavelength: 2.41, tolerance: 0.08}
  intensities: {file: integrated.csv, scale: 40}   # kvane help intensities has more keys
  search: {unmatched: 1, max-dimension: 3, zero-shift: 0.05, cell-scale: 0.002}
  exchange: [{shell: 1, j: 1.0}, {shell: 2, vary: [0, 1, 41]}]   # kvane help bonds
  onset: {file: scan.csv}             # kvane help scan
  exclude: [[38.1, 38.6]]             # ranges of positions that are set aside
  impurities:                         # peaks on their lines are set aside
    - name: MnO
      group: F m -3 m
      cell: {a: 4.445, b: 4.445, c: 4.445, alpha: 90, beta: 90, gamma: 90}

search: {weigh-intensities: true} takes weak peaks as likelier strays than strong ones, and
peaks: {nuclear: FILE} names a list of nuclear lines with intensities (kvane help peaks).
A CIF may stand for group, cell and sites: structure: nuclear.cif, or with several data blocks
structure: {file: nuclear.cif, block: NAME}. kvane study FILE.cif writes a study to start from.

File names count from the folder of the study. kvane check STUDY.yaml names all that is wrong or
missing. Options on the command line win over the study.`,
  },
  peaks: {
    title: "Peak lists",
    text: `One peak a row: position, then optionally its uncertainty, intensity, uncertainty of the intensity;
or columns h k l for a single crystal. Columns are separated by comma, semicolon, tab or blanks. A
header row may name them; # or ! starts a comment.

What the positions are is said by --as d, q, two-theta or hkl, by the study, or by the header; it is
never guessed. two-theta needs --wavelength in Å. Q is 2π/d in Å⁻¹.

peaks: {nuclear: FILE} or --nuclear names a list of nuclear lines with intensities, read the same
way; a peak on the λ/2 image of one is then compared with it.

A peak is matched within 3 standard uncertainties of a line, or within --tolerance, which is in the
unit of the positions.`,
  },
  cif: {
    title: "CIFs of nuclear structures",
    text: `kvane check FILE.cif reads a CIF (1.1 and 2.0, older and newer data names) and shows what it makes
of it; --syntax looks at the grammar alone, to the letter. kvane study FILE.cif writes a commented
study to start from. A CIF goes straight into every command: as the first word, as --structure
FILE.cif, or as structure: in a study. --block NAME chooses one of several data blocks.

Symmetry       the operators are believed, then the Hall symbol, then the Hermann–Mauguin symbol,
               then the number; what contradicts them is a warning. A CIF without any is refused.
Cell           held against the group; within 3 s.u. a cell may break it, and the mean is taken.
Sites          exact as written (to 7 decimals), without s.u.; what lies within 0.02 Å of a special
               position is put there, so that 0.3333 is 1/3, and that is listed under Assumed.
Moments        sites whose element mostly carries one are taken; --site LABEL takes any other.
Occupancies    partial ones, disorder and shared positions are warned about: symmetry takes every
               site as full.
Options        GROUP, --cell and --site win over the CIF; that GROUP is another one is said.`,
  },
  json: {
    title: "The JSON of --json",
    text: `One object: kvane (version), format (1), command, input, result, errors, warnings, assumed. The
result is null exactly when there are errors. Exact numbers are strings ("1/2", "u"), measured ones
numbers, complex ones [re, im]; what does not apply is null. Peaks, candidates, atoms, arms, kinds
and little-group orbits count from 0 here and in CSV, from 1 in text; copies and partners of modes
count from 1 everywhere. A schema (JSON Schema 2020-12) of every answer: answerSchema(command) from
@kvane/core/reports.`,
  },
  exit: {
    title: "Exit statuses",
    text: `    0  done, perhaps with warnings; kvane check found nothing wrong, though something may be missing
    1  the job failed on valid input, or the output could not be written
    2  the input or the usage is wrong
   70  an internal fault: please report it
  130  interrupted

kvane explain CODE says what a code of an error message means.`,
  },
};

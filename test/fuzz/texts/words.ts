import type { TabulatedSetting } from "@kvane/core/spacegroups";

/** Kinds of short texts that a user types. */
export type WordKind =
  | "group"
  | "hall"
  | "triplet"
  | "magnetic triplet"
  | "superspace"
  | "basis change"
  | "k"
  | "site"
  | "cell"
  | "form"
  | "rational";

const triplets = ["x,y,z", "-x,-y,z+1/2", "-y, x-y, z+1/3", "1/2 - X, Y, z", "z,x,y", "x+1/4,-y+3/4,z+1/4"];
const changes = [
  "a,b,c;0,0,0",
  "(a,b,2c;0,0,1/4)",
  "a-b,a+b,c",
  "1/2a+1/2b,b,c;1/8,0,0",
  "(2a,-b,-c)",
  "b,c,a;0.25,0,0",
];
const forms = ["x", "-x+1/2", "2*y/3", "1/2 + x - y", "0.25", "X - Y", "-1/3", "2x-2y+z-5/8"];

const words: { readonly [kind in Exclude<WordKind, "hall">]: readonly string[] } = {
  group: [
    "62",
    "P n m a",
    "Pnma",
    "227:1",
    "R -3 m:H",
    "P21/c",
    "P 1 21/c 1",
    "hall:-P 2ac 2n",
    "x,y,z; -x,-y,-z",
    "x,y,z; -x,-y,z+1/2; -y,x,z",
    "62 (a,b,2c;0,0,1/4)",
    "P 63/m m c (a-b,a+b,c)",
    "-F 4 2 3",
    "-P 2ac 2n (0 0 1)",
    "x,y,z; -x,-y,z; z,x,y (a+b,b,c)",
    "P 4 (x-y,x+y,z)",
  ],
  triplet: triplets,
  "magnetic triplet": triplets.flatMap((one) => [`${one},+1`, `${one},-1`]),
  superspace: ["x1,x2,x3,x4,+1", "-x1,-x2,x3+1/2,-x4+1/2,-1", "x1,x2,x3,x4+1/2,-1", "-x2,x1-x2,x3,x1+x4+1/3,+1"],
  "basis change": changes,
  k: [
    "0,1/2,0",
    "0,0.472,0",
    "u,0,0",
    "1/3,1/3,1",
    "(u,-u,1/2)",
    "[0.25, 0.5, 0]",
    "0,0,u+1/2",
    "0.3333,0.3333,0",
    "-1/2,2u,w",
  ],
  site: ["Fe1 0 0 1/2", "Mn 0.137 1/4 -0.308", "A,1/3,2/3,0.25", "O(1) .5 1. +0", "Tb -0.017 0.07 1/4"],
  cell: ["10.21 6.05 4.71 90 90 90", "7.61, 7.61, 6.52, 90, 90, 120", "5 6 7 81 95.2 102", "1e1 6 4 90 90 90"],
  form: forms,
  rational: ["0", "1/2", "-3/4", "0.25", "+7", ".5", "1.", "-0.0", "12/18"],
};

/** Good texts of a kind: written here, or those of the table of settings. */
export function goodWords(kind: WordKind, settings: readonly TabulatedSetting[]): readonly string[] {
  tabulated ??= {
    group: [...words.group, ...settings.flatMap(({ short, full, number }) => [short, full, String(number)])],
    hall: settings.map(({ hall }) => `hall:${hall}`),
  };
  return kind === "group" || kind === "hall" ? tabulated[kind] : words[kind];
}

let tabulated: { readonly group: readonly string[]; readonly hall: readonly string[] } | null = null;

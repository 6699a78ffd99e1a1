import type { HelpTopic } from "./topics.js";

/** How groups, wave vectors, sites and cells are written. */
export const inputTopics: { readonly [topic: string]: HelpTopic } = {
  group: {
    title: "How a space group is written",
    text: `  62                       table number, standard setting
  "P n m a"  "R -3 m:H"    Hermann–Mauguin symbol, with a setting or origin code where needed
  "hall:-P 2ac 2n"         Hall symbol; the prefix may be left out where nothing else fits
  "x,y,z; -x,-y,-z"        coordinate triplets of operators; they are closed into a group

A change of basis may follow in brackets. Letters a, b, c give (P, p) of International Tables A: new
axes in the old ones, then the shift of origin in old coordinates:
  "62 (a,b,2c;0,0,1/4)"
Letters x, y, z or three integers are Hall's own operator and stand only behind a Hall symbol. Put
the whole in quotation marks, so that the shell hands it on as one word.`,
  },
  k: {
    title: "How a wave vector is written",
    text: `Three components in the reciprocal basis of the setting's axes, separated by commas:
  0,1/2,0                  fractions and integers are exact
  0,0.25,0                 so are decimals that are a fraction of denominator 4 or less
  0,0.472,0                any other decimal is measured
  u,0,0  1/3,1/3,w         letters u, v, w stay open: symmetry is that of the whole line or plane

A measured value is put onto the simplest kind of k within 0.0001 per component, and that is listed
under Assumed. 0.333 is further than that from 1/3 and stays measured: write 1/3.`,
  },
  site: {
    title: "How sites and cells are written",
    text: `  --site "Fe1 0 0 1/2"     a label and three coordinates, fractions or decimals;
                           the option is repeated for more sites
  --cell "10.2 6.0 4.7 90 90 90"   a b c in Å, alpha beta gamma in degrees

A coordinate within 0.02 Å of a special position (0.0005 of the axis where no cell is known) is put
there, and that is listed under Assumed.`,
  },
};

import type { HelpTopic } from "./topics.js";

/** Exchange models and temperature scans. */
export const physicsTopics: { readonly [topic: string]: HelpTopic } = {
  bonds: {
    title: "Exchange constants and bonds",
    text: `E = Σ J S·S, every bond counted once: J > 0 is antiferromagnetic. |S| is the spin of the study where
every magnetic site has one, else 1. Energies are per magnetic atom, in the unit of the constants.

Bonds are named by their shell, counted from 1 over all pairs of the given sites: 1, 2, … Where
symmetry does not make all bonds of a shell equal they are 2a, 2b, …; without constants
\`kvane exchange\` lists them.

  --j "1 1.0"  --j "2b -0.3"          a whole shell, or one kind of its bonds
  --j "2 Fe1 Fe2 0.4"                 only the bonds of the shell between these sites
  exchange: [{shell: 1, j: 1.0}, {bond: 2b, j: -0.3}, {shell: 3, between: [Fe1, Fe2], j: 0.4}]

In what k asks of the constants each has one row as it was named: J2 where shell 2 was given as a
whole, J2a and J2b where they were told apart.

The lowest eigenvalue of J(k) is searched over the whole zone with proof (Luttinger and Tisza); it
bounds the energy of any arrangement from below. It is then tried to build spins of full length
that reach it. Sites that symmetry does not relate are balanced first (Lyons and Kaplan).

  --vary "2 0 1 41"                   phase diagram while J2 runs from 0 to 1; twice for a map
  exchange: [{shell: 1, j: 1.0}, {shell: 2, j: 0.4, vary: [0, 1, 41]}]        the same in a study
  --k 0,0,0.29                        energies at this k, and which constants put the minimum there

vary holds from, to and how many values (21 where it is left out); a constant that runs needs no j.
One kind of bonds may run alone, --vary "2a 0 1", while the rest of its shell stays. --vary wins
over the ranges of a study, and --j over its constants and their ranges. --csv has the points of
the diagram, without one the energies, and without constants the bonds.`,
  },
  intensities: {
    title: "Integrated intensities",
    text: `A peak list in which every row has an intensity (kvane help peaks), by position for a powder or
by h k l for a crystal, with standard uncertainties; 0 says that a line was looked for and not
seen. Indices may be fractions: 1/2.

  two-theta  intensity  intensity-su        h    k    l    intensity  intensity-su
  11.43      95.2       3.1                 0    1/2  0    95.2       3.1

intensities: {file: integrated.csv}   and where it is needed:
  as, wavelength    as for peaks; left out, those of the peaks
  lorentz: true     the numbers are intensities as measured, with the Lorentz factor
                    1/(sin θ sin 2θ) (powder) or 1/sin 2θ (crystal); false: |F|². Powder lists with
                    a wavelength are taken as measured, all others as |F|², and that is listed
                    under Assumed
  scale: 40         intensity per |F|² of 10⁻²⁴ cm² of the primitive cell
  nuclear: FILE     nuclear lines in the same scale, read like the intensities: the scale is fitted
                    with the moments. All atoms must be in the study (sites and atoms) or the CIF.
                    Without scale and nuclear lines moments are relative
  includes-nuclear: true   the intensities hold the nuclear lines at the same places too; else they
                    are taken as satellites alone, with k = 0 as differences
  displacement: 0.5 overall B in Å²: intensities fall by exp(−2B s²), s = Q/4π
  resolution: 0.01  lines nearer to each other in Å⁻¹ are one peak, which lies so near to them
  scattering-angle: 90   time of flight: 2θ of the detectors; the Lorentz factor is d⁴ sin θ
  domains: free     crystal: fractions of arms, orientations and chirality domains are fitted; else
                    they are equal
  pattern-width: 0.3   a simulated pattern of the best fits, lines of this full width at half
                    maximum in degrees 2θ (--pattern; with --csv or --svg), for looking at

A column \`polarization\` beside h k l is the component along Q = k_i − k_f of the polarization of
the incident beam, −1 to 1: the chiral term counts then.

Form factors follow from the ions of the sites (International Tables C, 4.4.5). In their place a
site may have form-factor: 1 (a constant) or form-factor: {j0: [A, a, B, b, C, c, D], j2: […],
j2-factor: 0.1}, and g: 2.1; --form-factor "Fe1: Fe2+" gives it to a site of a CIF. The occupancy
of a site counts: moments are those of an atom that is there.

kvane weigh fits the free amplitudes of every configuration and ranks them by χ² + parameters ·
ln(intensities). A ranking is no refinement.`,
  },
  scan: {
    title: "Temperature scans",
    text: `Rows of a temperature in K and one or more quantities, in any order of the rows. The header names
the columns: T, then a name for each peak. A column called su (or sigma, err, error, esd, std,
uncertainty) holds the uncertainties of the one before it; with a name behind it, su_I1 or err(I1),
those of that one. Names that follow that of a peak do so too: I1 s1, I1 dI1, I1 I1err, and s or e
alone; that is listed under Assumed. A value may carry its own, 132(4). What every column was taken
as stands under Columns; one that looks like uncertainties and has no such name is fitted as a peak
and warned about. Columns called k, kx, ky, kz, u, v or w are components of the wave vector. -, NaN
and nan stand for a value that is not there; rows times peaks may be up to 10000.

  T      (0 0 1/2)  su   (1 0 1/2)  su
  2.0    98.1       2.0  41.7       1.1

Each peak is fitted by I = I₀ (1 − T/T_N)^2β + background over the widest range of (T_N − T)/T_N
that this law describes, or over that of --reduced. Standard uncertainties are those of the profile
of χ²; without uncertainties in the file they follow from the scatter. Peaks share a transition
unless a common T_N is improbable at 0.1 %. T_N, β and their uncertainties depend on the law and
its range; a β from a wide range is no critical exponent.

onset: {file: scan.csv} in a study names the scan for \`kvane onset STUDY.yaml\`.`,
  },
};

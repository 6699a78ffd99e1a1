import { fail } from "../errors/index.js";
import { averagedReciprocalMetric } from "../reflections/index.js";
import { type Cell, cellVolume, type SpaceGroup } from "../spacegroups/index.js";
import { latticeDensity } from "./crystal-arms.js";
import { crystalModel } from "./crystal-model.js";
import type { PeakModel } from "./explanation.js";
import { checkSearchOptions } from "./options.js";
import { powderModel } from "./powder-model.js";
import type { PeakList, SearchOptions, SetAside } from "./types.js";
import { type PowderPeak, usedPeaks } from "./used-peaks.js";

/** The model of a list's peaks. */
export interface ModelledPeaks {
  readonly model: PeakModel;
  /** The model of some of them, chosen by index. */
  readonly modelOf: (wanted: (peak: number) => boolean) => PeakModel;
  readonly setAside: readonly SetAside[];
  readonly powder: readonly PowderPeak[];
}

/** The model of a list's peaks, and the peaks that it leaves out. Throws `invalid-argument` for impossible options. */
export function peakModel(group: SpaceGroup, cell: Cell, list: PeakList, options: SearchOptions): ModelledPeaks {
  checkSearchOptions(options);
  if (options.zeroShift > 0 && list.kind !== "hkl" && list.wavelengthAngstrom === null)
    fail("missing-wavelength", "a zero shift of 2θ can only be refined where the wavelength is known", {
      where: { argument: "--zero-shift" },
      expected: "--wavelength, or --zero-shift 0",
      found: "no wavelength",
    });
  const metric = averagedReciprocalMetric(group, cell);
  const { powder, crystal, setAside } = usedPeaks(list, options, (hkl) => lengthOf(metric, hkl));
  const furthest = Math.max(...powder.map(({ q }) => q), ...crystal.map(({ hkl }) => lengthOf(metric, hkl)));
  refuseTooMany(group, cell, list, furthest);
  const modelOf = (wanted: (peak: number) => boolean): PeakModel => {
    const chosen = ({ index }: { readonly index: number }) => wanted(index);
    return list.kind === "hkl"
      ? crystalModel(group, cell, crystal.filter(chosen))
      : powderModel(group, cell, powder.filter(chosen), list.wavelengthAngstrom, options);
  };
  return { model: modelOf(() => true), modelOf, setAside, powder };
}

/** Reciprocal lattice vectors within the range of the list; more are a cell or a unit that is not meant. */
const mostVectors = 200_000;

/** Before the work: a list in another unit, or a cell ten times too long, would take hours. */
function refuseTooMany(group: SpaceGroup, cell: Cell, { kind }: PeakList, furthest: number): void {
  const points = Math.abs(latticeDensity(group));
  const count = ((4 * Math.PI) / 3) * (furthest / (2 * Math.PI)) ** 3 * cellVolume(cell) * points;
  if (count <= mostVectors) return;
  fail(
    "invalid-argument",
    `up to the last peak, Q = ${furthest.toFixed(2)} Å⁻¹, the cell has ${Math.round(count)} reflections`,
    {
      where: { argument: "--as" },
      expected: `at most ${mostVectors}: a list and a cell that belong together`,
      found: `positions taken as ${kind}, and a cell of ${Math.round(cellVolume(cell))} Å³`,
      remedy:
        "check what the positions are (--as), and that the cell is in Å; --q-max leaves out the peaks beyond a limit",
    },
  );
}

/** |Q| in Å⁻¹. */
function lengthOf(metric: readonly number[], hkl: readonly number[]): number {
  let square = 0;
  for (let i = 0; i < 3; i++)
    for (let j = 0; j < 3; j++) square += (hkl[i] as number) * (metric[3 * i + j] as number) * (hkl[j] as number);
  return 2 * Math.PI * Math.sqrt(Math.max(0, square));
}

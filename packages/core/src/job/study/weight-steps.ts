import type { BranchRecord, WeighRecord } from "../../reports/index.js";

/** χ² per degree of freedom above which no configuration is worth a refinement before something is looked at. */
const poorFit = 4;
/** Share of the intensity that may be left out before the same holds. */
const muchLeftOut = 0.2;
const namedTies = 4;

/** Where a refinement starts, or what has to be mended first. */
export function weightStep(branches: readonly BranchRecord[]): string[] {
  return branches.flatMap(({ weigh }, index) =>
    weigh === null ? [] : stepOf(weigh, branches.length > 1 ? ` of branch ${index + 1}` : ""),
  );
}

function stepOf(weigh: WeighRecord, whose: string): string[] {
  const [best] = weigh.ranking;
  const look = "look at the wavelength, the cell, k, the Lorentz factor and the scale";
  if (best === undefined)
    return weigh.struckOut.length === 0
      ? []
      : [
          `No configuration${whose} can give the intensities observed: ${look}, and whether several irreps order together.`,
        ];
  const left = weigh.leftOutShare > muchLeftOut;
  const poor = best.reducedChiSquared !== null && best.reducedChiSquared > poorFit;
  if (left || poor)
    return [
      `${left ? "Much of the intensity lies on no line" : "No configuration fits the intensities well"}${whose}: ${look} before a refinement.`,
    ];
  if (best.parameters >= weigh.data.list.length)
    return [
      `There are too few intensities${whose} to tell configurations apart: measure more lines, weak and absent ones too.`,
    ];
  if (best.sameAs.length === 0)
    return [`${best.id} fits the intensities${whose} best: start a refinement from it (kvane export --fitted).`];
  const more = best.sameAs.length - namedTies;
  const ids = [best.id, ...best.sameAs.slice(0, namedTies)];
  const names = more > 0 ? `${ids.join(", ")} and ${more} more` : `${ids.slice(0, -1).join(", ")} and ${ids.at(-1)}`;
  return [
    `${names} fit the intensities${whose} equally well: kvane weigh says what measurement would tell them apart; refine each of them (kvane export --fitted).`,
  ];
}

import type { WeighedRecord, WeighRecord } from "../records/weigh.js";
import { counted, decimals, plain } from "./names.js";
import { namesOf, percent, short } from "./weigh-words.js";

/** The best configuration and those that the data do not tell from it, best first. */
export function familyOf({ ranking }: WeighRecord, best: WeighedRecord): WeighedRecord[] {
  return ranking.filter((one) => one === best || best.sameAs.includes(one.id));
}

/** Labels of data that a sentence names. */
const namedData = 6;

/** Which data no line took, and why; nothing where all were used. */
export function leftOutTexts({ leftOut, leftOutShare, data }: WeighRecord): string[] {
  if (leftOut.length === 0) return [];
  const far = leftOut.filter(({ reason }) => reason === "no line near");
  const shared = leftOut.filter(({ reason }) => reason === "another datum is nearer");
  const [first] = far;
  const nearest =
    first?.nearest == null
      ? ""
      : ` The line nearest to ${first.label} is ${first.nearest.line} at ${decimals(first.nearest.q, 4)} Å⁻¹.`;
  return [
    ...(far.length === 0
      ? []
      : [
          `Left out, no line within ${plain(data.resolution)} Å⁻¹: ${namesOf(
            far.map(({ label }) => label),
            namedData,
          )}.${nearest} Look at the wavelength, the cell, k, the zero of the angle and the resolution.`,
        ]),
    ...(shared.length === 0
      ? []
      : [
          `Left out, another row is nearer to the same line: ${namesOf(
            shared.map(({ label }) => label),
            namedData,
          )}. Add up rows that are one peak.`,
        ]),
    `What was left out is ${percent(leftOutShare)} of the intensity observed.`,
  ];
}

/** What must be known beside the moments of one candidate. */
export function notesOn(one: WeighedRecord, relative: boolean): string[] {
  const unknown = one.amplitudes.filter(({ determined }) => !determined).map(({ label }) => label);
  const others = one.minima.slice(1);
  const aboveLimit = one.moments.some((moment) => moment.aboveLimit);
  const possible = others.filter((minimum) => !minimum.aboveLimit).length;
  return [
    ...(relative && one.factorToLimit !== null
      ? [`Times ${short(one.factorToLimit)} the largest moment is what its ion can have.`]
      : []),
    ...waveTexts(one),
    ...(unknown.length > 0
      ? [
          `Not determined by these data: the amplitudes ${unknown.join(", ")} (letters as in kvane configurations). The moments shown are one choice of many that fit equally well; sizes with an uncertainty are the same for all of them.`,
        ]
      : []),
    ...(one.freePhase ? ["The common phase of the wave is free: no diffraction sees it."] : []),
    ...(others.length > 0
      ? [
          `${counted(others.length, "other arrangement")} of this configuration ${others.length === 1 ? "fits" : "fit"} as well, with largest moments of ${namesOf(
            others.map(({ largest }) => decimals(Math.max(...largest), 2)),
            namedData,
          )}; the amplitudes are in the JSON (minima).`,
        ]
      : []),
    ...(aboveLimit
      ? [
          possible > 0
            ? "A moment is above what its ion can have, but not in every arrangement that fits as well."
            : "A moment is above what its ion can have: the scale, the ion or the arrangement is wrong.",
        ]
      : []),
  ];
}

/** Relative. Half axes that differ by less are those of a circle, and a shorter one by less than this is none. */
const axisShare = 1e-3;

/** How the moments of a single wave run from cell to cell. */
function waveTexts({ moments }: WeighedRecord): string[] {
  const kinds = moments.flatMap(({ label, halfAxes }) => {
    if (halfAxes === null || halfAxes[0] === 0) return [];
    const [long, shorter] = halfAxes;
    const kind =
      shorter <= axisShare * long
        ? `sine wave of amplitude ${decimals(long, 2)}`
        : long - shorter <= axisShare * long
          ? `circle of radius ${decimals(long, 2)}`
          : `ellipse with half axes ${decimals(long, 2)} and ${decimals(shorter, 2)}`;
    return [`${label}: ${kind}`];
  });
  return kinds.length === 0 ? [] : [`From cell to cell the moments run through: ${[...new Set(kinds)].join("; ")}.`];
}

/** Why the data do not tell the first configurations apart, and what would. */
export function tieTexts(record: WeighRecord): string[] {
  const [best] = record.ranking;
  if (best === undefined || best.sameAs.length === 0) return [];
  const others = best.sameAs.filter((id) => !best.identicalTo.includes(id));
  const crystal = best.separations.some(({ by }) => by === "single crystal" || by === "polarised neutrons");
  return [
    ...(best.identicalTo.length > 0 ? [identicalText(record, best)] : []),
    ...(others.length > 0
      ? [
          `The criterion of ${namesOf(others, 8)} lies less than 6 above that of ${best.id}: these data prefer neither. More or better intensities may.`,
        ]
      : []),
    ...best.separations.map((one) => `${best.id} and ${one.from}: ${relationText(best.id, one)}${one.text}.`),
    ...(best.separations.some(({ by }) => by === "single crystal" || by === "polarised neutrons")
      ? [`Of the other configuration the domain is meant that is most like ${best.id}.`]
      : []),
    ...(crystal
      ? [
          "A crystal of one domain is made by cooling in a field or under stress; or fit the fractions of its domains (`domains: free`).",
        ]
      : []),
    ...(best.separations.length < best.sameAs.length
      ? [
          `Only ${counted(best.separations.length, "pair")} with ${best.id} ${best.separations.length === 1 ? "is" : "are"} looked at.`,
        ]
      : []),
  ];
}

function identicalText({ data }: WeighRecord, best: WeighedRecord): string {
  const names = namesOf(best.identicalTo, 8);
  return data.sample === "powder"
    ? `${names} can give the very same powder pattern as ${best.id}, on every line: a powder averages over the directions of the crystal and over all domains.`
    : `${names} can give the very same intensities as ${best.id} on all reflections of the list.`;
}

function relationText(id: string, { from, relation }: WeighedRecord["separations"][number]): string {
  if (relation === "special case") return `${from} is a special case of ${id}; `;
  if (relation === "more general") return `${from} holds ${id} as a special case, and the data do not ask for it; `;
  return "";
}

import { arrangementWith, lineSquares, type MomentSpace, simulatedPattern } from "../../diffraction/index.js";
import type { WaveVector } from "../../kvectors/index.js";
import { roundNumber } from "../../numbers/index.js";
import { qToTwoThetaDeg } from "../../reflections/index.js";
import type { WeighPatternRecord } from "../../reports/index.js";
import type { Cell, SpaceGroup } from "../../spacegroups/index.js";
import type { IntensityData, Weighing } from "../../weighing/index.js";

/** Configurations of which a pattern is simulated: as many as are drawn. */
const mostCurves = 3;
/** Steps in one width: a Gaussian drawn with straight lines looks smooth. */
const stepsInWidth = 6;
const mostSteps = 4_000;
/** Widths beyond the last line. */
const margin = 8;

/** Patterns of the satellites of the best fits, as far as the data go; null where no line is in reach. */
export function patternOf(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  data: IntensityData,
  spaces: readonly MomentSpace[],
  { ranking }: Weighing,
  widthDeg: number,
): WeighPatternRecord | null {
  if (data.geometry.kind !== "powder") return null;
  const { wavelengthAngstrom } = data.geometry;
  const angles = data.data.flatMap(({ q }) => (q === null ? [] : (qToTwoThetaDeg(q, wavelengthAngstrom) ?? [])));
  if (angles.length === 0) return null;
  // From the beam on: lines below the first peak are missing for a reason.
  const fromDeg = 0;
  const toDeg = rounded(Math.min(179, Math.max(...angles) + margin * widthDeg));
  const stepDeg = roundNumber(Math.max(widthDeg / stepsInWidth, (toDeg - fromDeg) / mostSteps));
  const qMax = (4 * Math.PI * Math.sin((toDeg * Math.PI) / 360)) / wavelengthAngstrom;
  // Of several with one pattern the first.
  const different = ranking.filter(({ identicalTo }, index) =>
    ranking.slice(0, index).every(({ id }) => !identicalTo.includes(id)),
  );
  const curves = different.slice(0, mostCurves).flatMap(({ id, amplitudes, scale }) => {
    const space = spaces.find((one) => one.id === id);
    if (space === undefined) return [];
    const arrangement = arrangementWith(
      space,
      amplitudes.map(({ value }) => value),
    );
    const lines = lineSquares(group, cell, k, arrangement, { qMax }).map(({ line, square }) => ({
      q: line.q,
      square: (scale ?? 1) * square,
    }));
    const { intensities } = simulatedPattern(lines, {
      wavelengthAngstrom,
      fromDeg,
      toDeg,
      stepDeg,
      widthDeg,
      displacement: data.displacement,
    });
    return [{ id, intensities }];
  });
  return { wavelengthAngstrom, widthDeg, fromDeg, stepDeg, curves };
}

/** To a tenth of a degree. */
function rounded(angle: number): number {
  return Math.round(10 * angle) / 10;
}

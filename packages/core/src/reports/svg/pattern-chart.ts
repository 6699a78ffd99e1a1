import { scaleLinear } from "d3-scale";
import type { WeighPatternRecord, WeighRecord } from "../records/weigh.js";
import { label, leftAxis, lowerAxis } from "./axis-marks.js";
import type { Figure } from "./figure.js";
import { coordinate, element } from "./mark-up.js";
import { paint, seriesRole } from "./palette.js";

const width = 940;
const left = 58;
const right = 14;
const top = 28;
const height = 120;
const panelHeight = top + height + 48;

/** Simulated patterns, a panel for each configuration, with ticks where intensities were measured. */
export function patternChart(pattern: WeighPatternRecord, data: WeighRecord["data"]): Figure {
  const { curves, widthDeg, wavelengthAngstrom } = pattern;
  const names = curves.map(({ id }) => id).join(", ");
  return {
    width,
    height: Math.max(1, curves.length) * panelHeight,
    title: `Simulated patterns of ${names}`,
    description: `Satellites of the best fits of ${names} as Gaussian lines of full width ${widthDeg}° at half maximum, λ = ${wavelengthAngstrom} Å; ticks below stand where intensities were measured. For looking at, not for refinement.`,
    marks: curves
      .map((curve, index) =>
        element(
          "g",
          { transform: `translate(0 ${index * panelHeight})` },
          panelMarks(pattern, curve, index, measuredAngles(data, wavelengthAngstrom)),
        ),
      )
      .join(""),
  };
}

function measuredAngles({ list }: WeighRecord["data"], wavelengthAngstrom: number): number[] {
  return list.flatMap(({ q }) => {
    const sine = ((q ?? 0) * wavelengthAngstrom) / (4 * Math.PI);
    return sine > 0 && sine < 1 ? [(360 / Math.PI) * Math.asin(sine)] : [];
  });
}

function panelMarks(
  { fromDeg, stepDeg }: WeighPatternRecord,
  { id, intensities }: WeighPatternRecord["curves"][number],
  index: number,
  measured: readonly number[],
): string {
  const base = top + height;
  const last = fromDeg + stepDeg * (intensities.length - 1);
  const x = scaleLinear([fromDeg, last], [left, width - right]);
  const y = scaleLinear([0, Math.max(...intensities) || 1], [base - 8, top]);
  const points = intensities.map((value, step) => `${coordinate(x(fromDeg + step * stepDeg))} ${coordinate(y(value))}`);
  return [
    leftAxis(y, left, width - right, 3),
    label(`${id}: intensity per degree`, left, top - 10, "start"),
    element("path", {
      d: `M${points.join("L")}`,
      "stroke-width": 1.4,
      ...paint({ fill: "none", stroke: seriesRole(index) }),
    }),
    ...measured.map((angle) =>
      element("path", { d: `M${coordinate(x(angle))} ${coordinate(base)}v-6`, ...paint({ stroke: "ink" }) }),
    ),
    lowerAxis(x, base, 10, "2θ / degrees"),
  ].join("");
}

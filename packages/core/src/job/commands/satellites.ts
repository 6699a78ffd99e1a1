import type { SatellitesRecord } from "../../reports/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { groupOf } from "../inputs/group-input.js";
import { numericK, writtenK } from "../inputs/k-input.js";
import { numberOption } from "../inputs/number-input.js";
import { wavelengthOf } from "../inputs/peaks-input.js";
import { satellitesOf } from "../study/satellites-of.js";
import { remember, together, type Work } from "../work.js";

/** `kvane satellites`: where the satellites of k lie, and what lies on them. */
export async function satellitesCommand(work: Work): Promise<SatellitesRecord> {
  const { group, written, given, wavelength, asked } = await together({
    group: () => groupOf(work),
    written: () => writtenK(work),
    given: () => writtenCell(work),
    wavelength: () => wavelengthOf(work),
    asked: () => numberOption(work.request, "qMax", { above: 0 }),
  });
  const { k, cell } = await together({
    k: () => numericK(work, group, written),
    cell: () => cellFor(group, given),
  });
  const qMax = asked ?? defaultLimit(work, wavelength);
  return satellitesOf(group, cell, k, { qMax, wavelengthAngstrom: wavelength });
}

/** Å⁻¹. Beyond it the form factors of 3d and 4f ions leave little to see. */
const usualLimit = 3;

function defaultLimit(work: Work, wavelength: number | null): number {
  // No line lies beyond 2θ = 180°.
  const reach = wavelength === null ? usualLimit : (4 * Math.PI) / wavelength;
  const limit = Math.min(usualLimit, reach);
  remember(
    work,
    [{ what: "Q limit", value: `${Number(limit.toPrecision(6))} Å⁻¹`, because: "--q-max was not given" }],
    [],
  );
  return limit;
}

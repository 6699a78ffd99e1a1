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
  const qMax = limitOf(work, asked, wavelength);
  return satellitesOf(work.host, group, cell, k, { qMax, wavelengthAngstrom: wavelength });
}

/** Å⁻¹. Beyond it the form factors of 3d and 4f ions leave little to see. */
const usualLimit = 3;

/** What was asked or the usual limit; never beyond 2θ = 180°. */
function limitOf(work: Work, asked: number | null, wavelength: number | null): number {
  const reach = wavelength === null ? Number.POSITIVE_INFINITY : (4 * Math.PI) / wavelength;
  const limit = Math.min(asked ?? usualLimit, reach);
  if (asked === null || asked > reach)
    remember(
      work,
      [
        {
          what: "Q limit",
          value: `${Number(limit.toPrecision(6))} Å⁻¹`,
          because:
            asked === null
              ? `--q-max was not given${limit === reach ? ", and 2θ ends at 180°" : ""}`
              : `the wavelength reaches no further: 4π/λ, 2θ = 180°`,
        },
      ],
      [],
    );
  return limit;
}

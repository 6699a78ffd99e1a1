import { type NuclearAtom, scatteringLength, type Triple } from "../../diffraction/index.js";
import { KvaneError, type Problem, problem } from "../../errors/index.js";
import { exactComponents, type WaveVector } from "../../kvectors/index.js";
import { toNumber } from "../../numbers/index.js";
import type { NamedSite, ParentSites } from "../../reports/index.js";
import { type SpaceGroup, toPrimitiveRow } from "../../spacegroups/index.js";
import type { IntensityData, IntensityDatum } from "../../weighing/index.js";
import type { GivenIntensities } from "../inputs/intensities-input.js";
import { remember, type Work } from "../work.js";

/** The data of a fit: the satellites of the list, and the nuclear lines that were measured with them. */
export function intensityData(
  work: Work,
  group: SpaceGroup,
  k: WaveVector,
  given: GivenIntensities,
  parent: ParentSites,
): IntensityData {
  const { list, nuclear, lorentz, scale, resolution, displacement, includesNuclear } = given;
  const sample = list.kind === "hkl" ? "single crystal" : "powder";
  const holds = includesNuclear ? "both" : "satellites";
  const satellites = list.intensities.map((one) => datumOf(one, one.label, holds));
  const lines = nuclear?.list.intensities.map((one) => datumOf(one, `nuclear ${one.label}`, "nuclear")) ?? [];
  if (!includesNuclear && isZero(group, k)) rememberSubtracted(work);
  if (scale !== null && nuclear !== null) rememberGivenScale(work, scale);
  const atoms = includesNuclear || nuclear !== null ? nucleiOf(work, given, parent) : [];
  return {
    sample,
    data: [...satellites, ...lines],
    geometry: lorentz ? geometryOf(given, sample) : { kind: "none" },
    scale,
    nuclear: atoms,
    displacement,
    resolution,
  };
}

function datumOf(
  { q, hkl, observed, uncertainty, polarization }: GivenIntensities["list"]["intensities"][number],
  label: string,
  holds: NonNullable<IntensityDatum["holds"]>,
): IntensityDatum {
  return { label, q, hkl, observed, uncertainty, holds, ...(polarization === null ? {} : { polarization }) };
}

function geometryOf(
  { scatteringAngleDeg, list: { wavelengthAngstrom } }: GivenIntensities,
  kind: "powder" | "single crystal",
): IntensityData["geometry"] {
  if (scatteringAngleDeg !== null) return { kind: "time of flight", twoThetaDeg: scatteringAngleDeg };
  return wavelengthAngstrom === null ? { kind: "none" } : { kind, wavelengthAngstrom };
}

/** Whether k is a vector of the reciprocal lattice. */
function isZero(group: SpaceGroup, k: WaveVector): boolean {
  const exact = exactComponents(k);
  return exact !== null && toPrimitiveRow(group.lattice, exact).every(([, bottom]) => bottom === 1);
}

function rememberGivenScale(work: Work, scale: number): void {
  const because =
    "both a scale and nuclear lines are given: the lines are compared with it; without it they fix the scale";
  remember(work, [{ what: "scale", value: String(scale), because }], []);
}

function rememberSubtracted(work: Work): void {
  remember(
    work,
    [
      {
        what: "nuclear part",
        value: "subtracted from the intensities",
        because:
          "with this k every satellite lies on a nuclear position; `includes-nuclear: true` or --includes-nuclear says otherwise",
      },
    ],
    [],
  );
}

/** All nuclei of the primitive cell. Throws for every atom whose element is not said or has no length in the table. */
function nucleiOf(
  work: Work,
  { nuclear, file }: GivenIntensities,
  { magnetic, others }: ParentSites,
): readonly NuclearAtom[] {
  const problems: Problem[] = [];
  const where = { file: nuclear?.file ?? file };
  const atoms = [...magnetic, ...others].flatMap((site): NuclearAtom[] => {
    const nucleus = nucleusOf(site, where, problems);
    if (nucleus === null) return [];
    return site.orbit.positions.map((position) => ({
      nucleus,
      position: position.map(toNumber) as unknown as Triple,
      occupancy: site.occupancy,
    }));
  });
  if (problems.length > 0) throw new KvaneError(problems);
  const names = [...new Set([...magnetic, ...others].map(({ ion }) => scatteringLength(ion ?? "").nucleus))];
  const without = others.length === 0 ? "; the structure has no other atoms" : "";
  remember(
    work,
    [{ what: "nuclei", value: names.join(", "), because: `of the ions of all sites, natural mixtures${without}` }],
    [],
  );
  return atoms;
}

function nucleusOf({ orbit, ion }: NamedSite, where: { readonly file: string }, problems: Problem[]): string | null {
  try {
    if (ion !== null) return scatteringLength(ion).nucleus;
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    problems.push(...error.problems.map((one) => ({ ...one, message: `site ${orbit.label}: ${one.message}` })));
    return null;
  }
  problems.push(
    problem("missing-key", `the nuclear lines need the element of every atom, and ${orbit.label} has none`, {
      where,
      expected: "an ion or an element at each of `sites` and `atoms`",
      found: "none",
      remedy: `say what stands on ${orbit.label}`,
    }),
  );
  return null;
}

import { type MagneticGroup, magneticGroup, type TensorForms, tensorForms } from "../magneticgroups/index.js";
import { identityMatrix, zeroVector } from "../numbers/index.js";
import { type Cell, operatorFrom, type SpaceGroup } from "../spacegroups/index.js";

/** What symmetry allows of one property: its form in symbols (all `0` where nothing), and where it comes from. */
export interface Property {
  readonly form: readonly string[];
  /** Allowed already in the parent without order. */
  readonly inParent: boolean;
  /** The order allows more of it than the parent. */
  readonly induced: boolean;
}

/** Properties that the magnetic point group decides, in Cartesian axes x ∥ a, z ∥ c* of the parent. */
export interface Consequences {
  readonly netMoment: Property;
  readonly polarization: Property;
  readonly magnetoelectric: Property;
  readonly piezomagnetic: Property;
}

/** Compares magnetic groups with the grey parent, keeping what was found for each point group. */
export function consequencesIn(parent: SpaceGroup, cell: Cell): (group: MagneticGroup) => Consequences {
  const grey = magneticGroup(parent.lattice, [
    { operator: operatorFrom(identityMatrix, zeroVector), timeReversal: -1 },
    ...parent.operators.map((operator) => ({ operator, timeReversal: 1 as const })),
  ]);
  const before = tensorForms(grey, cell);
  const known = new Map<string, Consequences>();
  return (group) => {
    const key = group.operators
      .map(
        ({ operator, timeReversal }) => `${operator.rotation.join()}/${operator.rotationDenominator} ${timeReversal}`,
      )
      .sort()
      .join(";");
    const found = known.get(key) ?? compared(before, tensorForms(group, cell));
    known.set(key, found);
    return found;
  };
}

function compared(before: TensorForms, after: TensorForms): Consequences {
  const property = (name: keyof TensorForms): Property => {
    const [parent, own] = [freedom(before[name]), freedom(after[name])];
    return { form: after[name], inParent: parent > 0, induced: own > parent };
  };
  return {
    netMoment: property("netMoment"),
    polarization: property("polarization"),
    magnetoelectric: property("magnetoelectric"),
    piezomagnetic: property("piezomagnetic"),
  };
}

/** Number of independent symbols of a form. */
function freedom(form: readonly string[]): number {
  return new Set(form.flatMap((text) => text.match(/[A-Za-zα-ωΑ-Ω]+[0-9a-z]*/g) ?? [])).size;
}

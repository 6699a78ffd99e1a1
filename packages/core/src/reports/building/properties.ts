import type { Consequences, Property } from "../../configurations/index.js";
import type { PropertyRecord } from "../records/configurations.js";

type Properties = { readonly [name in keyof Consequences]: PropertyRecord | null };

/** What the magnetic point group allows; all null without a cell. */
export function propertyRecords(consequences: Consequences | null): Properties {
  const of = (property: Property | undefined): PropertyRecord | null =>
    property === undefined
      ? null
      : { form: [...property.form], inParent: property.inParent, induced: property.induced };
  return {
    netMoment: of(consequences?.netMoment),
    polarization: of(consequences?.polarization),
    magnetoelectric: of(consequences?.magnetoelectric),
    piezomagnetic: of(consequences?.piezomagnetic),
  };
}

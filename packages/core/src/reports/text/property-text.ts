import type { ConfigurationRecord, PropertyRecord } from "../records/configurations.js";

type WithProperties = Pick<ConfigurationRecord, "netMoment" | "polarization" | "magnetoelectric" | "piezomagnetic">;

/** The non-zero components; `–` where nothing is allowed, blank where it was not worked out. */
export function allowedText(property: PropertyRecord | null): string {
  if (property === null) return "";
  const shown = property.form.every((entry) => entry === "0") ? "–" : `(${property.form.join(", ")})`;
  return property.inParent && !property.induced && shown !== "–" ? `${shown} as before` : shown;
}

/** Each property with its form, for a list of fields. */
export function propertyFields(one: WithProperties): [string, string][] {
  const entry = (name: string, property: PropertyRecord | null, width: number): [string, string][] => {
    if (property === null) return [];
    if (property.form.every((value) => value === "0")) return [[name, "not allowed"]];
    const rows = Array.from({ length: property.form.length / width }, (_, row) =>
      property.form.slice(row * width, (row + 1) * width).join(" "),
    );
    const origin = property.induced ? "" : property.inParent ? " (in the parent already)" : "";
    return [[name, (rows.length === 1 ? `(${property.form.join(", ")})` : rows.join(" | ")) + origin]];
  };
  return [
    ...entry("Net moment", one.netMoment, 3),
    ...entry("Polarization", one.polarization, 3),
    ...entry("Magnetoelectric", one.magnetoelectric, 3),
    ...entry("Piezomagnetic", one.piezomagnetic, 6),
  ];
}

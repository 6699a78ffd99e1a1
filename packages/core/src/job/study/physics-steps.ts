import type { ExchangeRecord, KRecord, OnsetRecord } from "../../reports/index.js";

/** What the exchange constants and the temperature scan of a study say against the k that was followed. */
export function physicsSteps(exchange: ExchangeRecord | null, onset: OnsetRecord | null): string[] {
  return [...(exchange === null ? [] : exchangeSteps(exchange)), ...(onset === null ? [] : onsetSteps(onset))];
}

/** Share of the energy within which a k is as low as the minimum. */
const sameEnergy = 1e-8;

/** A model that prefers another k: its constants are wrong, or something that is not in it decides. */
function exchangeSteps({ ground, atK }: ExchangeRecord): string[] {
  if (ground === null) return [];
  const preferred = ground.vectors.map(({ k }) => k);
  return atK.flatMap(({ from, k, above }) => {
    if (from !== "given" || above <= sameEnergy * Math.abs(ground.energy)) return [];
    if (preferred.some((one) => isNear(one, k))) return [];
    const first = vectorText(preferred[0] as KRecord);
    const others = preferred.length > 1 || ground.dimension > ground.freeDirections ? " (and others as low)" : "";
    const open = Object.keys(k.values).length > 0;
    return [
      `The exchange constants prefer k = ${first}${others}; k = ${vectorText(k)} lies ${Number(above.toPrecision(4))} a spin higher. Check their signs (J > 0 is antiferromagnetic) and which bonds they stand for; ${open ? "kvane exchange with --k says which constants would put the minimum there" : "anisotropy or constants of farther bonds may decide too"}.`,
    ];
  });
}

/** Reciprocal lattice units: how far a computed and a measured value of a letter may differ without uncertainties. */
const nearValue = 0.002;

/** Whether both are the same line or plane with values that agree within 3 s.u. */
function isNear(computed: KRecord, measured: KRecord): boolean {
  if (computed.components.join() !== measured.components.join()) return false;
  return Object.entries(measured.values).every(([letter, value]) => {
    const su = measured.su[letter] ?? null;
    const other = computed.values[letter];
    return other !== undefined && Math.abs(other - value) <= (su === null ? nearValue : 3 * su);
  });
}

/** `(0, 0.344, 0)`: letters as their values. */
function vectorText({ components, numeric }: KRecord): string {
  const shown = components.map((one, axis) => (/[uvw]/.test(one) ? Number((numeric?.[axis] ?? 0).toFixed(4)) : one));
  return `(${shown.join(", ")})`;
}

/** A component of k that locks in: below, the structure has one magnetic cell, and k is a fraction. */
function onsetSteps({ k }: OnsetRecord): string[] {
  return k.flatMap(({ name, behaviour, plateaus }) => {
    if (behaviour !== "lock-in") return [];
    const locked = plateaus.filter(({ fraction }) => fraction !== null);
    const where = locked.map(({ fraction, from, to }) => `at ${fraction} from ${from} to ${to} K`).join(" and ");
    const fractions = [...new Set(locked.map(({ fraction }) => fraction))].join(" or ");
    return [
      `${name} locks in ${where} and slides elsewhere: for peaks measured there give k with the fraction (${fractions}), so that the magnetic cell is found; elsewhere the structure is incommensurate, and k belongs to one temperature.`,
    ];
  });
}

/** Significant digits of every float that leaves kvane, and of those in mode data. */
export const significantDigits = 12;
export const modeSignificantDigits = 10;

/** Values below this share of their scale are rounding noise and become 0. */
export const noiseShare = 1e-12;

/**
 * The one way a float leaves kvane: rounded to `digits` significant digits, 0 when its size is below 1e-12 of `scale`,
 * never −0.
 *
 * @param scale the size that the value is to be seen against (its vector's length, the largest of its list)
 */
export function roundNumber(value: number, scale = 1, digits = significantDigits): number {
  if (!Number.isFinite(value)) return value;
  if (Math.abs(value) < noiseShare * Math.abs(scale)) return 0;
  return Number(value.toPrecision(digits)) + 0;
}

/** A number with a fixed number of decimals for tables; never `-0.000`. */
export function fixedNumber(value: number, decimals: number): string {
  const text = value.toFixed(decimals);
  return /^-0\.?0*$/.test(text) ? text.slice(1) : text;
}

/**
 * A value with its standard uncertainty in the trade's short form, `0.4720(4)`: two digits of the uncertainty below
 * 20, one above (rule of 19, Acta Crystallographica notes for authors). Without an uncertainty, `decimals` decimals.
 */
export function withUncertainty(value: number, uncertainty: number | null, decimals = 4): string {
  if (uncertainty === null || !(uncertainty > 0) || !Number.isFinite(uncertainty)) return fixedNumber(value, decimals);
  const exponent = Math.floor(Math.log10(uncertainty));
  const leading = uncertainty / 10 ** exponent;
  const places = Math.max(0, (leading < 1.95 ? 1 : 0) - exponent);
  const counted = Math.round(uncertainty * 10 ** places);
  return `${fixedNumber(value, places)}(${counted})`;
}

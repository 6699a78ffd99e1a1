import type { WeightedResiduals } from "../algorithms/index.js";
import type { FitForms } from "./fit-forms.js";
import type { IntensityData } from "./types.js";

/**
 * Parameters of one fit: amplitudes, then the fractions of the domains (up to a common factor), then the scale; which of
 * the last two are fitted.
 */
export interface FitLayout {
  readonly amplitudes: number;
  /** 0 where the fractions are fixed. */
  readonly fractions: number;
  readonly fitsScale: boolean;
  readonly size: number;
  /** Scale where it is not fitted: the given one, or 1 for relative sizes. */
  readonly fixedScale: number;
  /** Fractions where they are not fitted. */
  readonly fixedFractions: Float64Array;
}

/** Which parameters a fit of these data has. */
export function fitLayout(forms: FitForms, data: IntensityData, freeDomains: boolean): FitLayout {
  const fractions = freeDomains && forms.domains.length > 1 ? forms.domains.length : 0;
  const fitsScale = data.scale === null && forms.constants.some((value) => value !== 0);
  const operators = forms.domains.reduce((sum, list) => sum + list.length, 0);
  return {
    amplitudes: forms.size,
    fractions,
    fitsScale,
    size: forms.size + fractions + (fitsScale ? 1 : 0),
    fixedScale: data.scale ?? 1,
    fixedFractions: Float64Array.from(forms.domains, (list) => list.length / operators),
  };
}

/** Scale and fractions (sum 1) that the parameters mean. */
export function readParameters(
  layout: FitLayout,
  parameters: Float64Array,
): { readonly amplitudes: Float64Array; readonly fractions: Float64Array; readonly scale: number } {
  const { amplitudes, fractions } = layout;
  const raw = parameters.subarray(amplitudes, amplitudes + fractions);
  const total = raw.reduce((sum, value) => sum + value, 0);
  return {
    amplitudes: parameters.subarray(0, amplitudes),
    fractions:
      fractions === 0 ? layout.fixedFractions : raw.map((value) => (total > 0 ? value / total : 1 / fractions)),
    scale: layout.fitsScale ? (parameters[layout.size - 1] as number) : layout.fixedScale,
  };
}

/** Calculated intensities and their derivatives, analytic. */
export function calculated(
  forms: FitForms,
  layout: FitLayout,
  parameters: Float64Array,
): { readonly values: Float64Array; readonly derivatives: Float64Array } {
  const { amplitudes, fractions, scale } = readParameters(layout, parameters);
  const count = forms.constants.length;
  const values = new Float64Array(count);
  const derivatives = new Float64Array(count * layout.size);
  const own = new Float64Array(forms.domains.length);
  const rest = parameters
    .subarray(layout.amplitudes, layout.amplitudes + layout.fractions)
    .reduce((sum, value) => sum + value, 0);
  for (let datum = 0; datum < count; datum++) {
    const start = datum * layout.size;
    let magnetic = 0;
    for (let domain = 0; domain < own.length; domain++) {
      const weight = fractions[domain] as number;
      own[domain] = addForm(
        forms.forms[domain]?.[datum] as Float64Array,
        amplitudes,
        derivatives,
        start,
        2 * scale * weight,
      );
      magnetic += weight * (own[domain] as number);
    }
    const unscaled = (forms.constants[datum] as number) + magnetic;
    values[datum] = scale * unscaled;
    // w_d = y_d / Σ y: ∂I/∂y_d = s (I_d − I) / Σ y.
    for (let domain = 0; domain < layout.fractions; domain++)
      derivatives[start + layout.amplitudes + domain] =
        rest > 0 ? (scale * ((own[domain] as number) - magnetic)) / rest : 0;
    if (layout.fitsScale) derivatives[start + layout.size - 1] = unscaled;
  }
  return { values, derivatives };
}

/** `aᵀ A a`; adds `factor · A a` to the derivatives. */
function addForm(
  matrix: Float64Array,
  amplitudes: Float64Array,
  derivatives: Float64Array,
  start: number,
  factor: number,
): number {
  const size = amplitudes.length;
  let sum = 0;
  for (let a = 0; a < size; a++) {
    let row = 0;
    for (let b = 0; b < size; b++) row += (matrix[a * size + b] as number) * (amplitudes[b] as number);
    sum += row * (amplitudes[a] as number);
    derivatives[start + a] = (derivatives[start + a] as number) + factor * row;
  }
  return sum;
}

/** `(observed − calculated)/s` and derivatives over s. */
export function residualModel(
  forms: FitForms,
  layout: FitLayout,
  { data }: IntensityData,
): (parameters: Float64Array) => WeightedResiduals {
  return (parameters) => {
    const { values, derivatives } = calculated(forms, layout, parameters);
    const residuals = new Float64Array(values.length);
    data.forEach(({ observed, uncertainty }, index) => {
      residuals[index] = (observed - (values[index] as number)) / uncertainty;
      const start = index * layout.size;
      for (let at = start; at < start + layout.size; at++) derivatives[at] = (derivatives[at] as number) / uncertainty;
    });
    return { residuals, jacobian: derivatives };
  };
}

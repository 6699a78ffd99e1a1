import { choleskyFactor, choleskySolve } from "../algorithms/index.js";

/** What moments of one size on all atoms of a site need of the amplitudes. */
export type ConstantMoment = "always" | "possible" | "impossible";

/** Squared residual per equation below which a solution counts: sizes are scaled to 1. */
const residualLimit = 1e-14;
const starts = 8;
const mostSteps = 80;

/**
 * Whether real amplitudes exist that give all representatives of one site moments of one non-zero size.
 *
 * @param amplitudes amplitudes × representatives × three components
 * @param metric nine numbers
 */
export function constantMoment(
  amplitudes: readonly (readonly (readonly number[])[])[],
  metric: readonly number[],
): ConstantMoment {
  const count = amplitudes[0]?.length ?? 0;
  if (amplitudes.length === 0) return "impossible";
  if (count === 1) return "always";
  const forms = Array.from({ length: count }, (_, atom) =>
    gram(
      amplitudes.map((row) => row[atom] as number[]),
      metric,
    ),
  );
  if (forms.some((form) => form.every((entry) => Math.abs(entry) < 1e-12))) return "impossible";
  const first = forms[0] as readonly number[];
  const scale = Math.max(...first.map(Math.abs));
  if (forms.every((form) => form.every((entry, index) => Math.abs(entry - (first[index] as number)) < 1e-9 * scale)))
    return "always";
  for (let start = 0; start < starts; start++) if (solve(forms, amplitudes.length, start)) return "possible";
  return "impossible";
}

/** The quadratic form of |m|² in the amplitudes. */
function gram(rows: readonly (readonly number[])[], metric: readonly number[]): number[] {
  return rows.flatMap((left) =>
    rows.map((right) => {
      let sum = 0;
      for (let i = 0; i < 3; i++)
        for (let j = 0; j < 3; j++) sum += (left[i] as number) * (metric[3 * i + j] as number) * (right[j] as number);
      return sum;
    }),
  );
}

/** Levenberg–Marquardt on xᵀFx = 1 for every form F. */
function solve(forms: readonly (readonly number[])[], size: number, start: number): boolean {
  const trace = forms.reduce((sum, form) => {
    let own = 0;
    for (let index = 0; index < size; index++) own += form[index * size + index] as number;
    return sum + own / forms.length;
  }, 0);
  let x = Float64Array.from(
    { length: size },
    (_, index) => Math.sin(1.7 * (start + 1) * (index + 1) + start) / Math.sqrt(trace / 2),
  );
  let current = evaluate(forms, x);
  let damping = 1e-3;
  for (let step = 0; step < mostSteps && current.cost > residualLimit * forms.length; step++) {
    const normal = new Float64Array(size * size);
    const right = new Float64Array(size);
    current.gradients.forEach((gradient, equation) => {
      for (let a = 0; a < size; a++) {
        right[a] = (right[a] as number) - (gradient[a] as number) * (current.residuals[equation] as number);
        for (let b = 0; b < size; b++)
          normal[a * size + b] = (normal[a * size + b] as number) + (gradient[a] as number) * (gradient[b] as number);
      }
    });
    let mean = 0;
    for (let a = 0; a < size; a++) mean += (normal[a * size + a] as number) / size;
    for (let a = 0; a < size; a++) normal[a * size + a] = (normal[a * size + a] as number) + damping * (mean + 1e-12);
    const factor = choleskyFactor(normal, size);
    if (factor === null) return false;
    const move = choleskySolve(factor, right);
    const next = Float64Array.from(x, (entry, index) => entry + (move[index] as number));
    const there = evaluate(forms, next);
    if (there.cost < current.cost) {
      if (current.cost - there.cost < 1e-7 * current.cost && current.cost > 1e-6) return false;
      [x, current, damping] = [next, there, damping / 4];
    } else damping *= 8;
    if (damping > 1e12) return false;
  }
  return current.cost <= residualLimit * forms.length;
}

function evaluate(forms: readonly (readonly number[])[], x: Float64Array) {
  const size = x.length;
  const residuals: number[] = [];
  const gradients: Float64Array[] = [];
  let cost = 0;
  for (const form of forms) {
    const gradient = new Float64Array(size);
    let value = -1;
    for (let a = 0; a < size; a++) {
      let sum = 0;
      for (let b = 0; b < size; b++) sum += (form[a * size + b] as number) * (x[b] as number);
      gradient[a] = 2 * sum;
      value += sum * (x[a] as number);
    }
    residuals.push(value);
    gradients.push(gradient);
    cost += value * value;
  }
  return { residuals, gradients, cost };
}

import { type Problem, problem } from "../errors/index.js";
import { formatWaveVector } from "../kvectors/index.js";
import type { KindFindings } from "./explanation.js";
import type { SearchKind } from "./search-kind.js";
import { saturatingLeaves } from "./solve-flat.js";
import type { Certificate, KindCertificate, SearchOptions } from "./types.js";

/** Boxes after which a search is stopped unless it is asked to go further: some ten seconds. */
export const defaultMostBoxes = 5_000_000;

/** A kind with what its search gave. */
export interface SearchedKind {
  readonly kind: SearchKind;
  readonly findings: KindFindings;
}

/** What was gone through, kind by kind and as a whole. */
export function certificateOf(
  searched: readonly SearchedKind[],
  options: SearchOptions,
  minimumMatched: number,
): Certificate {
  const kinds = searched.map(({ kind, findings }): KindCertificate => {
    const undecided = findings.regions.filter(({ decided }) => !decided).length;
    return {
      kind: kind.form,
      dimension: kind.dimension,
      boxes: findings.boxes,
      leaves: findings.leaves,
      regions: findings.regions.length,
      undecided,
      unexplored: findings.unexplored,
      saturated: findings.stopped === "leaves",
      allWeighed: findings.complete,
    };
  });
  const stopped = kinds.filter(({ unexplored }) => unexplored > 0);
  const smallest = searched.map(({ findings }) => findings.smallestBox).filter((size) => size > 0);
  return {
    minimumMatched,
    boxes: kinds.reduce((sum, { boxes }) => sum + boxes, 0),
    smallestBox: smallest.length === 0 ? 0 : Math.min(...smallest),
    exhaustive: stopped.length === 0,
    maxDimension: Math.max(0, ...kinds.map(({ dimension }) => dimension)) as 0 | 1 | 2 | 3,
    zeroShift: options.zeroShift,
    cellScale: options.cellScale,
    stopped: stopped.length === 0 ? null : stopped.map(reasonOf).join("; "),
    kinds,
  };
}

function reasonOf({ kind, saturated, unexplored }: KindCertificate): string {
  const where = `${formatWaveVector(kind)}: ${percent(unexplored)} not looked at, `;
  return where + (saturated ? `more than ${saturatingLeaves} places fit` : "the budget of boxes was spent");
}

function percent(share: number): string {
  return share > 0.1 ? `${Math.round(100 * share)} %` : `${(100 * share).toPrecision(2)} %`;
}

/** What a reader must know before trusting the ranking. */
export function certificateWarnings({ kinds, stopped }: Certificate): readonly Problem[] {
  const warnings: Problem[] = [];
  if (stopped !== null)
    warnings.push(
      problem("search-stopped", `the search did not go to its end: ${stopped}`, {
        expected: "every box of every kind settled",
        found: stopped,
        remedy: "give more peaks, fewer --unmatched, a smaller --tolerance, or search fewer kinds with --max-dimension",
      }),
    );
  const cut = kinds.filter(({ allWeighed }) => !allWeighed);
  if (cut.length > 0)
    warnings.push(
      problem(
        "search-saturated",
        `so many k of ${cut.map(({ kind }) => formatWaveVector(kind)).join(", ")} fit that only the best by a quick score were weighed`,
        {
          expected: "peaks that restrict k to a few places",
          found: `${cut.reduce((sum, { regions }) => sum + regions, 0)} regions`,
          remedy: "give more peaks or smaller uncertainties; the regions are listed in the result",
        },
      ),
    );
  return warnings;
}

import { smallIrreps } from "@kvane/core/irreps";
import { atlas, type WaveVector } from "@kvane/core/kvectors";
import { groupFromSetting, type SpaceGroup, tabulatedSettings } from "@kvane/core/spacegroups";
import { processorTime } from "./clocks.js";
import type { Part } from "./part.js";

interface Question {
  readonly group: SpaceGroup;
  readonly k: WaveVector;
  readonly order: number;
}

/** Small irreps at every kind of k of the 230 groups: the cost of one by the order of the little co-group. */
export const irreps: Part = {
  name: "irreps",
  measure: async ({ few }) => {
    const questions = allQuestions();
    const sweeps: Map<number, number>[] = [];
    let count = 0;
    let seconds = 0;
    for (let sweep = 0; sweep <= few; sweep += 1) {
      const found = await costs(questions);
      // The first one warms up.
      if (sweep > 0) sweeps.push(found.perIrrep);
      ({ count, seconds } = found);
    }
    const [first] = sweeps as [Map<number, number>];
    const [cheapest] = [...first].reduce((least, one) => (one[1] < least[1] ? one : least));
    const rows = [...first.keys()]
      .sort((a, b) => a - b)
      .map((order) => ({
        what: `an irrep, little co-group of order ${order}`,
        over: `one of order ${cheapest}`,
        ratios: sweeps.map((costs) => (costs.get(order) as number) / (costs.get(cheapest) as number)),
      }));
    const note = `${questions.length} kinds of k with ${count} irreps took ${seconds.toFixed(1)} s of the processor`;
    return { rows, notes: [note] };
  },
};

function allQuestions(): Question[] {
  return tabulatedSettings()
    .filter(({ standard }) => standard)
    .flatMap((setting) => {
      const group = groupFromSetting(setting);
      const kinds = atlas(group, { withInversion: false });
      return kinds.map(({ k, littleCoGroup }) => ({ group, k, order: littleCoGroup.order }));
    });
}

/** Time per irrep by order, all questions once. */
async function costs(questions: readonly Question[]) {
  const byOrder = new Map<number, { irreps: number; time: number }>();
  for (const { group, k, order } of questions) {
    let found = 0;
    const time = await processorTime(() => {
      found = smallIrreps(group, k).irreps.length;
    });
    const row = byOrder.get(order) ?? { irreps: 0, time: 0 };
    byOrder.set(order, { irreps: row.irreps + found, time: row.time + time });
  }
  const rows = [...byOrder.values()];
  return {
    perIrrep: new Map([...byOrder].map(([order, { irreps, time }]) => [order, time / irreps])),
    count: rows.reduce((sum, { irreps }) => sum + irreps, 0),
    seconds: rows.reduce((sum, { time }) => sum + time, 0) / 1000,
  };
}

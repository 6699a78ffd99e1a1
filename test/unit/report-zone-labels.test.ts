import { answer, hostOfTexts } from "@kvane/core/job";
import type { RunRecord } from "@kvane/core/reports";
import { expect, test } from "vitest";
import { dot, plus, size, type Vector } from "#core/reports/svg/space.js";
import { zoneData } from "#core/reports/svg/zone-data.js";

// In 4/m m m, (0,1/2,1/2) and (1/2,0,1/2) are arms of one star: the label must stand on the one that was written.
test.each([
  ["[0, 1/2, 1/2]", "b*"],
  ["[1/2, 0, 1/2]", "a*"],
])("the label of k = %s stands on the side of %s", async (k, axis) => {
  const study = `group: P 4/m b m\ncell: {a: 7.352, b: 7.352, c: 3.896, alpha: 90, beta: 90, gamma: 90}\nk: [${k}]\n`;
  const sites = "sites: [{label: Tb1, at: [0.171, 0.671, 1/2]}]\n";
  const { result } = await answer({ command: "run", study: "s.yaml" }, hostOfTexts({ "s.yaml": study + sites }));
  const data = zoneData(result as RunRecord);
  const [mark] = data?.marks ?? [];
  expect(mark?.places).toHaveLength(8);
  expect(mark?.own).toBe(4);
  const along = data?.axes.find(({ name }) => name === axis)?.to as Vector;
  const third = data?.axes.find(({ name }) => name === "c*")?.to as Vector;
  for (const place of mark?.places.slice(0, mark.own) ?? []) {
    const flat = plus(place, third, -dot(place, third) / size(third) ** 2);
    expect(Math.abs(dot(flat, along))).toBeCloseTo(size(flat) * size(along), 9);
  }
});

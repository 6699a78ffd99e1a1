import { pathToFileURL } from "node:url";
import { describe, expect, test } from "vitest";
import { median, pairedRatios } from "../bench/paired.js";
import { sharesOf } from "../bench/profile-shares.js";
import { tableText } from "../bench/table.js";

describe("the bench", () => {
  test("measures in turn, and which is first in turn too", async () => {
    const order: string[] = [];
    const takes = (name: string, times: number[]) => () => {
      order.push(name);
      return times.shift() as number;
    };
    const found = await pairedRatios(3, takes("own", [4, 9, 8]), takes("reference", [2, 3, 1]));
    expect(order.join(" ")).toBe("reference own own reference reference own");
    expect(found).toEqual({ ratios: [2, 3, 8], reference: 2 });
    expect(median([1, 4, 2, 8])).toBe(3);
  });

  test("prints medians with least and most, and marks what is above its bound", () => {
    const rows = [
      { what: "a", over: "node", ratios: [1.7, 1.5, 2], bound: 1.6 },
      { what: "longer", over: "node", ratios: [123.4, 12.34, 0.0123] },
      { what: "c", over: "node", ratios: [1.6], bound: 1.6 },
    ];
    const table = [
      "what    over  ratio  least  most",
      "a *     node   1.70   1.50  2.00",
      "longer  node   12.3  0.012   123",
      "c       node   1.60   1.60  1.60",
      "",
      "- * above 1.6, which it should keep below",
      "- said",
      "",
    ];
    expect(tableText([{ rows, notes: ["said"] }])).toBe(table.join("\n"));
  });

  test("adds up a profile by room, without the time in which nothing ran", () => {
    const url = (path: string) => pathToFileURL(`/core/dist/${path}`).href;
    const node = (id: number, functionName: string, from: string) => ({
      id,
      callFrame: { functionName, url: from, scriptId: "", lineNumber: 0, columnNumber: 0 },
    });
    const nodes = [
      node(1, "locate", url("search/locate.js")),
      node(2, "visit", url("search/deep/leaf.js")),
      node(3, "(garbage collector)", ""),
      node(4, "(idle)", ""),
      node(5, "compile", "node:internal/modules/esm/utils"),
      node(6, "scaleLinear", "file:///core/node_modules/d3-scale/src/linear.js"),
      node(7, "read", "node:fs"),
    ];
    // A sample has the time to the next one.
    const profile = {
      nodes,
      startTime: 0,
      endTime: 90,
      samples: [1, 2, 3, 4, 5, 6, 7, 1],
      timeDeltas: [9, 20, 10, 10, 40, 5, 5, 10],
    };
    expect(sharesOf(profile, "/core/dist")).toEqual({
      search: 0.5,
      "garbage collection": 1 / 6,
      "module loading": 1 / 12,
      "package d3": 1 / 12,
      "node itself": 1 / 6,
    });
  });
});

import { curveBumpX, line } from "d3-shape";
import type { AnyConfiguration, ConfigurationsRecord } from "../records/configurations.js";
import { groupSymbol } from "./drawn-configurations.js";
import { type Figure, textWidth } from "./figure.js";
import { layeredLayout } from "./layered-layout.js";
import { coordinate, element, escapeMarkup } from "./mark-up.js";
import { paint } from "./palette.js";

const margin = 12;
const headHeight = 28;
const boxHeight = 42;
const spaceBetween = 14;
const gap = 78;
const arrowHead = 8;

/** One box: the parent, or a configuration. */
interface Node {
  readonly head: string;
  readonly symbol: string;
  readonly layer: number;
  /** More than one order parameter. */
  readonly dashed: boolean;
}

/**
 * The groups of a list of configurations as boxes, from left to right by their index in the parent; lines lead to the
 * maximal subgroups among them, and from the parent to those that are in no other.
 */
export function configurationGraph(record: ConfigurationsRecord): Figure {
  const { configurations } = record;
  const indices = [...new Set(configurations.map(({ index }) => index))].sort((a, b) => a - b);
  const nodes: Node[] = [
    { head: "parent", symbol: parentSymbol(record), layer: 0, dashed: false },
    ...configurations.map((one) => ({
      head: one.id,
      symbol: groupSymbol(one),
      layer: indices.indexOf(one.index) + 1,
      dashed: isDashed(one),
    })),
  ];
  const lines = configurations.flatMap(({ id, subgroupOf }, index) => {
    const above = subgroupOf.map((other) => configurations.findIndex((one) => one.id === other) + 1);
    const found = above.filter((other) => other > 0);
    return (found.length > 0 ? found : [0]).map((from) => ({
      from,
      to: index + 1,
      name: `${nodes[from]?.head ?? ""} to ${id}`,
    }));
  });
  const layout = layeredLayout(
    nodes.map(({ layer }) => ({ layer, size: boxHeight + spaceBetween })),
    lines.map(({ from, to }) => [from, to]),
  );
  const widths = ["index 1", ...indices.map((index) => `index ${index}`)].map((head, layer) =>
    Math.ceil(
      Math.max(
        textWidth(head),
        ...nodes
          .filter((node) => node.layer === layer)
          .map((node) => Math.max(textWidth(node.head, 14), textWidth(node.symbol, 13)) + 24),
      ),
    ),
  );
  const lefts = widths.map((_, layer) => widths.slice(0, layer).reduce((sum, width) => sum + width + gap, margin));
  const place = (node: number): Box => {
    const layer = nodes[node]?.layer ?? 0;
    return {
      left: lefts[layer] as number,
      right: (lefts[layer] as number) + (widths[layer] as number),
      middle: headHeight + margin + (layout.places[node] as number),
    };
  };
  const last = widths.length - 1;
  return {
    width: Math.ceil((lefts[last] as number) + (widths[last] as number) + margin),
    height: Math.ceil(headHeight + 2 * margin + layout.extent),
    title: "Subgroup relations of the configurations",
    description: `${configurations.length} magnetic groups by their index in the parent; lines lead from a group to its subgroups in the list. The list below says the same.`,
    marks: [
      ...widths.map((width, layer) =>
        columnHead(layer === 0 ? "index 1" : `index ${indices[layer - 1]}`, (lefts[layer] as number) + width / 2),
      ),
      ...lines.map(({ from, to, name }, index) => {
        const passed = (layout.passes[index] ?? []).flatMap(({ layer, place: at }): [number, number][] => {
          const y = headHeight + margin + at;
          return [
            [lefts[layer] as number, y],
            [(lefts[layer] as number) + (widths[layer] as number), y],
          ];
        });
        return lineMarks(place(from), passed, place(to), { name, ofParent: from === 0 });
      }),
      ...nodes.map((node, index) => boxMarks(node, place(index), index === 0)),
    ].join(""),
  };
}

/** Every relation of the graph in words, one line for each configuration. */
export function relationTexts({ configurations }: ConfigurationsRecord): string[] {
  return configurations.map(
    (one) =>
      `${one.id}, ${groupSymbol(one)}, index ${one.index}: ${one.subgroupOf.length > 0 ? `subgroup of ${one.subgroupOf.join(", ")}` : "in no other group of the list"}${isDashed(one) ? "; more than one order parameter" : ""}`,
  );
}

/** Whether a configuration needs more than one order parameter. */
export function isDashed(one: AnyConfiguration): boolean {
  return one.severalIrreps || ("needsSecondOrderParameter" in one && one.needsSecondOrderParameter);
}

/** The grey group: the parent's symbol with 1′ behind it. */
function parentSymbol({ group }: ConfigurationsRecord): string {
  return group.hermannMauguin === null ? "with time reversal" : `${group.hermannMauguin} 1'`;
}

interface Box {
  readonly left: number;
  readonly right: number;
  readonly middle: number;
}

function columnHead(text: string, x: number): string {
  return element("text", { x, y: margin + 10, "text-anchor": "middle", ...paint({ fill: "faint" }) }, text);
}

function lineMarks(
  from: Box,
  passed: readonly [number, number][],
  to: Box,
  { name, ofParent }: { readonly name: string; readonly ofParent: boolean },
): string {
  const tip = to.left - 2;
  const path = line<readonly [number, number]>().digits(2).curve(curveBumpX)([
    [from.right, from.middle],
    ...passed,
    [tip - arrowHead, to.middle],
  ]);
  const role = ofParent ? "faint" : "accent";
  const y = coordinate(to.middle);
  const corner = `${coordinate(tip - arrowHead)} `;
  return element(
    "g",
    { class: ofParent ? "of-parent" : "subgroup" },
    element("title", {}, escapeMarkup(name)),
    element("path", { d: path, "stroke-width": 1.6, ...paint({ stroke: role, fill: "none" }) }),
    element("path", {
      d: `M${coordinate(tip)} ${y}L${corner}${coordinate(to.middle - 3.6)}L${corner}${coordinate(to.middle + 3.6)}Z`,
      ...paint({ fill: role }),
    }),
  );
}

function boxMarks({ head, symbol, dashed }: Node, { left, right, middle }: Box, isParent: boolean): string {
  const x = (left + right) / 2;
  const letters = (text: string, y: number, size: number, weight: string | null) =>
    element(
      "text",
      { x, y, "text-anchor": "middle", "font-size": size, "font-weight": weight, ...paint({ fill: "ink" }) },
      escapeMarkup(text),
    );
  return element(
    "g",
    { class: isParent ? "parent" : "configuration" },
    element("rect", {
      x: left,
      y: middle - boxHeight / 2,
      width: right - left,
      height: boxHeight,
      rx: 5,
      "stroke-width": 1.4,
      "stroke-dasharray": dashed ? "5 3" : null,
      ...paint({ fill: "panel", stroke: isParent ? "faint" : "accent" }),
    }),
    letters(head, middle - 4, 14, isParent ? null : "600"),
    letters(symbol, middle + 14, 13, null),
  );
}

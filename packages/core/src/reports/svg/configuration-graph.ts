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

/** An arrow from a group to its subgroup, by the numbers of the boxes. */
interface Line {
  readonly from: number;
  readonly to: number;
  readonly name: string;
}

interface Graph {
  readonly nodes: readonly Node[];
  readonly lines: readonly Line[];
  /** What stands above each layer. */
  readonly heads: readonly string[];
}

/**
 * The groups of a list of configurations as boxes, from left to right by their index in the parent; lines lead to the
 * maximal subgroups among them, and from the parent to those that are in no other.
 */
export function configurationGraph(record: ConfigurationsRecord): Figure {
  const { nodes, lines, heads } = graphOf(record);
  const layout = layeredLayout(
    nodes.map(({ layer }) => ({ layer, size: boxHeight + spaceBetween })),
    lines.map(({ from, to }) => [from, to]),
  );
  const columns = columnsOf(nodes, heads);
  const column = (layer: number) => columns[layer] as Column;
  const top = headHeight + margin;
  const place = (node: number): Box => ({
    ...column(nodes[node]?.layer ?? 0),
    middle: top + (layout.places[node] as number),
  });
  return {
    width: Math.ceil(column(columns.length - 1).right + margin),
    height: Math.ceil(top + layout.extent + margin),
    title: "Subgroup relations of the configurations",
    description: `${record.configurations.length} magnetic groups by their index in the parent; arrows lead from a group to its subgroups in the list. The report says the same in words.`,
    marks: [
      ...columns.map(({ left, right }, layer) => columnHead(heads[layer] ?? "", (left + right) / 2)),
      ...lines.map((one, index) => {
        const passed = (layout.passes[index] ?? []).flatMap(({ layer, place: at }): [number, number][] => [
          [column(layer).left, top + at],
          [column(layer).right, top + at],
        ]);
        return lineMarks(place(one.from), passed, place(one.to), one);
      }),
      ...nodes.map((node, index) => boxMarks(node, place(index), index === 0)),
    ].join(""),
  };
}

function graphOf(record: ConfigurationsRecord): Graph {
  const { configurations } = record;
  const layers = layersOf(configurations);
  const nodes: Node[] = [
    { head: "parent", symbol: parentSymbol(record), layer: 0, dashed: false },
    ...configurations.map((one, index) => ({
      head: one.id,
      symbol: groupSymbol(one),
      layer: (layers.of[index] as number) + 1,
      dashed: severalParameters(one),
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
  return { nodes, lines, heads: ["", ...layers.indices.map((index) => `index ${index}`)] };
}

/**
 * The layer of each configuration, from 0, and the index of each layer. Groups of one index that are in each other, as
 * those of waves may be where only a phase becomes free, stand in layers after each other.
 */
function layersOf(configurations: readonly AnyConfiguration[]) {
  const depths = configurations.map(() => 0);
  // No chain is longer than the list.
  for (let step = 0; step < configurations.length; step++)
    configurations.forEach(({ index, subgroupOf }, place) => {
      configurations.forEach((other, above) => {
        if (other.index === index && subgroupOf.includes(other.id))
          depths[place] = Math.min(
            configurations.length,
            Math.max(depths[place] as number, (depths[above] as number) + 1),
          );
      });
    });
  const pairs = configurations.map(({ index }, place) => ({ index, depth: depths[place] as number }));
  const sorted = [...pairs].sort((a, b) => a.index - b.index || a.depth - b.depth);
  const distinct = sorted.filter(
    ({ index, depth }, place) => sorted[place - 1]?.index !== index || sorted[place - 1]?.depth !== depth,
  );
  return {
    of: pairs.map(({ index, depth }) => distinct.findIndex((one) => one.index === index && one.depth === depth)),
    indices: distinct.map(({ index }) => index),
  };
}

interface Column {
  readonly left: number;
  readonly right: number;
}

/** Each as wide as its widest text. */
function columnsOf(nodes: readonly Node[], heads: readonly string[]): Column[] {
  const columns: Column[] = [];
  heads.forEach((head, layer) => {
    const texts = nodes
      .filter((node) => node.layer === layer)
      .map(({ head: id, symbol }) => Math.max(textWidth(id, 14), textWidth(symbol, 13)) + 24);
    const left = (columns.at(-1)?.right ?? margin - gap) + gap;
    columns.push({ left, right: left + Math.ceil(Math.max(textWidth(head), ...texts)) });
  });
  return columns;
}

/** Every relation of the graph in words, one line for each configuration. */
export function relationTexts({ configurations }: ConfigurationsRecord): string[] {
  return configurations.map(
    (one) =>
      `${one.id}, ${groupSymbol(one)}, index ${one.index}: ${one.subgroupOf.length > 0 ? `subgroup of ${one.subgroupOf.join(", ")}` : "in no other group of the list"}${severalParameters(one) ? "; more than one order parameter" : ""}`,
  );
}

/** Whether a configuration needs more than one order parameter. */
export function severalParameters(one: AnyConfiguration): boolean {
  return one.severalIrreps || ("needsSecondOrderParameter" in one && one.needsSecondOrderParameter);
}

/** The grey group: the parent's symbol with 1′ behind it. */
function parentSymbol({ group }: ConfigurationsRecord): string {
  return group.hermannMauguin === null ? "with time reversal" : `${group.hermannMauguin} 1'`;
}

interface Box extends Column {
  readonly middle: number;
}

function columnHead(text: string, x: number): string {
  return element("text", { x, y: margin + 10, "text-anchor": "middle", ...paint({ fill: "faint" }) }, text);
}

function lineMarks(from: Box, passed: readonly [number, number][], to: Box, { name, from: parent }: Line): string {
  const ofParent = parent === 0;
  const tip = to.left - 2;
  const path = line<readonly [number, number]>().curve(curveBumpX)([
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

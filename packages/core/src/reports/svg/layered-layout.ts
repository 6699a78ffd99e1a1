/** A node of a layered graph; lines lead from a lower layer to a higher one. */
export interface LayeredNode {
  readonly layer: number;
  /** Room across its layer. */
  readonly size: number;
}

/** Where the middle of each node is across its layer, and where each line passes the layers between its ends. */
export interface LayeredLayout {
  readonly places: readonly number[];
  readonly passes: readonly (readonly { readonly layer: number; readonly place: number }[])[];
  /** From 0. */
  readonly extent: number;
}

/** Room that a line takes in a layer that it passes. */
const passSize = 18;
const orderSweeps = 8;
const placeSweeps = 12;

interface Slot {
  readonly layer: number;
  readonly size: number;
  readonly before: number[];
  readonly after: number[];
}

/**
 * Places the nodes of each layer so that lines cross little and are short: lines over several layers get a place in
 * each, layers are sorted by the mean place of their neighbours, to and fro, and places move to that mean as far as the
 * order allows (K. Sugiyama, S. Tagawa & M. Toda, IEEE Trans. Syst. Man Cybern. 11 (1981) 109). The same graph gives the
 * same places.
 */
export function layeredLayout(
  nodes: readonly LayeredNode[],
  lines: readonly (readonly [from: number, to: number])[],
): LayeredLayout {
  const slots: Slot[] = nodes.map(({ layer, size }) => ({ layer, size, before: [], after: [] }));
  const link = (from: number, to: number) => {
    slots[from]?.after.push(to);
    slots[to]?.before.push(from);
  };
  const passing = lines.map(([from, to]) => {
    const [first, last] = [slots[from]?.layer ?? 0, slots[to]?.layer ?? 0];
    const between = Array.from({ length: Math.max(0, last - first - 1) }, (_, step) => {
      slots.push({ layer: first + step + 1, size: passSize, before: [], after: [] });
      return slots.length - 1;
    });
    const chain = [from, ...between, to];
    for (let step = 1; step < chain.length; step++) link(chain[step - 1] as number, chain[step] as number);
    return between;
  });
  const layers: number[][] = [];
  slots.forEach(({ layer }, slot) => {
    for (let missing = layers.length; missing <= layer; missing++) layers.push([]);
    layers[layer]?.push(slot);
  });
  sortLayers(layers, slots);
  const places = placesIn(layers, slots);
  const lowest = Math.min(...slots.map(({ size }, slot) => (places[slot] as number) - size / 2));
  const highest = Math.max(...slots.map(({ size }, slot) => (places[slot] as number) + size / 2));
  return {
    places: nodes.map((_, node) => (places[node] as number) - lowest),
    passes: passing.map((between) =>
      between.map((slot) => ({
        layer: (slots[slot] as Slot).layer,
        place: (places[slot] as number) - lowest,
      })),
    ),
    extent: highest - lowest,
  };
}

/** Forwards and backwards: which layer after which, and which neighbours count. */
function sweep(layers: readonly number[][], step: number) {
  const forward = step % 2 === 0;
  return {
    order: forward ? layers : [...layers].reverse(),
    neighbours: ({ before, after }: Slot) => (forward ? before : after),
  };
}

function sortLayers(layers: readonly number[][], slots: readonly Slot[]): void {
  const rank = slots.map(() => 0);
  const number = (layer: readonly number[]) => {
    layer.forEach((slot, index) => {
      rank[slot] = index;
    });
  };
  layers.forEach(number);
  for (let step = 0; step < orderSweeps; step++) {
    const { order, neighbours } = sweep(layers, step);
    for (const layer of order) {
      const mean = new Map(
        layer.map((slot) => [slot, meanOf(neighbours(slots[slot] as Slot), rank) ?? (rank[slot] as number)]),
      );
      layer.sort(
        (a, b) => (mean.get(a) as number) - (mean.get(b) as number) || (rank[a] as number) - (rank[b] as number),
      );
      number(layer);
    }
  }
}

function placesIn(layers: readonly number[][], slots: readonly Slot[]): number[] {
  const places = slots.map(() => 0);
  const put = (layer: readonly number[], wanted: readonly number[]) => {
    const sizes = layer.map((slot) => (slots[slot] as Slot).size);
    spread(wanted, sizes).forEach((place, index) => {
      places[layer[index] as number] = place;
    });
  };
  for (const layer of layers)
    put(
      layer,
      layer.map(() => 0),
    );
  for (let step = 0; step < placeSweeps; step++) {
    const { order, neighbours } = sweep(layers, step);
    for (const layer of order)
      put(
        layer,
        layer.map((slot) => meanOf(neighbours(slots[slot] as Slot), places) ?? (places[slot] as number)),
      );
  }
  return places;
}

function meanOf(neighbours: readonly number[], values: readonly number[]): number | null {
  if (neighbours.length === 0) return null;
  return neighbours.reduce((sum, one) => sum + (values[one] as number), 0) / neighbours.length;
}

/** Places in this order, no two closer than their sizes, as near to the wanted ones as the squares of distances say. */
function spread(wanted: readonly number[], sizes: readonly number[]): number[] {
  // Without the room between them they need only not fall: neighbours that would are taken together at their mean.
  let room = 0;
  const rooms = sizes.map((size, index) => {
    room += index === 0 ? 0 : (size + (sizes[index - 1] as number)) / 2;
    return room;
  });
  const blocks: { sum: number; count: number }[] = [];
  wanted.forEach((want, index) => {
    let block = { sum: want - (rooms[index] as number), count: 1 };
    for (let last = blocks.at(-1); last && last.sum / last.count >= block.sum / block.count; last = blocks.at(-1)) {
      block = { sum: block.sum + last.sum, count: block.count + last.count };
      blocks.pop();
    }
    blocks.push(block);
  });
  const means = blocks.flatMap(({ sum, count }) => Array.from({ length: count }, () => sum / count));
  return means.map((mean, index) => mean + (rooms[index] as number));
}

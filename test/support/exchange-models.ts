import { bondTable, type ExchangeModel, exchangeModel } from "@kvane/core/exchange";
import { type Cell, parseGroup, parseSite, siteOrbit } from "@kvane/core/spacegroups";

/** A model as the papers write it: constants by shell or by one class of its bonds. */
export async function modelOf(
  symbol: string,
  cell: Cell,
  sites: readonly string[],
  constants: Readonly<Record<string, number>>,
  options: { readonly shells?: number; readonly spins?: Readonly<Record<string, number>> } = {},
): Promise<ExchangeModel> {
  const group = await parseGroup(symbol);
  const orbits = sites.map((site) => siteOrbit(group, parseSite(site), cell));
  const wanted = Math.max(...Object.keys(constants).map((name) => Number.parseInt(name, 10)), 1);
  const table = bondTable(group, cell, orbits, { shells: options.shells ?? wanted });
  const given = Object.entries(constants).map(([bond, j]) => ({ bond, between: null, j }));
  return exchangeModel(table, given, options.spins ?? {});
}

export function cellOf(a: number, b: number, c: number, alpha = 90, beta = 90, gamma = 90): Cell {
  return { a, b, c, alpha, beta, gamma };
}

/** Lattices of the papers; third axes are so long that no shell that is used reaches the next layer. */
export const lattices = {
  chain: ["P 4/m m m", cellOf(40, 40, 3), ["M 0 0 0"]],
  square: ["P 4/m m m", cellOf(4, 4, 40), ["M 0 0 0"]],
  triangular: ["P 6/m m m", cellOf(4, 4, 40, 90, 90, 120), ["M 0 0 0"]],
  honeycomb: ["P 6/m m m", cellOf(4, 4, 40, 90, 90, 120), ["M 1/3 2/3 0"]],
  kagome: ["P 6/m m m", cellOf(6, 6, 40, 90, 90, 120), ["M 1/2 0 0"]],
  simpleCubic: ["P m -3 m", cellOf(4, 4, 4), ["M 0 0 0"]],
  bodyCentred: ["I m -3 m", cellOf(4, 4, 4), ["M 0 0 0"]],
  faceCentred: ["F m -3 m", cellOf(4, 4, 4), ["M 0 0 0"]],
  diamond: ["F d -3 m:2", cellOf(10, 10, 10), ["M 1/8 1/8 1/8"]],
  pyrochlore: ["F d -3 m:2", cellOf(10, 10, 10), ["M 0 0 0"]],
} as const satisfies Readonly<Record<string, readonly [string, Cell, readonly string[]]>>;

export function latticeModel(
  name: keyof typeof lattices,
  constants: Readonly<Record<string, number>>,
): Promise<ExchangeModel> {
  const [symbol, cell, sites] = lattices[name];
  return modelOf(symbol, cell, sites, constants);
}

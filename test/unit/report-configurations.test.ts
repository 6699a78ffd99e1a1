import { resultFileNames, resultFolder } from "@kvane/core/reports";
import { describe, expect, test } from "vitest";
import { htmlReport, markdownReport } from "#core/reports/made-reports.js";
import { configurationGraph } from "#core/reports/svg/configuration-graph.js";
import { type ConfigurationPicture, configurationPictures } from "#core/reports/svg/configuration-pictures.js";
import { boxProjections } from "#core/reports/svg/moment-drawing.js";
import { combine, directAxes, dot, dualAxes, plus, size, times, type Vector } from "#core/reports/svg/space.js";
import { rockSalt, runAnswer, triangles } from "../support/report-answers.js";

/** Invented: two sites in one of the commonest groups, a cell doubled along a. */
const twoSites = `title: Two sites (invented)
group: P n m a
cell: {a: 9.4, b: 6.9, c: 8.1, alpha: 90, beta: 90, gamma: 90}
sites:
  - {label: Mn, ion: Mn2+, at: [0, 0, 0]}
  - {label: Fe, ion: Fe3+, at: [0.137, 1/4, 0.308]}
k: [[1/2, 0, 0]]
`;

/** Invented: a wave along b that never repeats, in oblique axes. */
const wave = `title: Wave (invented)
group: P 1 2/c 1
cell: {a: 5.3, b: 5.8, c: 7.4, alpha: 90, beta: 102, gamma: 90}
sites:
  - {label: Cu, at: [0.1, 0.22, 0.37]}
k: [[0, 0.283, 0]]
`;

/** Invented: a screw axis, whose phases are quarters, and a k on an edge of its zone, which the axis takes to k + H. */
const screw = `title: Screw (invented)
group: P 41
cell: {a: 6.2, b: 6.2, c: 9.1, alpha: 90, beta: 90, gamma: 90}
sites:
  - {label: Ni, at: [0.11, 0.24, 0.07]}
k: [[1/2, 1/2, 0.283]]
`;

async function drawn(study: string) {
  const answer = await runAnswer(study);
  const record = answer.result;
  const branch = record?.branches[0];
  if (!record?.cell || !branch?.configurations) throw new Error("no configurations");
  const { configurations } = branch;
  return {
    answer,
    record,
    branch,
    configurations,
    axes: directAxes(record.cell),
    pictures: configurationPictures(configurations),
  };
}

const cases = { rockSalt, triangles, twoSites, wave, screw };
const all = await Promise.all(Object.entries(cases).map(async ([name, study]) => ({ name, ...(await drawn(study)) })));
const of = (name: keyof typeof cases) => all.find((one) => one.name === name) as (typeof all)[number];

/** Å, in the frame of the parent. */
function places({ axes, atoms }: ConfigurationPicture): Vector[] {
  return atoms.map(({ at }) => combine(axes, at));
}

/** Coordinates of a place in the axes. */
function coordinates(axes: Parameters<typeof dualAxes>[0], place: Vector): number[] {
  return dualAxes(axes).map((dual) => dot(dual, place) / (2 * Math.PI));
}

/** Atoms once each: without those that are drawn again on the far sides. */
function inside({ atoms, cells }: ConfigurationPicture): number[] {
  return atoms.flatMap(({ at }, index) =>
    at.every((entry, axis) => entry < (cells[axis] as number) - 1e-4) ? [index] : [],
  );
}

describe("moments of the configurations", () => {
  test.each(all)("$name: as many as the parent has atoms in that volume", ({ branch, pictures, axes }) => {
    expect(pictures.length).toBeGreaterThan(0);
    const volume = (basis: typeof axes) => {
      const [a, b, c] = dualAxes(basis);
      return (
        (2 * Math.PI) ** 3 /
        Math.abs(dot(a, [b[1] * c[2] - b[2] * c[1], b[2] * c[0] - b[0] * c[2], b[0] * c[1] - b[1] * c[0]]))
      );
    };
    // The orbit of a site is counted in the primitive cell; F has four of them.
    const centrings = branch.configurations?.group.hermannMauguin?.startsWith("F") ? 4 : 1;
    const perCell = centrings * branch.modes.sites.reduce((sum, { orbit }) => sum + orbit.length, 0);
    for (const picture of pictures) {
      const cells = picture.cells.reduce((product, one) => product * one, 1);
      const expected = perCell * cells * (volume(picture.axes) / volume(axes));
      expect(inside(picture).length, picture.id).toBeCloseTo(expected, 3);
      for (const { marks } of boxProjections(picture, picture.vectors, "")) {
        expect(marks.match(/class="atom"/g)).toHaveLength(picture.atoms.length);
        const moments = picture.vectors.filter((vector) => size(vector) > 1e-3).length;
        // A line and a tip, a dot in a circle or a cross: what is drawn of a moment beside its atom.
        const drawnOnes = [...marks.matchAll(/<g class="atom"[^>]*>(.*?)<\/g>/g)].filter(
          ([, inner = ""]) => (inner.match(/<(?:path|circle)/g) ?? []).length > 1,
        );
        expect(drawnOnes).toHaveLength(moments);
      }
    }
  });

  test("rock salt, k = (1/2, 1/2, 1/2): equal in (111) sheets, opposite in the next (Shull, Strauser & Wollan, Phys. Rev. 83 (1951) 333)", () => {
    const { pictures, axes } = of("rockSalt");
    for (const picture of pictures) {
      const first = picture.vectors[0] as Vector;
      expect(size(first)).toBeCloseTo(1, 5);
      places(picture).forEach((place, index) => {
        const [start = 0, here = 0] = [places(picture)[0] as Vector, place].map((at) =>
          coordinates(axes, at).reduce((sum, entry) => sum + entry, 0),
        );
        const sheet = Math.round(here - start);
        expect(size(plus(picture.vectors[index] as Vector, first, sheet % 2 === 0 ? -1 : 1)), picture.id).toBeLessThan(
          1e-5,
        );
      });
    }
  });

  // M_j(T) = S_j exp(−2πi k·T) + c.c. with S_j a sum of the basis vectors of the irreps (docs/conventions.md, Moments and
  // phases): the modes are found by projection, the pictures from the operators of the magnetic groups.
  test.each([of("triangles"), of("twoSites"), of("wave"), of("screw")])(
    "$name: each picture is a sum of the basis vectors of its irreps",
    ({ branch, configurations, axes, pictures }) => {
      const k = branch.k.numeric as readonly number[];
      for (const picture of pictures) {
        const one = configurations.configurations.find(({ id }) => id === picture.id);
        const atoms = picture.atoms.map(({ site }, index) => {
          const modes = branch.modes.sites.find(({ label }) => label === picture.sites[site]);
          const at = coordinates(axes, places(picture)[index] as Vector);
          const shifts = (modes?.orbit ?? []).map((position) =>
            position.map((text, axis) => {
              const [top = 0, bottom = 1] = text.split("/").map(Number);
              return (at[axis] as number) - top / bottom;
            }),
          );
          const atom = shifts.findIndex((shift) => shift.every((entry) => Math.abs(entry - Math.round(entry)) < 1e-4));
          expect(atom).toBeGreaterThanOrEqual(0);
          const turns = (shifts[atom] as number[]).reduce(
            (sum, entry, axis) => sum + Math.round(entry) * (k[axis] as number),
            0,
          );
          return { label: modes?.label, atom, turns };
        });
        const basis = branch.modes.sites.flatMap((site) =>
          site.irreps
            .filter(({ label }) => one?.irreps.includes(label))
            .flatMap(({ modes }) =>
              modes.flatMap(({ moments }) =>
                [0, 1 / 4].map((phase) =>
                  atoms.flatMap(({ label, atom, turns }) => {
                    const angle = 2 * Math.PI * (phase - turns);
                    const s = label === site.label ? (moments?.[atom] ?? []) : [];
                    return [
                      ...combine(
                        axes,
                        s.map(([re, im]) => re * Math.cos(angle) - im * Math.sin(angle)),
                      ),
                    ];
                  }),
                ),
              ),
            ),
        );
        const field = picture.vectors.flatMap((vector) => [...vector]);
        expect(basis.length).toBeLessThan(3 * inside(picture).length);
        expect(distanceFromSpan(field, basis), picture.id).toBeLessThan(1e-4);
      }
    },
  );

  test("the longest has what the free ion can have: 5 μB of Mn2+ (2S, S = 5/2)", () => {
    for (const { largest, vectors } of of("twoSites").pictures) {
      expect(largest).toBeCloseTo(5, 5);
      expect(Math.max(...vectors.map(size))).toBeCloseTo(1, 5);
    }
  });

  test("a wave goes on: M(r + b) + M(r − b) = 2 cos(2πk·b) M(r)", () => {
    const { pictures } = of("wave");
    for (const picture of pictures) {
      expect(picture.cells[1]).toBeGreaterThanOrEqual(4);
      const moment = (at: readonly number[]) => {
        const index = picture.atoms.findIndex((atom) =>
          atom.at.every((entry, axis) => Math.abs(entry - (at[axis] as number)) < 1e-5),
        );
        return picture.vectors[index];
      };
      let seen = 0;
      picture.atoms.forEach(({ at: [x, y, z] }, index) => {
        const [before, after] = [moment([x, y - 1, z]), moment([x, y + 1, z])];
        if (before === undefined || after === undefined) return;
        seen += 1;
        const expected = times(picture.vectors[index] as Vector, 2 * Math.cos(2 * Math.PI * 0.283));
        expect(size(plus(plus(before, after), expected, -1))).toBeLessThan(1e-5);
      });
      expect(seen).toBeGreaterThan(4);
    }
  });

  // x₄ → −x₄ + δ with δ = 0 or 1/2 at the inversion centre: M(−r) = ±M(r) (docs/conventions.md, Superspace), moments being axial.
  test("an inversion takes the cosine part to itself and the sine part to its opposite, up to one sign", () => {
    const { pictures, configurations } = of("wave");
    let locked = 0;
    for (const picture of pictures) {
      const one = configurations.configurations.find(({ id }) => id === picture.id);
      if (!one || !("superspace" in one.magneticGroup)) throw new Error("not modulated");
      if (!one.magneticGroup.superspace.operators.some((text) => text.startsWith("-x1,-x2,-x3,"))) continue;
      locked += 1;
      // From two cells of an atom: M = C cos 2πk·r + S sin 2πk·r, written at −r where the other atom is.
      const partsOf = (at: readonly number[]) => {
        const pair = [0, 1].map((cells) => {
          const y = (at[1] as number) - Math.floor(at[1] as number) + cells;
          const index = picture.atoms.findIndex((atom) =>
            [at[0] as number, y, at[2] as number].every(
              (entry, axis) =>
                Math.abs((axis === 1 ? entry : entry - Math.floor(entry)) - (atom.at[axis] as number)) < 1e-5,
            ),
          );
          const angle = 2 * Math.PI * 0.283 * y;
          return { moment: picture.vectors[index] as Vector, c: Math.cos(angle), s: Math.sin(angle) };
        });
        const [p, q] = pair as [(typeof pair)[number], (typeof pair)[number]];
        const d = p.c * q.s - p.s * q.c;
        return {
          cosine: plus(times(p.moment, q.s / d), q.moment, -p.s / d),
          sine: plus(times(q.moment, p.c / d), p.moment, -q.c / d),
        };
      };
      const here = partsOf([0.1, 0.22, 0.37]);
      const there = partsOf([-0.1, -0.22, -0.37]);
      expect(size(here.cosine) + size(here.sine)).toBeGreaterThan(0.1);
      const misses = [1, -1].map(
        (sign) => size(plus(there.cosine, here.cosine, -sign)) + size(plus(there.sine, here.sine, sign)),
      );
      expect(Math.min(...misses), picture.id).toBeLessThan(1e-4);
    }
    expect(locked).toBeGreaterThan(0);
  });
});

/** What is left of a field when everything along the basis is taken away, as a share of it. */
function distanceFromSpan(field: readonly number[], basis: readonly (readonly number[])[]): number {
  const inner = (a: readonly number[], b: readonly number[]) =>
    a.reduce((sum, entry, index) => sum + entry * (b[index] as number), 0);
  const without = (a: readonly number[], units: readonly (readonly number[])[]) =>
    units.reduce((rest, one) => {
      const share = inner(rest, one);
      return rest.map((entry, index) => entry - share * (one[index] as number));
    }, a);
  const units: number[][] = [];
  for (const vector of basis) {
    // Twice, for what rounding leaves.
    const rest = without(without(vector, units), units);
    const length = Math.sqrt(inner(rest, rest));
    if (length > 1e-8 * Math.sqrt(inner(vector, vector))) units.push(rest.map((entry) => entry / length));
  }
  const rest = without(without(field, units), units);
  return Math.sqrt(inner(rest, rest) / inner(field, field));
}

describe("the graph of subgroups", () => {
  test.each(all)("$name: every configuration has a box, every relation an arrow", ({ configurations }) => {
    const { marks } = configurationGraph(configurations);
    const list = configurations.configurations;
    expect(marks.match(/class="configuration"/g)).toHaveLength(list.length);
    expect(marks.match(/class="parent"/g)).toHaveLength(1);
    const arrows = (name: string) =>
      [...marks.matchAll(new RegExp(`class="${name}"><title>([^<]*)`, "g"))].map(([, title]) => title).sort();
    expect(arrows("subgroup")).toEqual(
      list.flatMap(({ id, subgroupOf }) => subgroupOf.map((other) => `${other} to ${id}`)).sort(),
    );
    expect(arrows("of-parent")).toEqual(
      list
        .filter(({ subgroupOf }) => subgroupOf.length === 0)
        .map(({ id }) => `parent to ${id}`)
        .sort(),
    );
    for (const { id } of list) expect(marks).toContain(`>${id}</text>`);
  });

  test("arrows lead to the right, also between groups of one index", () => {
    const { configurations } = of("wave");
    const [first, second] = configurations.configurations;
    if (first === undefined || second === undefined) throw new Error("too few configurations");
    const chain = ["Γ1.1", "Γ1.2", "Γ1.3"].map((id, place) => ({
      ...first,
      id,
      index: 2,
      subgroupOf: place === 0 ? [] : [`Γ1.${place}`],
    }));
    for (const list of [configurations.configurations, chain, [...chain].reverse()]) {
      const { marks } = configurationGraph({ ...configurations, configurations: list });
      const ends = [...marks.matchAll(/<\/title><path d="M([\d.]+),[^"]*?([\d.]+),[\d.]+"/g)].map(([, from, to]) => [
        Number(from),
        Number(to),
      ]);
      expect(ends.length).toBeGreaterThanOrEqual(list.length);
      for (const [from = 0, to = 0] of ends) expect(to).toBeGreaterThan(from + 30);
    }
  });
});

describe("files and pages", () => {
  test.each(all)(
    "$name: a drawing of the graph and of each configuration, the same bytes each time",
    async ({ answer, record, pictures, name }) => {
      const files = await resultFolder(answer);
      expect(files.map((file) => file.name)).toEqual(resultFileNames(record));
      const own = files.filter((file) => /^branch-1-configuration.*\.svg$/.test(file.name));
      expect(own).toHaveLength(1 + pictures.length);
      for (const { text } of own) {
        expect(text).toMatch(/^<\?xml[\s\S]*<\/svg>\n$/);
        expect(text).not.toContain("<img");
      }
      const again = await resultFolder(await runAnswer(cases[name as keyof typeof cases]));
      expect(again).toEqual(files);
    },
  );

  test("the page says in words what the graph shows, and Markdown names its files", () => {
    const { answer, configurations } = of("triangles");
    const page = htmlReport(answer);
    for (const { id, subgroupOf } of configurations.configurations)
      expect(page).toMatch(
        new RegExp(
          `<li>${id}, [^<]*${subgroupOf.length > 0 ? `subgroup of ${subgroupOf.join(", ")}` : "in no other group"}`,
        ),
      );
    expect(page).toContain('data-live="configurations"');
    expect(markdownReport(answer, "beside")).toContain("](branch-1-configurations.svg)");
    expect(markdownReport(answer, "none")).not.toContain(".svg)");
  });

  test("what is too much for a drawing is said", () => {
    const { answer, record, branch, configurations } = of("triangles");
    const [first] = configurations.configurations;
    if (first === undefined || !("constantMoment" in first)) throw new Error("no configuration");
    const large = { ...first, id: "Γ9.1", sites: first.sites.map((site) => ({ ...site, multiplicity: 401 })) };
    const many = Array.from({ length: 30 }, (_, index) => ({ ...first, id: `Γ8.${index + 1}` }));
    const changed = {
      ...record,
      branches: [{ ...branch, configurations: { ...configurations, configurations: [large, ...many] } }],
    };
    const page = htmlReport({ ...answer, result: changed });
    expect(page).toContain("No graph: of more than 30 configurations");
    expect(page).toContain("Not drawn, with more than 400 moments in a cell: Γ9.1.");
    expect(page).toContain("19 further configurations not drawn.");
    const names = resultFileNames(changed);
    expect(names).not.toContain("branch-1-configurations.svg");
    expect(names).not.toContain("branch-1-configuration-Gamma9.1.svg");
    expect(names).toContain("branch-1-configuration-Gamma8.11.svg");
    expect(names).not.toContain("branch-1-configuration-Gamma8.12.svg");
  });
});

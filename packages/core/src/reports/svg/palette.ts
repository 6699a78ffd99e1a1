import type { Attributes } from "./mark-up.js";

/**
 * The colours of every drawing, on light and on dark paper. Each contrasts with its paper by at least 3 : 1 for marks
 * and 4.5 : 1 for text (WCAG 2.2, success criteria 1.4.11 and 1.4.3); a test measures it. Nothing is told by colour
 * alone.
 */
export const palette = {
  paper: ["#ffffff", "#12171d"],
  panel: ["#f3f5f8", "#1b222a"],
  ink: ["#17202b", "#e9eef3"],
  faint: ["#536070", "#a7b3c0"],
  rule: ["#d3d9e0", "#37424e"],
  accent: ["#0a5c7d", "#63c4e2"],
  warning: ["#8a4b00", "#f2b661"],
  c0: ["#0a6a8c", "#5bc2e0"],
  c1: ["#b0441a", "#f29a6c"],
  c2: ["#5a49b3", "#b6aaff"],
  c3: ["#2b7630", "#86d182"],
  c4: ["#a3246a", "#f38cc2"],
  c5: ["#6d6200", "#d9cd5c"],
} as const satisfies { readonly [role: string]: readonly [light: string, dark: string] };

export type Role = keyof typeof palette;

const series: readonly Role[] = ["c0", "c1", "c2", "c3", "c4", "c5"];

/** The colour of the n-th candidate or site, from 0; they come round again after six. */
export function seriesRole(index: number): Role {
  return series[index % series.length] as Role;
}

/**
 * Attributes that paint with a role: the light colour for a file that stands alone, and a class by which a page puts the
 * colour of its own scheme in its place.
 */
export function paint(roles: { readonly fill?: Role | "none"; readonly stroke?: Role | "none" }): Attributes {
  const named = (["fill", "stroke"] as const).flatMap((kind) => {
    const role = roles[kind];
    return role === undefined ? [] : [{ kind, role }];
  });
  const classes = named.filter(({ role }) => role !== "none").map(({ kind, role }) => `${kind}-${role}`);
  return {
    class: classes.length > 0 ? classes.join(" ") : null,
    ...Object.fromEntries(named.map(({ kind, role }) => [kind, role === "none" ? "none" : palette[role][0]])),
  };
}

/** The rules of a page that knows both schemes: variables `--ink` … and the classes of `paint`. */
export function paletteRules(): string {
  const roles = Object.keys(palette) as Role[];
  const variables = (scheme: 0 | 1) => roles.map((role) => `--${role}:${palette[role][scheme]}`).join(";");
  const classes = roles.map((role) => `.fill-${role}{fill:var(--${role})}.stroke-${role}{stroke:var(--${role})}`);
  return `:root{color-scheme:light dark;${variables(0)}}
@media (prefers-color-scheme:dark){:root{${variables(1)}}}
@media print{:root{color-scheme:light;${variables(0)}}}
${classes.join("\n")}`;
}

/** Classes `c0` … for marks of a page that are no drawings. */
export function seriesClasses(): string {
  return series.map((role) => `.${role}{background:var(--${role})}`).join("");
}

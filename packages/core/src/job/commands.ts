import type { RequestField } from "./request.js";
import type { Work } from "./work.js";

/** A command as `answer` knows it: what it takes of a request, and where its work is. */
export interface CommandEntry {
  readonly takes: readonly RequestField[];
  /** Loads the command's function; only what a command needs is loaded for it. */
  readonly load: () => Promise<(work: Work) => Promise<object> | object>;
}

const peakFields = ["peaks", "as", "wavelength", "tolerance", "unmatched", "qMax"] as const;
const conventionFields = ["exponent", "phase", "factor", "components"] as const;
const searchFields = ["maxDimension", "zeroShift", "cellScale"] as const;

/** The commands of this version, in the order of the manual. */
export const commandTable: { readonly [command: string]: CommandEntry } = {
  run: {
    takes: ["study", "k", ...peakFields, ...searchFields, "branches", "files"],
    load: async () => (await import("./run-study.js")).runStudy,
  },
  check: {
    takes: ["study"],
    load: async () => (await import("./commands/check.js")).checkCommand,
  },
  ops: {
    takes: ["study", "group"],
    load: async () => (await import("./commands/ops.js")).opsCommand,
  },
  atlas: {
    takes: ["study", "group", "k", "cell", "within"],
    load: async () => (await import("./commands/atlas.js")).atlasCommand,
  },
  star: {
    takes: ["study", "group", "k"],
    load: async () => (await import("./commands/star.js")).starCommand,
  },
  irreps: {
    takes: ["study", "group", "k", "full"],
    load: async () => (await import("./commands/irreps.js")).irrepsCommand,
  },
  compatibility: {
    takes: ["study", "group", "from", "to"],
    load: async () => (await import("./commands/compatibility.js")).compatibilityCommand,
  },
  modes: {
    takes: ["study", "group", "k", "sites", "cell", "polar", "star", ...conventionFields, "read"],
    load: async () => (await import("./commands/modes.js")).modesCommand,
  },
  satellites: {
    takes: ["study", "group", "cell", "k", "qMax", "wavelength"],
    load: async () => (await import("./commands/satellites.js")).satellitesCommand,
  },
  index: {
    takes: ["study", "group", "cell", "k", ...peakFields],
    load: async () => (await import("./commands/index-peaks.js")).indexCommand,
  },
  locate: {
    takes: ["study", "group", "cell", ...peakFields, ...searchFields],
    load: async () => (await import("./commands/locate.js")).locateCommand,
  },
  explain: {
    takes: ["code"],
    load: async () => (await import("./commands/explain.js")).explainCommand,
  },
  help: {
    takes: ["topic"],
    load: async () => (await import("./commands/help.js")).helpCommand,
  },
};

/** Commands of the interface that this version answers with `not-built`. */
export const plannedCommands: readonly string[] = [
  "study",
  "configurations",
  "decompose",
  "weigh",
  "exchange",
  "onset",
  "export",
  "report",
  "batch",
];

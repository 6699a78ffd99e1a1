import type { RequestField } from "./request.js";
import type { Work } from "./work.js";

/** A command as `answer` knows it: what it takes of a request, and where its work is. */
export interface CommandEntry {
  readonly takes: readonly RequestField[];
  /** Loads the command's function; only what a command needs is loaded for it. */
  readonly load: () => Promise<(work: Work) => Promise<object> | object>;
}

const structureFields = ["structure", "block"] as const;
const peakFields = ["peaks", "as", "wavelength", "tolerance", "unmatched", "qMax"] as const;
const conventionFields = ["exponent", "phase", "factor", "components"] as const;
const searchFields = ["maxDimension", "zeroShift", "cellScale"] as const;
const asideFields = ["exclude", "impurities", "nuclear", "weighIntensities"] as const;

const configurationFields = [
  "study",
  "group",
  ...structureFields,
  "k",
  "sites",
  "cell",
  "arms",
  "together",
  "onSites",
  "limit",
] as const;

/** The commands of this version, in the order of the manual. */
export const commandTable: { readonly [command: string]: CommandEntry } = {
  run: {
    takes: ["study", ...structureFields, "k", ...peakFields, ...asideFields, ...searchFields, "branches", "files"],
    load: async () => (await import("./run-study.js")).runStudy,
  },
  study: {
    takes: ["study", ...structureFields],
    load: async () => (await import("./commands/study.js")).studyCommand,
  },
  report: {
    takes: ["study", ...structureFields, "k", ...peakFields, ...asideFields, ...searchFields, "branches"],
    load: async () => (await import("./run-study.js")).runStudy,
  },
  check: {
    takes: ["study", ...structureFields, "syntax"],
    load: async () => (await import("./commands/check.js")).checkCommand,
  },
  ops: {
    takes: ["study", "group", ...structureFields],
    load: async () => (await import("./commands/ops.js")).opsCommand,
  },
  atlas: {
    takes: ["study", "group", ...structureFields, "k", "cell", "within"],
    load: async () => (await import("./commands/atlas.js")).atlasCommand,
  },
  star: {
    takes: ["study", "group", ...structureFields, "k"],
    load: async () => (await import("./commands/star.js")).starCommand,
  },
  irreps: {
    takes: ["study", "group", ...structureFields, "k", "full"],
    load: async () => (await import("./commands/irreps.js")).irrepsCommand,
  },
  compatibility: {
    takes: ["study", "group", ...structureFields, "from", "to"],
    load: async () => (await import("./commands/compatibility.js")).compatibilityCommand,
  },
  modes: {
    takes: ["study", "group", ...structureFields, "k", "sites", "cell", "polar", "star", ...conventionFields, "read"],
    load: async () => (await import("./commands/modes.js")).modesCommand,
  },
  configurations: {
    takes: configurationFields,
    load: async () => (await import("./commands/configurations.js")).configurationsCommand,
  },
  decompose: {
    takes: ["moments", "study", "block", "child"],
    load: async () => (await import("./commands/decompose.js")).decomposeCommand,
  },
  export: {
    takes: [...configurationFields, "configuration", "cif", "fitted"],
    load: async () => (await import("./commands/export.js")).exportCommand,
  },
  satellites: {
    takes: ["study", "group", ...structureFields, "cell", "k", "sites", "qMax", "wavelength"],
    load: async () => (await import("./commands/satellites.js")).satellitesCommand,
  },
  index: {
    takes: ["study", "group", ...structureFields, "cell", "k", ...peakFields, ...asideFields, "zeroShift", "cellScale"],
    load: async () => (await import("./commands/index-peaks.js")).indexCommand,
  },
  locate: {
    takes: ["study", "group", ...structureFields, "cell", ...peakFields, ...asideFields, ...searchFields],
    load: async () => (await import("./commands/locate.js")).locateCommand,
  },
  weigh: {
    takes: [
      "study",
      ...structureFields,
      "k",
      "intensities",
      "as",
      "wavelength",
      "lorentz",
      "displacement",
      "scatteringAngle",
      "nuclear",
      "includesNuclear",
      "domains",
      "formFactors",
      "pattern",
      "scale",
      "resolution",
      "arms",
      "together",
      "onSites",
      "limit",
    ],
    load: async () => (await import("./commands/weigh.js")).weighCommand,
  },
  exchange: {
    takes: ["study", "group", ...structureFields, "cell", "sites", "k", "constants", "vary", "shells"],
    load: async () => {
      const { exchangeCommand } = await import("./commands/exchange.js");
      return (work) => exchangeCommand(work);
    },
  },
  onset: {
    takes: ["study", "scan", "reduced"],
    load: async () => (await import("./commands/onset.js")).onsetCommand,
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

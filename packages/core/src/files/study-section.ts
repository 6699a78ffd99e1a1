import { nearMiss } from "../errors/index.js";
import { note, type ProblemList } from "./problem-list.js";
import { type StudySectionName, sectionsWithKey, studyKeys } from "./study-keys.js";
import { where } from "./yaml-convert.js";
import type { TreeEntry, TreeNode, TreeRecord } from "./yaml-tree.js";

/** A section of a study whose keys are known. */
export interface Section {
  /** The value of a key, or null where the key is not given. */
  readonly get: (key: string) => TreeNode | null;
  /** The value of a key that must be there; its absence is noted. */
  readonly need: (key: string, expected: string) => TreeNode | null;
}

/** Looks at the keys of a section; every key that it has not is noted, with the likely one. */
export function openSection(name: StudySectionName, record: TreeRecord, problems: ProblemList): Section {
  const keys: readonly string[] = studyKeys[name];
  const values = new Map<string, TreeNode>();
  for (const entry of record.entries) {
    if (keys.includes(entry.key)) values.set(entry.key, entry.value);
    else noteUnknownKey(name, entry, keys, problems);
  }
  const get = (key: string) => values.get(key) ?? null;
  const need = (key: string, expected: string) => {
    const value = get(key);
    if (!value) {
      const inside = record.place.path;
      note(problems, "missing-key", `${inside ? `\`${inside}\`` : "the study"} has no \`${key}\``, {
        where: { ...where(record.place), path: inside ? `${inside}.${key}` : key },
        expected,
        found: `the keys ${record.entries.map((entry) => entry.key).join(", ") || "none"}`,
        remedy: `add \`${key}: …\``,
      });
    }
    return value;
  };
  return { get, need };
}

function noteUnknownKey(name: string, entry: TreeEntry, keys: readonly string[], problems: ProblemList): void {
  const likely = nearMiss(entry.key, keys);
  const elsewhere = sectionsWithKey(entry.key);
  const atTop = name !== "" && (studyKeys[""] as readonly string[]).includes(entry.key);
  const remedy = likely
    ? `did you mean \`${likely}\`?`
    : /^\d+$/.test(entry.key)
      ? "if this is the end of a decimal number, write a point instead of the comma"
      : atTop
        ? `\`${entry.key}\` belongs to the top of the file, without indentation`
        : elsewhere.length > 0
          ? `\`${entry.key}\` belongs into \`${elsewhere.join("` or `")}\``
          : "remove it, or put # in front of it";
  note(problems, "unknown-key", `\`${entry.key}\` is no key of ${name === "" ? "a study" : `\`${name}\``}`, {
    where: where(entry.keyPlace),
    expected: `one of ${keys.join(", ")}`,
    found: entry.key,
    remedy,
  });
}

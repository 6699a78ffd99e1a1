import { parseGroup, type SpaceGroup } from "@kvane/core/spacegroups";

const groups = new Map<string, SpaceGroup>();

/** `parseGroup`, once for each text. */
export function groupOf(text: string | number): SpaceGroup {
  const key = String(text);
  const group = groups.get(key) ?? parseGroup(key);
  groups.set(key, group);
  return group;
}

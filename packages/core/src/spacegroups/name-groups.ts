import { identityChangeText } from "./basis-changes.js";
import { groupFingerprint, groupFromHallText, sameOperators } from "./fingerprints.js";
import { type SettingRow, settingsOfFingerprint } from "./settings.js";
import { displaySymbol } from "./symbols.js";
import type { GroupName, SpaceGroup, TabulatedSetting } from "./types.js";

/** The name of a tabulated setting. */
export function nameOfSetting(setting: TabulatedSetting): GroupName {
  return {
    number: setting.number,
    hall: setting.hall,
    hermannMauguin: displaySymbol(setting),
    choice: setting.choice,
    basisChange: identityChangeText,
  };
}

/** The group of a tabulated setting, from its Hall symbol. */
export function groupFromSetting(setting: TabulatedSetting): SpaceGroup {
  return { ...groupFromHallText(setting.hall), name: nameOfSetting(setting) };
}

/**
 * The tabulated setting that consists of exactly the operators of `group` in its axes, or null. Where two rows have one
 * set of operators (three origin-1 settings of number 68), the first is given.
 */
export function settingWithOperators(group: SpaceGroup): SettingRow | null {
  const candidates = settingsOfFingerprint(groupFingerprint(group));
  return candidates.find((row) => sameOperators(groupFromHallText(row.hall), group)) ?? null;
}

import type { WaveVector } from "@kvane/core/kvectors";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import { componentsOf, floatGroup, inverse, isReciprocalVector, minus, plus, turnRow } from "./float-group.ts";

/** Whether k is an arm ±k of the star of `row`, in plain floats. */
export function equivalentRows(group: SpaceGroup, k: WaveVector, row: readonly number[]): boolean {
  const float = floatGroup(group);
  const here = componentsOf(k);
  return float.operators.some((operator) => {
    const image = turnRow(row, inverse(operator).rotation);
    return isReciprocalVector(float, minus(here, image)) || isReciprocalVector(float, plus(here, image));
  });
}

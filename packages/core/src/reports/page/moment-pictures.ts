import type { MomentPicture } from "../svg/moment-box.js";
import type { MomentScene } from "../svg/moment-data.js";
import { momentsOf } from "../svg/moments.js";

/** What a view of moments can show, by name; pictures are made when they are asked for. */
export interface PictureSource {
  readonly names: readonly string[];
  /** Shown before one is chosen. */
  readonly first: number;
  readonly picture: (index: number) => MomentPicture;
}

/** The examples and basis vectors of a branch. */
export function picturesOfArrangements(scene: MomentScene): PictureSource {
  const names = scene.arrangements.map(({ name }) => name);
  return {
    names,
    first: Math.max(
      0,
      scene.arrangements.findIndex(({ example }) => example),
    ),
    picture: (index) => ({ ...scene, name: names[index] ?? "", vectors: momentsOf(scene, index).vectors }),
  };
}

/** The configurations of a branch, each in its own cell. */
export function picturesOfConfigurations(pictures: readonly MomentPicture[]): PictureSource {
  return {
    names: pictures.map(({ name }) => name),
    first: 0,
    picture: (index) => pictures[index] as MomentPicture,
  };
}

import { type HalfSpace, polytope } from "./half-spaces.js";

/** An image of a point: the half-space of what is no nearer to it than to the point. */
export interface PointImage {
  readonly halfSpace: HalfSpace;
}

/** All that is no nearer to any image of a point than to the point itself. */
export interface DirichletCell<Image extends PointImage> {
  /** The images that bound it, in the order in which they were given. */
  readonly images: readonly Image[];
  /** The box that just holds it. */
  readonly centre: readonly number[];
  readonly half: readonly number[];
}

/**
 * The Dirichlet cell of a point among its images under a group of isometries: every point has an image in it (H. S. M.
 * Coxeter, Regular Polytopes, 1973, section 4). It is bounded exactly: with all images within a distance D the cut-out
 * cell holds the true one, and once D is twice its own reach no further image can cut it.
 *
 * @param origin the point, 1 to 3 Cartesian coordinates
 * @param first the distance up to which images are tried first
 * @param imagesWithin all images up to a distance, of a group that has enough of them to bound the cell
 */
export function dirichletCell<Image extends PointImage>(
  origin: readonly number[],
  first: number,
  imagesWithin: (distance: number) => readonly Image[],
): DirichletCell<Image> {
  for (let within = first; ; ) {
    const box = boxAround(origin, 2 * within);
    const images = imagesWithin(within);
    const { vertices, active } = polytope([...box, ...images.map(({ halfSpace }) => halfSpace)], origin.length);
    const reach = Math.max(
      ...vertices.map((vertex) => Math.hypot(...vertex.map((entry, axis) => entry - (origin[axis] as number)))),
    );
    const bounded = active.every((index) => index >= box.length);
    if (bounded && 2 * reach <= within)
      return { images: active.map((index) => images[index - box.length] as Image), ...boundingBox(vertices, reach) };
    within = bounded ? 2 * reach * (1 + 1e-9) : 1.5 * within;
  }
}

function boxAround(origin: readonly number[], reach: number): HalfSpace[] {
  return origin.flatMap((coordinate, axis) =>
    [1, -1].map((sign) => ({
      normal: origin.map((_, other) => (other === axis ? sign : 0)),
      offset: reach + sign * coordinate,
    })),
  );
}

/** A hair wider than the vertices ask for, so that rounding loses nothing. */
function boundingBox(vertices: readonly (readonly number[])[], reach: number) {
  const bounds = (vertices[0] as readonly number[]).map((_, axis) => {
    const along = vertices.map((vertex) => vertex[axis] as number);
    return [Math.min(...along), Math.max(...along)] as const;
  });
  return {
    centre: bounds.map(([low, high]) => (low + high) / 2),
    half: bounds.map(([low, high]) => ((high - low) / 2) * (1 + 1e-9) + 1e-9 * reach),
  };
}

import { type ModuleGraph, translated } from "./module-graph.js";
import { withNotes } from "./reach-points.js";
import { rooms, roomTexts } from "./rooms.js";

/** The name of the reach point that stands at a place of a file. */
export function pointName(file: string, start: number): string {
  return `${file}:${start}`;
}

export function fileOfPoint(point: string): string {
  return point.slice(0, point.lastIndexOf(":"));
}

/** The graph with notes at every reach point of the rooms, and the names of the points by number. */
export function notedGraph(graph: ModuleGraph): { graph: ModuleGraph; points: string[] } {
  const points: string[] = [];
  const noted = new Map(graph);
  for (const room of rooms)
    for (const [file, text] of roomTexts(room))
      noted.set(
        file,
        translated(
          file,
          withNotes(text, (start) => points.push(pointName(file, start)) - 1),
        ),
      );
  return { graph: noted, points };
}

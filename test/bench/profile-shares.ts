import type { Profiler } from "node:inspector";
import { pathToFileURL } from "node:url";

/** Shares of the whole by name; they add up to 1. */
export type Shares = { readonly [name: string]: number };

/**
 * Self times added up by the folder of core that the code is in; what is none of its code has names of its own.
 *
 * @param core the folder of the built core
 */
export function sharesOf({ nodes, samples = [], timeDeltas = [] }: Profiler.Profile, core: string): Shares {
  const prefix = `${pathToFileURL(core).href}/`;
  const owners = new Map(nodes.map(({ id, callFrame }) => [id, ownerOf(callFrame, prefix)]));
  const times: { [name: string]: number } = {};
  samples.forEach((id, index) => {
    const owner = owners.get(id);
    // Time after a sample belongs to it: the next delta.
    if (owner) times[owner] = (times[owner] ?? 0) + (timeDeltas[index + 1] ?? 0);
  });
  const total = Object.values(times).reduce((sum, time) => sum + time, 0);
  return Object.fromEntries(Object.entries(times).map(([name, time]) => [name, time / total]));
}

/** Null for time in which nothing ran. */
function ownerOf({ url, functionName }: Profiler.ProfileNode["callFrame"], prefix: string): string | null {
  if (functionName === "(idle)") return null;
  if (functionName === "(garbage collector)") return "garbage collection";
  if (url.startsWith(prefix)) return url.slice(prefix.length).split("/")[0] as string;
  if (/^node:internal\/modules\//.test(url) || functionName === "compileSourceTextModule") return "module loading";
  // The bench itself is bundled by esbuild into a cache.
  const dependency = /.*\/node_modules\/((?:@[^/]+\/)?[^/]+)\//.exec(url)?.[1];
  return dependency === undefined || dependency === ".cache" || dependency === "esbuild"
    ? "node itself"
    : `package ${dependency.replace(/^d3-.*/, "d3")}`;
}

// @ts-check
import { readFileSync } from "node:fs";
import { dirname, join, resolve } from "node:path";

/**
 * A plugin of esbuild that leads what is imported through the door of a room (its `index.ts`) straight to the file that
 * has it. Without it a part of the bundle that takes one name of a room holds all that the room offers to any other part.
 * `import()` of a door stays as it is: it takes the whole room.
 *
 * @param {string} core folder of core's source, a folder in it for each room
 * @returns {import("esbuild").Plugin}
 */
export function pastTheDoors(core) {
  /** @type {Map<string, Homes>} */
  const doors = new Map();
  return {
    name: "past the doors",
    setup(bundle) {
      bundle.onLoad({ filter: /\.ts$/, namespace: "file" }, ({ path }) => ({
        loader: "ts",
        contents: readFileSync(path, "utf8").replace(importing, (whole, names, from) => {
          const door = doorOf(from, path, core);
          if (door === null) return whole;
          const homes = doors.get(door) ?? homesOf(door);
          doors.set(door, homes);
          return straight(names, homes, from);
        }),
      }));
    },
  };
}

/**
 * The doors that statements of the sources still go through though they make nothing themselves: forms of import that
 * the plugin does not know, which would bring back whole rooms without anybody noticing.
 *
 * @param {import("esbuild").Metafile["inputs"]} inputs
 * @returns {string[]} who imports what
 */
export function doorsGoneThrough(inputs) {
  const isDoor = (/** @type {string} */ path) => /core\/src\/\w+\/index\.ts$/.test(path);
  return Object.entries(inputs).flatMap(([importer, { imports }]) =>
    imports
      .filter(({ kind, path }) => kind === "import-statement" && isDoor(path) && !makesSomething(path))
      // A door in the bundle was taken whole by an `import()`.
      .filter(() => !isDoor(importer))
      .map(({ path }) => `${importer} imports ${path}`),
  );
}

/** @param {string} door path relative to this folder */
function makesSomething(door) {
  return /^export (?:async )?(?:function|const|class)/m.test(readFileSync(join(import.meta.dirname, door), "utf8"));
}

/** @typedef {ReadonlyMap<string, {readonly file: string, readonly name: string}>} Homes where each name of a door comes from */

/** `import type` is none: it leaves nothing in a bundle. */
const importing = /^import \{([^}]*)\} from "([^"]*)";/gm;

/**
 * @param {string} from
 * @param {string} importer
 * @param {string} core
 * @returns {string | null} the file of the door; null for what is no door
 */
function doorOf(from, importer, core) {
  const [, room] = /^@kvane\/core\/(\w+)$/.exec(from) ?? [];
  if (room !== undefined) return join(core, room, "index.ts");
  return /^\.\.?\/(.*\/)?index\.js$/.test(from) ? source(importer, from) : null;
}

/**
 * The same names, each imported from its home; what the door itself makes still comes from the door.
 * @param {string} names
 * @param {Homes} homes
 * @param {string} from
 */
function straight(names, homes, from) {
  return values(names)
    .map(({ name, as }) => {
      const home = homes.get(name) ?? { file: from, name };
      return `import { ${home.name} as ${as} } from ${JSON.stringify(home.file)};`;
    })
    .join(" ");
}

/**
 * @param {string} door
 * @returns {Homes}
 */
function homesOf(door) {
  const text = readFileSync(door, "utf8");
  const named = [...text.matchAll(/^export \{([^}]*)\} from "([^"]*)";/gm)].flatMap(([, names = "", from = ""]) =>
    values(names).map(({ name, as }) => /** @type {const} */ ([as, { file: source(door, from), name }])),
  );
  const starred = [...text.matchAll(/^export \* from "([^"]*)";/gm)].flatMap(([, from = ""]) => {
    const file = source(door, from);
    const made = readFileSync(file, "utf8").matchAll(/^export (?:async )?(?:function\*?|const|class) (\w+)/gm);
    return [...made].map(([, name = ""]) => /** @type {const} */ ([name, { file, name }]));
  });
  // A name of its own goes before those that come with a star, as in ECMAScript (ResolveExport).
  return new Map([...starred, ...named]);
}

/**
 * The names between the braces that are no types: `a, b as c, type D`.
 * @param {string} names
 */
function values(names) {
  return names
    .split(",")
    .map((one) => one.trim())
    .filter((one) => one !== "" && !one.startsWith("type "))
    .map((one) => {
      const [name = "", as = name] = one.split(" as ");
      return { name, as };
    });
}

/**
 * @param {string} importer
 * @param {string} from
 */
function source(importer, from) {
  return resolve(dirname(importer), from.replace(/\.js$/, ".ts"));
}

interface Said {
  readonly message: string;
  readonly details: { readonly found?: string; readonly remedy: string };
}

/** The errors that people make most, in words that say what to do. */
const known: Readonly<Record<string, Said>> = {
  BLOCK_AS_IMPLICIT_KEY: {
    message: "a value holds a colon with a blank behind it",
    details: { found: "a second colon", remedy: "put the text between double quotes" },
  },
  TAB_AS_INDENT: {
    message: "a tab stands at the beginning of a line",
    details: { found: "a tab", remedy: "indent with blanks" },
  },
  BAD_INDENT: {
    message: "a line is not indented as its section is, or a bracket is not closed",
    details: { remedy: "align the keys of a section; close every [ and {" },
  },
  MISSING_CHAR: {
    message: "something is not closed or is missing here",
    details: { remedy: "close every quote, [ and {, and put a colon and a blank behind every key" },
  },
  MULTILINE_IMPLICIT_KEY: {
    message: "a key has no colon",
    details: { found: "a word alone in its line", remedy: "put a colon behind it" },
  },
  UNEXPECTED_TOKEN: {
    message: "something stands here that does not belong here",
    details: {
      remedy: "look for a colon, a quote or a bracket that is missing or too many, here or in the line before",
    },
  },
  MULTIPLE_DOCS: {
    message: "the file holds more than one document",
    details: { found: "a second ---", remedy: "put every study into a file of its own" },
  },
  RESOURCE_EXHAUSTION: {
    message: "brackets are nested too deeply",
    details: { remedy: "close the brackets" },
  },
  TAG_RESOLVE_FAILED: {
    message: "a tag stands before a value",
    details: { found: "a word that begins with !", remedy: "remove the tag" },
  },
};

/** What an error of the YAML reader means for the author of a study. */
export function yamlMessage(code: string): Said {
  const said = Object.hasOwn(known, code) ? known[code] : undefined;
  return (
    said ?? { message: "the file breaks the grammar of YAML", details: { remedy: "mend the line, or the one before" } }
  );
}

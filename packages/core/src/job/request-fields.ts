import type { Request, RequestField } from "./request.js";

/** What a field of a request holds: a text, yes or no, or a list of texts. */
export type FieldKind = "text" | "flag" | "list";

/** Names of the fields with values of one type. */
type FieldsOf<Value> = {
  readonly [Field in RequestField]-?: NonNullable<Request[Field]> extends Value ? Field : never;
}[RequestField];

// Records and not lists: the compiler then misses a field of `Request` that is forgotten here.
const flags: { readonly [Field in FieldsOf<boolean>]: "flag" } = {
  syntax: "flag",
  full: "flag",
  polar: "flag",
  star: "flag",
  weighIntensities: "flag",
  includesNuclear: "flag",
  files: "flag",
  fitted: "flag",
};

const lists: { readonly [Field in FieldsOf<readonly string[]>]: "list" } = {
  sites: "list",
  exclude: "list",
  impurities: "list",
  together: "list",
  onSites: "list",
  constants: "list",
  vary: "list",
  formFactors: "list",
};

const kinds: { readonly [field: string]: FieldKind } = { ...flags, ...lists };

export function fieldKind(field: RequestField): FieldKind {
  return Object.hasOwn(kinds, field) ? (kinds[field] as FieldKind) : "text";
}

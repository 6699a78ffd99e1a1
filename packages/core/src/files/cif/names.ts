/** Names and codes as they are compared: without regard to case; beyond ASCII as Unicode's caseless matching has it. */
export function comparable(name: string): string {
  return isAscii(name) ? name.toLowerCase() : name.normalize("NFD").toUpperCase().toLowerCase().normalize("NFD");
}

/**
 * A data name by which old and new spelling are found alike: `_atom_site.fract_x` and `_atom_site_fract_x`. The new
 * dictionaries (DDLm) write `_category.object` for the older `_category_object` throughout, so a rule serves where the
 * alias lists have gaps.
 */
export function lookUpName(name: string): string {
  return comparable(name).replace(".", "_");
}

function isAscii(text: string): boolean {
  for (let index = 0; index < text.length; index++) if (text.charCodeAt(index) > 127) return false;
  return true;
}

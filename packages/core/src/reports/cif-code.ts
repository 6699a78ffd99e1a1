/** `branch-1-Gamma2.1.mcif`: what a file system and a CIF reader take everywhere. */
export function cifCode(id: string): string {
  return id.replaceAll("Γ", "Gamma").replace(/[^A-Za-z0-9.]+/g, "_");
}

/** `branch-1-GM2.1.mcif`: what a file system and a CIF reader take everywhere. */
export function cifCode(id: string): string {
  return id.replaceAll("Γ", "GM").replace(/[^A-Za-z0-9.]+/g, "_");
}

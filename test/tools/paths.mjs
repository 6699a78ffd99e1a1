// @ts-check
import { fileURLToPath } from "node:url";

/** The folder of the repository, without a slash at its end. */
export const root = fileURLToPath(new URL("../..", import.meta.url)).replace(/[\\/]$/, "");

import type { Target } from "./target.js";
import { fileTargets } from "./targets/files.js";
import { lineTarget } from "./targets/lines.js";
import { processTarget } from "./targets/processes.js";
import { requestTarget } from "./targets/requests.js";
import { wordTargets } from "./targets/words.js";

/** Everything that is fuzzed. */
export const targets: readonly Target[] = [...fileTargets, ...wordTargets, requestTarget, lineTarget, processTarget];

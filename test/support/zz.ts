import { parseGroup } from "#core/spacegroups/index.ts";
const a=performance.now(); parseGroup('hall:-F 4vw 2vw 3'); const b=performance.now(); console.log((b-a).toFixed(2));

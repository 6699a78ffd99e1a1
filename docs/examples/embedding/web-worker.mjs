/** A module worker of a page, after bundling: `new Worker("web-worker.js", { type: "module" })`. */
import { serveRequests } from "./serve-requests.mjs";

const serve = serveRequests((message) => self.postMessage(message));
self.addEventListener("message", ({ data }) => serve(data));

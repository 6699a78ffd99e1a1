/**
 * Requests to kvane beside the main thread of Node, with progress and cancel: `node worker-threads.mjs STUDY.yaml`.
 * Needs @kvane/core, and nothing else.
 */
import { readdir, readFile } from "node:fs/promises";
import { basename, dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { isMainThread, parentPort, Worker } from "node:worker_threads";
import { serveRequests } from "./serve-requests.mjs";

if (isMainThread) await main(process.argv[2]);
else parentPort.on("message", serveRequests((message) => parentPort.postMessage(message)));

/** Asks the worker, and resolves with its answer. */
function ask(worker, id, request, texts, onProgress = () => {}) {
  return new Promise((resolve, reject) => {
    const listen = (message) => {
      if (message.id !== id) return;
      if (message.progress) onProgress(message.progress);
      else {
        worker.off("message", listen);
        resolve(message.answer);
      }
    };
    worker.on("message", listen).once("error", reject);
    worker.postMessage({ id, request, texts });
  });
}

async function main(path) {
  if (path === undefined) return stop(2, "usage: node worker-threads.mjs STUDY.yaml");
  const texts = await textsBeside(path);
  const study = basename(path);
  const worker = new Worker(fileURLToPath(import.meta.url));

  let steps = 0;
  const whole = await ask(worker, 1, { command: "run", study }, texts, () => {
    steps += 1;
  });
  if (whole.errors.length > 0) {
    await worker.terminate();
    return stop(1, whole.errors[0].message);
  }
  const best = whole.result.search.candidates[0].k.components.join(",");
  console.log(`k = (${best}), told of its progress ${steps > 0 ? "on the way" : "never"}`);

  const cancelled = await ask(worker, 2, { command: "run", study }, texts, () => {
    worker.postMessage({ id: 2, cancel: true });
  });
  console.log(`the second run was cancelled: ${cancelled.errors[0].code}`);
  await worker.terminate();
}

function stop(status, message) {
  console.error(message);
  process.exitCode = status;
}

/** The files in the folder of a study, by the names that the study gives them. */
async function textsBeside(path) {
  const folder = dirname(path);
  const files = (await readdir(folder, { withFileTypes: true })).filter((entry) => entry.isFile());
  return Object.fromEntries(
    await Promise.all(files.map(async ({ name }) => [name, await readFile(join(folder, name), "utf8")])),
  );
}

/**
 * The worker's side of a small protocol, the same in a browser and in Node: `{id, request, texts}` asks, `{id, cancel:
 * true}` takes it back; `{id, progress}` tells how far it is, `{id, answer}` ends it.
 */
import { answer, hostOfTexts } from "@kvane/core/job";

/**
 * @param {(message: object) => void} post sends a message back
 * @returns {(message: {id: number, request?: object, texts?: Record<string, string>, cancel?: boolean}) => void}
 */
export function serveRequests(post) {
  const running = new Map();
  return async ({ id, request, texts = {}, cancel = false }) => {
    if (cancel) {
      running.get(id)?.abort();
      return;
    }
    const controller = new AbortController();
    running.set(id, controller);
    const progress = (done, total, what) => post({ id, progress: { done, total, what } });
    // Long work gives the thread back every 20 ms, so that a cancel is heard while it runs.
    const answered = await answer(request, hostOfTexts(texts, { signal: controller.signal, progress }));
    running.delete(id);
    post({ id, answer: answered });
  };
}

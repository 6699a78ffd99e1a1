import { answer, type Request } from "@kvane/core/job";

/** The answer to a request whose files are given by name. */
export function askedWith(request: Request, files: Readonly<Record<string, string>> = {}) {
  return answer(request, {
    readText: (path) => {
      const text = files[path];
      return text === undefined ? Promise.reject(new Error(`no ${path}`)) : Promise.resolve(text);
    },
  });
}

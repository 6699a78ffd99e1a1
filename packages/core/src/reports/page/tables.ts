import { button } from "./dom.js";

/** Every table gets a button that copies it, cells separated by tabs, as spreadsheets and notes take it. */
export function copyableTables(): void {
  for (const table of document.querySelectorAll("table")) {
    const copy = button("Copy", `Copy the table: ${table.caption?.textContent ?? ""}`, () => {
      void copyText(table).then((done) => {
        copy.textContent = done ? "Copied" : "Press Ctrl+C";
        setTimeout(() => {
          copy.textContent = "Copy";
        }, 2000);
      });
    });
    copy.className = "copy";
    // The name of the table stays its caption alone.
    const name = table.caption?.textContent ?? "";
    table.setAttribute("aria-label", name);
    table.parentElement?.setAttribute("aria-label", name);
    table.parentElement?.removeAttribute("aria-labelledby");
    table.caption?.append(" ", copy);
  }
}

/** Where the page may not write to the clipboard, the table is selected for the user to copy. */
async function copyText(table: HTMLTableElement): Promise<boolean> {
  const text = [...table.rows]
    .map((row) => [...row.cells].map((cell) => cell.textContent?.replaceAll("\u00a0", " ") ?? "").join("\t"))
    .join("\n");
  try {
    await navigator.clipboard.writeText(text);
    return true;
  } catch {
    getSelection()?.selectAllChildren(table);
    return false;
  }
}

/** Paper has no triangles to press. */
export function openBeforePrint(): void {
  let opened: HTMLDetailsElement[] = [];
  addEventListener("beforeprint", () => {
    opened = [...document.querySelectorAll("details")].filter(({ open }) => !open);
    for (const one of opened) one.open = true;
  });
  addEventListener("afterprint", () => {
    for (const one of opened) one.open = false;
  });
}

/** Attributes by name; a function is a listener of that event. */
interface Parts {
  readonly [name: string]: string | number | boolean | ((event: never) => void) | undefined;
}

/** An element with attributes, listeners and children; texts become text nodes. */
export function make<Name extends keyof HTMLElementTagNameMap>(
  name: Name,
  parts: Parts = {},
  ...children: readonly (Node | string)[]
): HTMLElementTagNameMap[Name] {
  const node = document.createElement(name);
  for (const [key, value] of Object.entries(parts)) {
    if (typeof value === "function") node.addEventListener(key, value as (event: Event) => void);
    else if (value !== undefined && value !== false) node.setAttribute(key, value === true ? "" : String(value));
  }
  node.append(...children);
  return node;
}

/** A button of a tool bar: what it shows, what it is called, what it does. */
export function button(shown: string, name: string, press: () => void): HTMLButtonElement {
  return make("button", { type: "button", title: name, "aria-label": name, click: press }, shown);
}

/** A labelled choice among texts. */
export function choice(
  label: string,
  options: readonly string[],
  chosen: number,
  choose: (index: number) => void,
): HTMLLabelElement {
  const select = make(
    "select",
    { change: () => choose(select.selectedIndex) },
    ...options.map((text, index) => make("option", index === chosen ? { selected: true } : {}, text)),
  );
  return make("label", { class: "choice" }, `${label} `, select);
}

/** Puts drawn marks into the page: text that this program has made and escaped itself. */
export function replaceDrawing(holder: Element, svg: string): void {
  const parsed = make("template");
  parsed.innerHTML = svg;
  holder.replaceChildren(parsed.content);
}

/** At most one call for each picture of the screen. */
export function oncePerFrame(action: () => void): () => void {
  let waiting = false;
  return () => {
    if (waiting) return;
    waiting = true;
    requestAnimationFrame(() => {
      waiting = false;
      action();
    });
  };
}

/**
 * Turns something by dragging and by the arrow keys. `turned` gets radians to the right and downwards; `keys` are further
 * keys. Up and down with one finger stays for scrolling the page.
 */
export function turning(
  stage: HTMLElement,
  turned: (right: number, down: number) => void,
  keys: { readonly [key: string]: () => void },
): void {
  let last: { x: number; y: number } | null = null;
  stage.addEventListener("pointerdown", (event) => {
    last = { x: event.clientX, y: event.clientY };
    stage.setPointerCapture(event.pointerId);
  });
  stage.addEventListener("pointermove", (event) => {
    if (last === null) return;
    turned((event.clientX - last.x) / 120, (event.clientY - last.y) / 120);
    last = { x: event.clientX, y: event.clientY };
  });
  for (const name of ["pointerup", "pointercancel"] as const)
    stage.addEventListener(name, () => {
      last = null;
    });
  const step = 0.12;
  const all: { readonly [key: string]: () => void } = {
    ArrowLeft: () => turned(-step, 0),
    ArrowRight: () => turned(step, 0),
    ArrowUp: () => turned(0, -step),
    ArrowDown: () => turned(0, step),
    ...keys,
  };
  stage.addEventListener("keydown", (event) => {
    const action = all[event.key];
    if (action === undefined || event.ctrlKey || event.metaKey || event.altKey) return;
    event.preventDefault();
    action();
  });
}

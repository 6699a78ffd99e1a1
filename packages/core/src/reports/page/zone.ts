import { inlineSvg } from "../svg/figure.js";
import type { ZoneData } from "../svg/zone-data.js";
import { usualTurn, zoneDrawing } from "../svg/zone-drawing.js";
import { button, make, oncePerFrame, replaceDrawing } from "./dom.js";
import { turning } from "./turning.js";

/** The zone, to be turned by mouse, touch and keyboard. */
export function liveZone(holder: HTMLElement, data: ZoneData): void {
  const stage = holder.querySelector<HTMLElement>(".stage");
  if (stage === null) return;
  let { turn, tip } = usualTurn;
  const draw = oncePerFrame(() => replaceDrawing(stage, inlineSvg(zoneDrawing(data, { turn, tip }), holder.id)));
  const turned = (by: number, up: number) => {
    turn -= by;
    tip = Math.min(Math.max(tip + up, -Math.PI / 2), Math.PI / 2);
    draw();
  };
  const reset = () => {
    ({ turn, tip } = usualTurn);
    draw();
  };
  turning(stage, turned, { Home: reset });
  stage.before(
    make(
      "div",
      { class: "tools", role: "toolbar", "aria-label": "Zone" },
      button("←", "Turn to the left", () => turned(-0.2, 0)),
      button("→", "Turn to the right", () => turned(0.2, 0)),
      button("↑", "Tip up", () => turned(0, -0.2)),
      button("↓", "Tip down", () => turned(0, 0.2)),
      button("Back", "As at first", reset),
    ),
  );
}

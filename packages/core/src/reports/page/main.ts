/**
 * The script of a report page: it makes the drawings that are already there come alive. It asks the network for nothing,
 * and a page without it shows the same results.
 */
import type { MomentPicture } from "../svg/moment-box.js";
import type { MomentScene } from "../svg/moment-data.js";
import type { PeakChartData } from "../svg/peak-chart-data.js";
import type { ZoneData } from "../svg/zone-data.js";
import { liveChart } from "./chart.js";
import { picturesOfArrangements, picturesOfConfigurations } from "./moment-pictures.js";
import { liveMoments } from "./moments.js";
import { copyableTables, openBeforePrint } from "./tables.js";
import { liveZone } from "./zone.js";

const data: { [key: string]: unknown } = JSON.parse(document.getElementById("kvane-data")?.textContent ?? "{}");

for (const holder of document.querySelectorAll<HTMLElement>("[data-live]")) {
  const own = data[holder.dataset["data"] ?? ""];
  if (own === undefined) continue;
  // One part that fails leaves its drawing as it is, and the others alone.
  try {
    const kind = holder.dataset["live"];
    if (kind === "peaks") liveChart(holder, own as PeakChartData);
    if (kind === "zone") liveZone(holder, own as ZoneData);
    if (kind === "moments") liveMoments(holder, picturesOfArrangements(own as MomentScene));
    if (kind === "configurations") liveMoments(holder, picturesOfConfigurations(own as MomentPicture[]));
  } catch (error) {
    console.warn(error);
  }
}
copyableTables();
openBeforePrint();

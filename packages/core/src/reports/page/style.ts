import { paletteRules, seriesClasses } from "../svg/palette.js";

/** The rules that depend on the palette; the others are in page.css. */
export const paletteStyle = `${paletteRules()}\n${seriesClasses()}`;

import type { DocumentSection, ReportDocument } from "../document/blocks.js";
import { pageHashes, pageNotices, pageScript, pageStyle } from "../generated/page-script.js";
import { element, escapeMarkup as text } from "../svg/mark-up.js";
import { blocksHtml, sectionHtml } from "./blocks.js";

/**
 * A document as one self-contained page: nothing is asked of a network, and its Content-Security-Policy allows nothing
 * but its own style and script, by their hashes (W3C, Content Security Policy Level 3). Every text is escaped. The same
 * document gives the same bytes.
 */
export function htmlPage(document: ReportDocument): string {
  return [
    "<!DOCTYPE html>\n",
    '<html lang="en">\n',
    head(document),
    "<body>\n",
    element("a", { class: "skip", href: "#main" }, "To the report"),
    "\n",
    header(document),
    "\n",
    element("main", { id: "main" }, "\n", ...document.sections.map((section) => `${sectionHtml(section, 2)}\n`)),
    "\n",
    element(
      "footer",
      {},
      element(
        "p",
        {},
        text(`Made by kvane ${document.version}. This file needs no network and can be handed on as it is.`),
      ),
    ),
    "\n",
    `<script type="application/json" id="kvane-data">${dataText(document.data)}</script>\n`,
    `<!-- The script below has parts of these packages.\n\n${pageNotices.join("\n\n")}\n-->\n`,
    `<script>${pageScript}</script>\n`,
    "</body>\n</html>\n",
  ].join("");
}

function head({ title, version }: ReportDocument): string {
  const policy = `default-src 'none'; script-src '${pageHashes.script}'; style-src '${pageHashes.style}'; base-uri 'none'; form-action 'none'`;
  return [
    "<head>\n",
    '<meta charset="utf-8">\n',
    `<meta http-equiv="Content-Security-Policy" content="${policy}">\n`,
    '<meta name="viewport" content="width=device-width, initial-scale=1">\n',
    `<meta name="generator" content="kvane ${text(version)}">\n`,
    '<meta name="referrer" content="no-referrer">\n',
    `<title>${text(title)} – report</title>\n`,
    `<style>${pageStyle}</style>\n`,
    "</head>\n",
  ].join("");
}

function header({ title, summary, sections }: ReportDocument): string {
  return element(
    "header",
    {},
    element("p", { class: "of" }, "From satellite peaks to k and the modes"),
    element("h1", {}, text(title)),
    "\n",
    element(
      "section",
      { class: "brief", "aria-labelledby": "brief-head" },
      element("h2", { id: "brief-head" }, "In short"),
      blocksHtml(summary, "brief"),
    ),
    element("nav", { class: "contents", "aria-label": "Contents" }, element("ol", {}, ...sections.map(contentsEntry))),
  );
}

function contentsEntry({ id, title }: DocumentSection): string {
  return element("li", {}, element("a", { href: `#${id}` }, text(title)));
}

/** JSON that cannot end its element: `<` occurs in no JSON but inside texts, where `\u003c` means the same. */
function dataText(data: ReportDocument["data"]): string {
  return JSON.stringify(data).replaceAll("<", "\\u003c");
}

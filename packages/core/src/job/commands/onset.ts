import { fail, problem } from "../../errors/index.js";
import { isUnused, parseScanTable, type ScanTable } from "../../files/index.js";
import { analyseScan, likeUncertainties, type ScanSeries } from "../../onsets/index.js";
import { type OnsetRecord, onsetRecord } from "../../reports/index.js";
import { optionOf, studyText } from "../inputs/given.js";
import { numberOption } from "../inputs/number-input.js";
import { besideStudy, readNamed } from "../inputs/read-file.js";
import { remember, together, type Work } from "../work.js";

/** `kvane onset`: what peaks and k do with temperature. */
export async function onsetCommand(work: Work): Promise<OnsetRecord> {
  const { table, reduced } = await together({
    table: () => scanOf(work),
    reduced: () => numberOption(work.request, "reduced", { above: 0, to: 1 }),
  });
  if (!table.headed)
    remember(
      work,
      [
        {
          what: "columns of the scan",
          value: "T, then an intensity each",
          because: "there is no header that names them",
        },
      ],
      [],
    );
  rememberColumns(work, table);
  const bare = table.intensities.filter(({ uncertainties }) => uncertainties === null);
  if (bare.length > 0)
    remember(
      work,
      [
        {
          what: "uncertainties",
          value: "from the scatter about each fit",
          because: `the scan gives none${bare.length < table.intensities.length ? ` for ${bare.map(({ name }) => name).join(", ")}` : ""}`,
        },
      ],
      [],
    );
  return onsetRecord(table, analyseScan(table.intensities, table.k, reduced === null ? {} : { reducedRange: reduced }));
}

/** What was told by likeness, and what looks like something else than what it was taken as. */
function rememberColumns(work: Work, table: ScanTable): void {
  const { columns, intensities, file } = table;
  for (const one of columns) {
    const owner = one.of === null ? undefined : columns[one.of];
    if (owner === undefined) continue;
    const what = `column ${one.name} of the scan`;
    if (isUnused(one, columns))
      remember(work, [{ what, value: "uncertainties of T, left out", because: "the fits take T as exact" }], []);
    else if (one.guessed) {
      const because = `its name follows that of ${owner.name}; call it su to say so, or otherwise to have it fitted`;
      remember(work, [{ what, value: `uncertainties of ${owner.name}`, because }], []);
    }
  }
  for (const [index, { name, uncertainties }] of intensities.entries()) {
    const before = intensities[index - 1];
    const bare = before !== undefined && before.uncertainties === null && uncertainties === null;
    if (!bare || !likeUncertainties(intensities[index] as ScanSeries, before)) continue;
    const doubt = problem(
      "doubtful-column",
      `${name} was fitted as a peak, but it may be the uncertainties of ${before.name}`,
      {
        where: { file },
        expected: "a name such as su for a column of uncertainties",
        found: `numbers that are as large as ${before.name} scatters`,
        remedy: `if they are, name the columns in a header, with su behind ${before.name}`,
      },
    );
    remember(work, [], [doubt]);
  }
}

async function scanOf(work: Work) {
  const { request, study } = work;
  const option = optionOf(request, "scan");
  if (option !== null)
    return parseScanTable(await readNamed(work.host, option.text, { ...option.where, file: option.text }), option.text);
  if (study?.onset) {
    const { where } = studyText(study, "onset.file", study.onset.file);
    const path = besideStudy(study.file, study.onset.file);
    return parseScanTable(await readNamed(work.host, path, where), path);
  }
  return fail(study === null ? "missing-argument" : "missing-key", "no temperature scan was given", {
    where: study === null ? { argument: "FILE" } : { file: study.file, path: "onset" },
    expected: "a file with columns: T, then a column for each peak",
    found: "nothing",
    remedy:
      study === null
        ? "name the file: kvane onset scan.csv"
        : "add `onset: {file: scan.csv}` to the study, or name the file",
  });
}

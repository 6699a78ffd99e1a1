import { fail } from "../../errors/index.js";
import {
  type CifDocument,
  type CifStructure,
  looksLikeCif,
  parseCif,
  parseStudy,
  readCifStructure,
  type Study,
} from "../../files/index.js";
import type { JobHost, Request } from "../request.js";
import type { Work } from "../work.js";
import { optionOf, studyText } from "./given.js";
import { besideStudy, readNamed } from "./read-file.js";
import { studyTextFrom } from "./study-input.js";

/** A CIF that was named, and by what: an option wins over the study, and the study over the CIF that it names. */
export interface GivenStructure {
  readonly from: "argument" | "option" | "study";
  readonly document: CifDocument;
  /** The data block that was asked for. */
  readonly block: string | null;
  /** Null for `check` of a CIF, which reads what it needs itself. */
  readonly structure: CifStructure | null;
}

/** What a request names: the study and the CIF, each read once. A CIF in place of the study is told by name or content. */
export async function filesOf(request: Request, host: JobHost): Promise<Pick<Work, "study" | "structure">> {
  const option = optionOf(request, "structure");
  const block = optionOf(request, "block")?.text ?? null;
  const first = request.study ?? null;
  const text = first === null ? null : await studyTextFrom(first, host, request.command);
  const firstIsCif = first !== null && (isCifName(first) || request.command === "study" || looksLikeCif(text ?? ""));
  if (firstIsCif && option !== null) refuseTwo(first, option.text);
  if (firstIsCif) {
    const structure = await given("argument", first, text ?? "", block, request);
    return { study: await studyInPlace(request, first, structure), structure };
  }
  const study = first === null ? null : await parseStudy(text ?? "", first);
  if (request.syntax === true && option === null) refuseSyntax(first);
  if (option !== null) {
    const cif = await readNamed(host, option.text, { ...option.where, file: option.text });
    const structure = await given("option", option.text, cif, block, request);
    return { study: study ?? (await studyInPlace(request, option.text, structure)), structure };
  }
  if (study === null || study.structure === null) {
    if (block !== null) refuseBlock();
    return { study, structure: null };
  }
  const path = besideStudy(study.file, study.structure);
  const { where } = studyText(study, study.places["structure.file"] ? "structure.file" : "structure", "");
  const cif = await readNamed(host, path, where);
  return { study, structure: await given("study", path, cif, block ?? study.structureBlock, request) };
}

function isCifName(path: string): boolean {
  return /\.m?cif$/i.test(path);
}

async function given(
  from: GivenStructure["from"],
  path: string,
  text: string,
  block: string | null,
  request: Request,
): Promise<GivenStructure> {
  const document = await parseCif(text, path, { strict: request.syntax === true });
  const leftToCommand = request.command === "check" && from === "argument";
  return { from, document, block, structure: leftToCommand ? null : await readCifStructure(document, block) };
}

/** The whole job asks for a study: one that says nothing but its title stands for it where there is a CIF alone. */
async function studyInPlace(request: Request, file: string, { structure }: GivenStructure): Promise<Study | null> {
  if (request.command !== "run" && request.command !== "report") return null;
  const study = await parseStudy(`title: ${JSON.stringify(structure?.title ?? structure?.block ?? "CIF")}`, file);
  return { ...study, places: {} };
}

function refuseTwo(first: string, option: string): never {
  fail("conflicting-arguments", "two CIFs are given", {
    where: { argument: "--structure" },
    expected: "one of the two",
    found: `${first} and ${option}`,
    remedy: "leave one of them out",
  });
}

function refuseBlock(): never {
  fail("conflicting-arguments", "--block names a data block, and there is no CIF", {
    where: { argument: "--block" },
    expected: "a CIF: FILE.cif, or --structure FILE.cif",
    found: "none",
    remedy: "name the CIF, or leave --block out",
  });
}

function refuseSyntax(file: string | null): never {
  fail("conflicting-arguments", "--syntax looks at the grammar of a CIF, and there is none", {
    where: { argument: "--syntax" },
    expected: "kvane check FILE.cif --syntax",
    found: file ?? "nothing",
    remedy: "name a CIF, or leave --syntax out",
  });
}

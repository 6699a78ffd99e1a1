import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { listFile, namesText, publicNames } from "../tools/public-names.mjs";

test("the public names are those of the committed list (npm run names rewrites it)", () => {
  expect(namesText(publicNames()).split("\n")).toEqual(readFileSync(listFile, "utf8").split("\n"));
});

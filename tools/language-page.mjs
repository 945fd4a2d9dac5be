// Writes the tables of docs/formula.md anew from the registry of the formula language (after a build).
import { readFileSync, writeFileSync } from "node:fs";
import { format, resolveConfig } from "prettier";
import { languageTables } from "../dist/formula/index.js";

const file = new URL("../docs/formula.md", import.meta.url);
const page = readFileSync(file, "utf8");
const tables = page.indexOf("## Operators");
const text = (tables < 0 ? page : page.slice(0, tables)) + languageTables();
writeFileSync(file, await format(text, { ...(await resolveConfig(file)), parser: "markdown" }));

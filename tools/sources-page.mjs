// Writes the tables of docs/sources.md anew from the registry of sources (after a build).
import { readFileSync, writeFileSync } from "node:fs";
import { format, resolveConfig } from "prettier";
import { sourceTables } from "../dist/sources/reference.js";

const file = new URL("../docs/sources.md", import.meta.url);
const page = readFileSync(file, "utf8");
const tables = page.indexOf("## Pseudo-random sources");
const text = (tables < 0 ? page : page.slice(0, tables)) + sourceTables();
writeFileSync(file, await format(text, { ...(await resolveConfig(file)), parser: "markdown" }));

/** Reports: a record in, a folder or a table out. Nothing is computed here. */
export {
  writeInspection,
  writePlan,
  writeReport,
  writeSensitivity,
  type ReportFiles,
  type ReportOptions,
} from "./write.js";
export { textTable, verdictTables } from "./text-table.js";

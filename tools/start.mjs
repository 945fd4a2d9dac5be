// npm start: set-up, then the main job on the shipped tour. Arguments behind -- go to the study.
import { run, setUp } from "./setup.mjs";

setUp();
const code = run(process.execPath, [
  "dist/cli/main.js",
  "study",
  "tour",
  "--replace",
  ...process.argv.slice(2),
]);
// 1 is a verdict ("what is in use is outside"), which the tour is meant to show; it is not a failure of npm start.
process.exit(code === 1 ? 0 : code);

// Installs the packages of package-lock.json where they are missing or the lock file has changed, then builds.
// Quick when nothing has changed: one hash, then the build's own stamps.
import { createHash } from "node:crypto";
import { execFileSync } from "node:child_process";
import { existsSync, lstatSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

export const root = fileURLToPath(new URL("..", import.meta.url));

/** Runs a command in the project's folder with its output shown; gives its exit code. */
export function run(file, args, options = {}) {
  try {
    execFileSync(file, args, { cwd: root, stdio: "inherit", ...options });
    return 0;
  } catch (error) {
    if (typeof error.status === "number") return error.status;
    if (error.signal) return 130;
    throw error;
  }
}

export function setUp() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    process.stderr.write(`tolerand: needs Node 20.19 or later, found ${process.versions.node}\n`);
    process.exit(2);
  }
  const stampFile = join(root, "node_modules", ".lock-stamp");
  const stamp = createHash("sha256")
    .update(readFileSync(join(root, "package-lock.json")))
    .digest("hex");
  if (!existsSync(stampFile) || readFileSync(stampFile, "utf8") !== stamp) {
    // npm ci would empty the folder that a link leads to, which belongs to another checkout.
    if (lstatSync(join(root, "node_modules"), { throwIfNoEntry: false })?.isSymbolicLink()) {
      process.stderr.write(
        "setup: node_modules is a link to another checkout and does not match package-lock.json; " +
          "remove the link, then run this again\n",
      );
      process.exit(2);
    }
    process.stderr.write("setup: npm ci\n");
    // --include=dev: the build and the tests need the development packages even where NODE_ENV is production.
    const code = run("npm", ["ci", "--include=dev", "--no-audit", "--no-fund"], { stdio: ["ignore", 2, 2] });
    if (code !== 0) process.exit(code);
    writeFileSync(stampFile, stamp);
  }
  const code = run(process.execPath, ["tools/build.mjs"]);
  if (code !== 0) process.exit(code);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) setUp();

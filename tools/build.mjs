// Builds dist/: the WebAssembly kernels (AssemblyScript), the TypeScript rooms (tsc) and the binary tables.
// Quick when nothing has changed: each step is skipped while the hash of its inputs stands in dist/.build.json.
import { createHash } from "node:crypto";
import { execFileSync } from "node:child_process";
import { cpSync, existsSync, mkdirSync, readdirSync, readFileSync, chmodSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";

const root = fileURLToPath(new URL("..", import.meta.url));
const stampFile = join(root, "dist", ".build.json");

function filesBelow(folder) {
  return readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => join(entry.parentPath, entry.name))
    .sort();
}

function hashOf(files) {
  const hash = createHash("sha256");
  for (const file of files) hash.update(file).update("\0").update(readFileSync(file)).update("\0");
  return hash.digest("hex");
}

const stamps = existsSync(stampFile) ? JSON.parse(readFileSync(stampFile, "utf8")) : {};

function step(name, inputs, outputs, action) {
  const hash = hashOf(inputs);
  if (stamps[name] === hash && outputs.every((file) => existsSync(join(root, file)))) return;
  process.stderr.write(`build: ${name}\n`);
  action();
  stamps[name] = hash;
  mkdirSync(join(root, "dist"), { recursive: true });
  writeFileSync(stampFile, JSON.stringify(stamps));
}

const bin = (name) => join(root, "node_modules", ".bin", name);
const common = [join(root, "package-lock.json"), join(root, "tools", "build.mjs")];
const kernelSources = filesBelow("src/kernels/assembly");
const tables = filesBelow("src").filter((file) => file.endsWith(".bin"));
const hostSources = filesBelow("src").filter((file) => file.endsWith(".ts") && !kernelSources.includes(file));

try {
  step("kernels", [...common, ...kernelSources], ["dist/kernels/kernels.wasm"], () => {
    mkdirSync(join(root, "dist", "kernels"), { recursive: true });
    const flags = [
      "--runtime",
      "stub",
      "--enable",
      "simd",
      "-O3",
      "--noAssert",
      "--initialMemory",
      "16",
      "--disableWarning",
      "112",
    ];
    const output = ["-o", "dist/kernels/kernels.wasm"];
    execFileSync(bin("asc"), ["src/kernels/assembly/index.ts", ...output, ...flags], {
      cwd: root,
      stdio: "inherit",
    });
  });
  step("tables", [...common, ...tables], [], () => {
    for (const file of tables) cpSync(file, file.replace(join(root, "src"), join(root, "dist")));
  });
  step("typescript", [...common, join(root, "tsconfig.json"), ...hostSources], ["dist/cli/main.js"], () => {
    execFileSync(bin("tsc"), ["-p", "tsconfig.json"], { cwd: root, stdio: "inherit" });
    chmodSync(join(root, "dist", "cli", "main.js"), 0o755);
  });
} catch (error) {
  if (error.status === undefined) throw error;
  process.stderr.write("build: failed, see above\n");
  process.exit(1);
}

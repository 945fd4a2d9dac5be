// Draws from outside: files, FIFOs and programs become the points that a built-in source of the same draws gives.
import { execFileSync, spawn } from "node:child_process";
import { chmodSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { setTimeout } from "node:timers/promises";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { instantiateKernels } from "../../src/kernels/instance.js";
import type { SourceSpec } from "../../src/problem/contract.js";
import { parseSource } from "../../src/sources/choice.js";
import { DRAW_FORMATS, writeIntegers, writeReals } from "../../src/sources/draws/formats.js";
import { Key } from "../../src/sources/key.js";
import { findSource } from "../../src/sources/registry.js";

let folder: string;
beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), "draws-test-"));
});
afterAll(() => {
  rmSync(folder, { recursive: true });
});

const STATE = "5489";

/** Published integers of a source from its state. */
function integers(id: string, count: number): bigint[] {
  const source = findSource(id);
  if (source === undefined || !("openIntegers" in source)) throw new Error("no integers");
  const open = source.openIntegers as (r: object) => { next(): bigint };
  const stream = open({ key: null, state: STATE });
  return Array.from({ length: count }, () => stream.next());
}

interface Asked {
  readonly dimension?: number;
  readonly n?: number;
  readonly replicate?: number;
  readonly state?: string;
  readonly allowPrograms?: boolean;
}

/** Points of a replicate, one after the other, read in blocks of 7. */
function points(spec: SourceSpec, asked: Asked = {}): number[] {
  const { dimension = 3, n = 50, ...rest } = asked;
  const kernels = instantiateKernels();
  const stream = parseSource(spec).open({ dimension, n, key: new Key("draws"), ...rest }, kernels);
  const pointer = kernels.arena.allocate(8 * dimension * 8);
  const out: number[] = [];
  try {
    for (let done = 0; done < n; done += 7) {
      const count = Math.min(7, n - done);
      stream.fill(pointer, 8, count);
      const rows = kernels.f64(pointer, 8 * dimension);
      for (let i = 0; i < count; i++) for (let j = 0; j < dimension; j++) out.push(rows[j * 8 + i] ?? NaN);
    }
  } finally {
    stream.close?.();
  }
  return out;
}

function write(name: string, content: Uint8Array | string): string {
  const path = join(folder, name);
  writeFileSync(path, content);
  return path;
}

function file(name: string, format: string, more: object = {}): SourceSpec {
  return { name: "house", draws: { file: name, format, folder }, ...more };
}

function message(act: () => unknown): string {
  try {
    act();
  } catch (error) {
    if (error instanceof RangeError || error instanceof TypeError) return error.message;
    throw error;
  }
  return "no error";
}

describe("files", () => {
  test.each([
    ["u32le", "mt19937"],
    ["u32be", "mt19937"],
    ["u64le", "mt19937-64"],
    ["u64be", "mt19937-64"],
  ] as const)("%s: integers become the points of %s", (format, id) => {
    const bytes = writeIntegers(integers(id, 600), format);
    write(`${format}.bin`, bytes ?? "");
    const own = points(file(`${format}.bin`, format));
    expect(own).toEqual(points(id, { state: STATE }));
    // replicates are consecutive stretches
    const all = points(id, { state: STATE, n: 200 });
    expect(points(file(`${format}.bin`, format), { replicate: 3 })).toEqual(all.slice(450));
  });

  test.each(["f64le", "f32le", "text"] as const)("%s: reals are taken as they are", (format) => {
    const values = Float64Array.from(points("mt19937", { state: STATE, n: 200 }));
    write(`real.${format}`, writeReals(values, format));
    const expected = format === "f32le" ? [...values].map(Math.fround) : [...values];
    const spec = file(`real.${format}`, format);
    for (const replicate of [0, 1, 3, 2])
      expect(points(spec, { replicate })).toEqual(expected.slice(150 * replicate, 150 * (replicate + 1)));
  });

  test("text takes spaces, commas, semicolons and lines of any system, and no new line at the end", () => {
    write("any.txt", " 0.5,.25;\t1e-3\r\n0,0 0.75");
    expect(points(file("any.txt", "text"), { dimension: 1, n: 6 })).toEqual([0.5, 0.25, 0.001, 0, 0, 0.75]);
  });

  test("strides, bits, endpoints and single precision apply as to any source", () => {
    write("u32le.bin", writeIntegers(integers("mt19937", 600), "u32le") ?? "");
    for (const usage of [
      { tuples: "strided 3" },
      { bits: "low 7" },
      { bits: "top 20", endpoint: "left" },
      { float32: true },
    ]) {
      expect(points(file("u32le.bin", "u32le", usage))).toEqual(
        points({ name: "own", source: "mt19937", ...usage }, { state: STATE }),
      );
    }
  });

  test("the stock of replicates is known before the run", () => {
    write("stock.bin", new Uint8Array(4000));
    const supply = (spec: SourceSpec) => parseSource(spec).source.replicateSupply?.(3, 50);
    expect(supply(file("stock.bin", "u32le"))).toEqual({ count: 6, why: '"stock.bin" holds 1000 draws' });
    expect(supply(file("stock.bin", "u64le", { tuples: "strided 2" }))?.count).toBe(1);
    write("stock.txt", "0.5 0.25\n0.75");
    expect(parseSource(file("stock.txt", "text")).source.replicateSupply?.(1, 2)).toEqual({
      count: 1,
      why: '"stock.txt" holds 3 draws',
    });
  });

  test("what is wrong with a file is said with the byte offset", () => {
    write("cut.bin", new Uint8Array(4001));
    expect(message(() => parseSource(file("cut.bin", "u32le")).source.replicateSupply?.(1, 8))).toBe(
      'source.draws.file: expected a multiple of 4 bytes for format u32le, found 4001 in "cut.bin"; the last draw is cut at byte offset 4000',
    );
    expect(message(() => points(file("none.bin", "u32le")))).toBe(
      'source.draws.file: expected a file or a FIFO that can be read, found "none.bin" (ENOENT)',
    );
    expect(message(() => points(file(".", "u32le")))).toBe(
      'source.draws.file: expected a file or a FIFO, found ".", which is neither',
    );
    expect(message(() => points(file("cut.bin", "u64le"), { replicate: 3 }))).toBe(
      'source "house", replicate 3: the file ends at byte offset 4001, where 103 more bytes are wanted; give more draws, or take fewer replicates or points (--replicates, --sizes)',
    );
    write("short.txt", "0.5 0.25\n");
    expect(message(() => points(file("short.txt", "text"), { dimension: 1, n: 5 }))).toBe(
      'source "house", replicate 0: the file ends at byte offset 9, where 3 more numbers are wanted; give more draws, or take fewer replicates or points (--replicates, --sizes)',
    );
  });

  test.each([
    ["f64le", writeReals(Float64Array.of(0.5, 0, 1, 0.25), "f64le"), "1 at byte offset 16"],
    ["f64le", writeReals(Float64Array.of(0.5, NaN, 1, 0.25), "f64le"), "NaN at byte offset 8"],
    ["f32le", writeReals(Float64Array.of(0.5, 0.25, 0, -0.5), "f32le"), "-0.5 at byte offset 12"],
    ["text", "0.5 0.25\n1.0 0.5", '"1.0" at byte offset 9'],
    ["text", "0.5 0x1p-3 0 0", '"0x1p-3" at byte offset 4'],
  ] as const)(
    "%s: a number outside [0, 1) is refused at its byte offset (%#)",
    (format, content, expected) => {
      write("outside", content);
      expect(message(() => points(file("outside", format), { dimension: 2, n: 2 }))).toBe(
        `source "house", replicate 0: expected numbers of at least 0 and below 1, found ${expected}`,
      );
    },
  );

  test("zeros of reals are counted", () => {
    write("zeros.txt", "0 0.5 0 0.25");
    const kernels = instantiateKernels();
    const stream = parseSource(file("zeros.txt", "text")).open({ dimension: 2, n: 2, key: null }, kernels);
    stream.fill(kernels.arena.allocate(128), 8, 2);
    expect(stream.endpointsHit?.()).toBe(2);
  });
});

describe("FIFOs", () => {
  test("are read one replicate after the other, waiting for the writer", () => {
    const path = join(folder, "pipe");
    execFileSync("mkfifo", [path]);
    write("u32le.bin", writeIntegers(integers("mt19937", 600), "u32le") ?? "");
    const writer = spawn("/bin/sh", [
      "-c",
      'sleep 0.3; cat "$1" > "$2"',
      "sh",
      join(folder, "u32le.bin"),
      path,
    ]);
    const all = points("mt19937", { state: STATE, n: 200 });
    const spec = file("pipe", "u32le");
    expect(parseSource(spec).source.singlePass).toBe(true);
    expect(parseSource(spec).source.replicateSupply?.(3, 50).fresh).toBe(false);
    for (const replicate of [0, 1, 2, 3])
      expect(points(spec, { replicate })).toEqual(all.slice(150 * replicate, 150 * (replicate + 1)));
    expect(message(() => points(spec, { replicate: 4 }))).toBe(
      'source "house", replicate 4: the writer of the FIFO ends at byte offset 2400, where 84 more bytes are wanted; give more draws, or take fewer replicates or points (--replicates, --sizes)',
    );
    writer.kill();
  });
});

describe("programs", () => {
  const leave = { allowPrograms: true };

  function script(name: string, body: string): void {
    chmodSync(write(name, `#!/bin/sh\n${body}\n`), 0o755);
  }

  function program(command: string[], format = "text", more: object = {}): SourceSpec {
    return { name: "house", draws: { program: command, format, folder }, ...more };
  }

  test("nothing is started without leave, and the refusal shows the command", () => {
    script("mark", `echo started >> "${folder}/marks"`);
    expect(message(() => points(program(["./mark", "a b", "it's"])))).toBe(
      `source "house" would start the program: ./mark 'a b' 'it'\\''s' (in folder "${folder}"); programs are started only with --allow-programs on the command line`,
    );
    expect(readdirSync(folder)).not.toContain("marks");
  });

  test("its output becomes points; its arguments, seed and replicate reach it as they are", () => {
    script("echo", 'printf "0.%s 0.%s 0.%s\\n" "$TOLERAND_SEED" "$TOLERAND_REPLICATE" "$#"');
    const asked = { ...leave, dimension: 3, n: 1, replicate: 4 };
    const published = { seeding: { published: { base: 100, stride: 11 } } };
    expect(points(program(["./echo", "a b", "$(c)"], "text", published), asked)).toEqual([0.144, 0.4, 0.2]);
    expect(points(program(["./echo"], "text", { state: "25" }), asked)).toEqual([0.25, 0.4, 0]);
    // seeds from keys: a decimal number of 64 bits, another for another key
    const [seed] = points(program(["./echo"]), asked);
    const word = new Key("draws").derive("program").words64(1)[0] ?? 0n;
    expect(seed).toBe(Number(`0.${word}`));
  });

  test("binary output of a fast writer is read with back pressure, and the writer is ended", async () => {
    write("u32le.bin", writeIntegers(integers("mt19937", 600), "u32le") ?? "");
    const command = ["sh", "-c", "echo $$ > writer; while :; do cat u32le.bin; done"];
    expect(points(program(command, "u32le"), leave)).toEqual(points("mt19937", { state: STATE }));
    // a turn of the event loop, in which the process that was ended is taken note of
    await setTimeout(200);
    const found = execFileSync("/bin/sh", ["-c", `kill -0 $(cat ${folder}/writer) 2>/dev/null || echo gone`]);
    expect(found.toString()).toBe("gone\n");
  });

  const tail =
    "where 3 more numbers are wanted; give more draws, or take fewer replicates or points (--replicates, --sizes)";
  test.each([
    ["early end", ["sh", "-c", "echo 0.5 0.25"], "its program ended with exit code 0 at byte offset 9"],
    ["failure", ["sh", "-c", "echo 0.5 0.25; exit 3"], "its program ended with exit code 3 at byte offset 9"],
    [
      "signal",
      ["sh", "-c", "echo 0.5 0.25; kill -9 $$"],
      "its program was ended by signal 9 at byte offset 9",
    ],
  ])("%s: the error names the byte offset and how it ended", (_, command, expected) => {
    expect(message(() => points(program(command), { ...leave, dimension: 5, n: 1, replicate: 2 }))).toBe(
      `source "house", replicate 2: ${expected}, ${tail}`,
    );
  });

  test("a program that is not there is said", () => {
    expect(message(() => points(program(["./nowhere"], "u32le"), { ...leave, dimension: 1, n: 1 }))).toBe(
      'source "house", replicate 0: its program was not found (exit code 127) at byte offset 0, where 4 more bytes are wanted; give more draws, or take fewer replicates or points (--replicates, --sizes)',
    );
    const spec = {
      name: "house",
      draws: { program: ["./echo"], format: "text", folder: join(folder, "none") },
    };
    expect(message(() => points(spec, leave))).toBe(
      `source "house": its program cannot be started in folder "${join(folder, "none")}"; does the folder exist?`,
    );
  });
});

describe("mappings", () => {
  test.each([
    [
      { draws: { file: "a", format: "u16" } },
      `source.draws.format: expected one of ${DRAW_FORMATS.join(", ")}, found "u16"`,
    ],
    [{ draws: { format: "u32le" } }, 'source.draws: expected "file" or "program", found neither'],
    [
      { draws: { file: "a", program: ["b"], format: "u32le" } },
      'source.draws: expected "file" or "program", found both',
    ],
    [
      { draws: { file: "a", fromat: "u32le" } },
      "source.draws.format: expected one of u32le, u32be, u64le, u64be, f64le, f32le, text, found nothing",
    ],
    [
      { draws: { program: "./a", format: "u32le" } },
      'source.draws.program: expected a list of texts, the program first and then its arguments, found "./a"',
    ],
    [
      { draws: { file: "a", format: "u32le" }, tuples: "per-coordinate" },
      'source.tuples: expected "successive" or "strided k", as draws from outside are one stream, found "per-coordinate"',
    ],
    [
      { draws: { file: "a", format: "f64le" }, bits: "top 8" },
      'source.bits: expected none for format f64le, whose draws are taken as they are, found "top 8"',
    ],
    [
      { draws: { file: "a", format: "text" }, endpoint: "left" },
      'source.endpoint: expected none for format text, whose draws are taken as they are, found "left"',
    ],
    [
      { draws: { file: "a", format: "u32le" }, seeding: "published" },
      'source.seeding: expected none for draws from a file, whose replicates are its consecutive stretches, found "published"',
    ],
    [
      { draws: { file: "a", format: "u32le" }, source: "mt19937" },
      'source: expected one of the keys "congruential", "recursive", "xorshift", "source", "draws", found "source" and "draws"',
    ],
  ])("%j is refused", (written, expected) => {
    expect(message(() => parseSource({ name: "house", ...written }))).toBe(expected);
  });
});

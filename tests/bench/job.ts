// One job in a process of its own, as the bench's whole-process rows need it. Prints one line of JSON.
import { createHash } from "node:crypto";
import { closeSync, createReadStream, openSync, readFileSync, writeSync } from "node:fs";
import { open } from "node:fs/promises";
import { pipeline } from "node:stream/promises";
import { GCodeLineStream } from "gcode-parser";
import { fileChunks } from "#server/cli/input-stream.ts";
import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import type { Reading } from "#shared/layers/reading.ts";
import { prove } from "#shared/prove/prove.ts";
import { prepareTuning } from "#shared/rewrite/prepare-tuning.ts";
import { Rewriter } from "#shared/rewrite/rewriter.ts";
import { countLines } from "#tests/bench/analysis.ts";

const machine = parseMachine(JSON.parse(readFileSync("samples/machines/tern.json", "utf8")));
const profile = parseProfile(JSON.parse(readFileSync("tests/bench/profile.json", "utf8")));

/** As the command line reads a file. */
async function* chunksOf(file: string): AsyncGenerator<Uint8Array, void, undefined> {
  const handle = await open(file);
  try {
    yield* fileChunks(handle, true);
  } finally {
    await handle.close();
  }
}

const sha256 = (text: string): string => createHash("sha256").update(text).digest("hex");

async function analyse(file: string): Promise<Reading> {
  const reader = new ToolpathReader(machine);
  const hash = createHash("sha256");
  for await (const chunk of chunksOf(file)) {
    hash.update(chunk);
    reader.push(chunk);
  }
  return reader.end(hash.digest("hex"));
}

/** The pass that writes, as the command line does it: piece by piece, hashed, into the file. */
async function rewrite(file: string, reading: Reading, to: string): Promise<void> {
  const { edits } = prepareTuning({ reading, machine, profile, digest: sha256, engine: "bench", status: "trial-only" });
  const out = openSync(to, "w");
  const hash = createHash("sha256");
  const rewriter = new Rewriter(edits, reading.file, (bytes) => {
    hash.update(bytes);
    writeSync(out, bytes);
  });
  for await (const chunk of chunksOf(file)) rewriter.push(chunk);
  rewriter.end();
  hash.digest();
  closeSync(out);
}

async function copy(file: string, to: string): Promise<void> {
  const out = openSync(to, "w");
  const hash = createHash("sha256");
  for await (const chunk of chunksOf(file)) {
    hash.update(chunk);
    writeSync(out, chunk);
  }
  hash.digest();
  closeSync(out);
}

const timed = async (work: () => Promise<unknown>): Promise<number> => {
  const start = performance.now();
  await work();
  return performance.now() - start;
};

const jobs: Record<string, (file: string, other: string) => Promise<Record<string, number>>> = {
  analyse: async (file) => ({ ms: await timed(() => analyse(file)) }),
  /** both passes with hashes in and out */
  both: async (file, other) => ({ ms: await timed(async () => rewrite(file, await analyse(file), other)) }),
  /** rewrite pass against read + hash + write, in turn */
  passes: async (file, other) => {
    const reading = await analyse(file);
    await rewrite(file, reading, other);
    const copyFirst = Math.random() < 0.5;
    const copyMs = copyFirst ? await timed(() => copy(file, other)) : 0;
    const rewriteMs = await timed(() => rewrite(file, reading, other));
    return { rewriteMs, copyMs: copyFirst ? copyMs : await timed(() => copy(file, other)) };
  },
  /** proof pass against analysis, in turn, files in the page cache */
  proof: async (file, other) => {
    const reading = await analyse(file);
    await rewrite(file, reading, other);
    const nothing = { sha256: "0".repeat(64), bytes: reading.file.bytes };
    const proof = (): Promise<unknown> =>
      prove({
        original: chunksOf(file),
        tuned: chunksOf(other),
        reading,
        machine,
        digest: sha256,
        hashes: () => ({ input: nothing, output: nothing }),
        engine: "bench",
      });
    await proof();
    const analyseMs = await timed(() => analyse(file));
    return { proofMs: await timed(proof), analyseMs };
  },
  loop: async (file) => {
    let lines = 0;
    const ms = await timed(async () => {
      for await (const chunk of chunksOf(file)) lines += countLines(chunk);
    });
    return { ms, lines };
  },
  "gcode-parser": async (file) => {
    let lines = 0;
    const ms = await timed(() =>
      pipeline(
        createReadStream(file, { highWaterMark: 1 << 19 }),
        new GCodeLineStream({ batchSize: 1000 }),
        async (source: AsyncIterable<unknown>) => {
          for await (const _ of source) lines++;
        },
      ),
    );
    return { ms, lines };
  },
};

const [name, file, other] = process.argv.slice(2);
const result = await jobs[name](file, other);
process.stdout.write(`${JSON.stringify({ ...result, peakMB: process.resourceUsage().maxRSS / 1024 })}\n`);

import { spawnSync } from "node:child_process";
import { closeSync, mkdtempSync, openSync, readFileSync, rmSync, writeSync } from "node:fs";
import { tmpdir } from "node:os";
import { dirname, join as joinPath } from "node:path";
import { fileURLToPath } from "node:url";
import { parseMachine } from "#shared/formats/machine.ts";
import { parsePolymer } from "#shared/formats/polymer.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { predictPlan } from "#shared/plan/predict-plan.ts";
import { analysisRatio, dialectCosts, join } from "#tests/bench/analysis.ts";
import { generateToolpath } from "#tests/bench/generate-toolpath.ts";
import { median, milliseconds, shuffledRounds } from "#tests/bench/statistics.ts";

/**
 * Measures what PERFORMANCE lists and prints it with gate and stretch. Times on a shared machine swing, so everything is
 * compared within one run: chunk by chunk, or process by process in shuffled turns; medians throughout.
 */

const quick = process.argv.includes("--quick");
const machine = parseMachine(JSON.parse(readFileSync("samples/machines/tern.json", "utf8")));
const profile = parseProfile(JSON.parse(readFileSync("tests/bench/profile.json", "utf8")));
const polymer = parsePolymer(JSON.parse(readFileSync("samples/polymers/peek.json", "utf8")));
const folder = mkdtempSync(joinPath(tmpdir(), "quenchline-bench-"));
const jobFile = joinPath(dirname(fileURLToPath(import.meta.url)), "job.mjs");
const tuned = joinPath(folder, "tuned.gcode");

interface Row {
  figure: string;
  measured: number | undefined;
  unit?: string;
  gate: number;
  stretch: number;
  /** larger is better */
  atLeast?: boolean;
}

/** As `quenchline` in package.json starts the command line. */
const SMALL_YOUNG_HEAP = "--max-semi-space-size=4";

function writeFile(name: string, bytes: number): string {
  const path = joinPath(folder, name);
  const file = openSync(path, "w");
  for (const piece of generateToolpath(bytes)) writeSync(file, piece);
  closeSync(file);
  return path;
}

function job(name: string, file: string): Record<string, number> {
  const { stdout, stderr, status } = spawnSync(
    process.execPath,
    [...process.execArgv, SMALL_YOUNG_HEAP, jobFile, name, file, tuned],
    {
      encoding: "utf8",
    },
  );
  if (status !== 0) throw new Error(`${name}: ${stderr}`);
  return JSON.parse(stdout) as Record<string, number>;
}

/** Each job several times, in shuffled turns; all results by job. */
function jobs(names: readonly string[], file: string, rounds: number): Record<string, Record<string, number>[]> {
  const results: Record<string, Record<string, number>[]> = Object.fromEntries(names.map((name) => [name, []]));
  for (const name of shuffledRounds(names, rounds)) results[name].push(job(name, file));
  return results;
}

const say = (text: string): void => {
  process.stderr.write(`${text}\n`);
};
const of = (results: Record<string, number>[], key: string): number => median(results.map((result) => result[key]));

function planMs(): number {
  const layers = Array.from({ length: 5000 }, (_, k) => ({
    index: k + 1,
    object: 1,
    zMm: Math.round((k + 1) * 200) / 1000,
    heightMm: 0.2,
    timeS: 20 + 15 * Math.sin(k / 50),
    depositedLengthMm: 2000 + 500 * Math.sin(k / 50),
  }));
  const once = (): number => milliseconds(() => planDuties({ layers, machine, profile }));
  for (let warm = 0; warm < 5; warm++) once();
  return median(Array.from({ length: 9 }, once));
}

/** A prediction with its band, ms. */
function predictionMs(count: number): number {
  const layers = Array.from({ length: count }, (_, k) => ({
    index: k + 1,
    object: 1,
    zMm: Math.round((k + 1) * 200) / 1000,
    heightMm: 0.2,
    timeS: 22 + 8 * Math.sin(k / 40),
    depositedLengthMm: 900,
    areaMm2: 350,
    outlineMm: 230,
    nozzleC: 400,
    bedC: 140,
    waits: [],
  }));
  const plan = planDuties({ layers, machine, profile });
  const once = (): number => milliseconds(() => predictPlan({ layers, machine, profile, polymer, plan }));
  for (let warm = 0; warm < 3; warm++) once();
  return median(Array.from({ length: 7 }, once));
}

function predictionRows(): Row[] {
  say("predicting 500 and 5,000 layers, with the band");
  const [small, large] = [predictionMs(500), predictionMs(5000)];
  return [
    { figure: "predicting 500 layers", measured: small, unit: "ms", gate: 50, stretch: 50 },
    { figure: "predicting 5,000 layers", measured: large, unit: "ms", gate: 500, stretch: 500 },
    { figure: "cost a layer, 5,000 ÷ 500", measured: large / small / 10, gate: 1.5, stretch: 1.1 },
  ];
}

function rows(): Row[] {
  say("analysis against a byte loop, 100 MB in memory");
  const analysis = analysisRatio(join(generateToolpath(quick ? 3e7 : 1e8)), machine, 7);
  say(`  ${analysis.nsPerLine.toFixed(0)} ns a line; the byte loop ${analysis.loopNsPerLine.toFixed(0)}`);
  say("dialects");
  const dialects = dialectCosts(quick ? 1e7 : 3e7, machine, 5);
  const plain = dialects.get("plain")!;
  const relative = [...dialects].map(([name, cost]) => `${name} ${(cost / plain).toFixed(2)}`);
  say(`  against plain: ${relative.join(", ")}`);
  say("planning 5,000 layers");
  const planning = planMs();
  say("rewrite and proof passes, 100 MB");
  const hundred = writeFile("100.gcode", quick ? 3e7 : 1e8);
  const passes = jobs(["passes", "proof"], hundred, 5);
  const table: Row[] = [
    { figure: "analysis ÷ byte loop", measured: analysis.ratio, gate: 3, stretch: 2.3 },
    { figure: "slowest dialect ÷ plain", measured: Math.max(...dialects.values()) / plain, gate: 3, stretch: 1.7 },
    {
      figure: "rewrite pass ÷ (read + hash + write)",
      measured: median(passes.passes.map(({ rewriteMs, copyMs }) => rewriteMs / copyMs)),
      gate: 1.25,
      stretch: 1.12,
    },
    {
      figure: "proof pass ÷ analysis",
      measured: median(passes.proof.map(({ proofMs, analyseMs }) => proofMs / analyseMs)),
      gate: 1,
      stretch: 1,
    },
    { figure: "planning 5,000 layers", measured: planning, unit: "ms", gate: 20, stretch: 20 },
    ...predictionRows(),
  ];
  return quick ? table : [...table, ...wholeFileRows(hundred)];
}

function wholeFileRows(hundred: string): Row[] {
  say("whole processes, 10 MB, 100 MB and 1 GB");
  const ten = writeFile("10.gcode", 1e7);
  const gigabyte = writeFile("1000.gcode", 1e9);
  const small = jobs(["both"], ten, 3);
  const middle = jobs(["analyse", "loop"], hundred, 5);
  const large = jobs(["analyse", "both", "loop"], gigabyte, 5);
  say("the line stream of gcode-parser over 1 GB, parsing only (minutes)");
  const parser = job("gcode-parser", gigabyte);
  const seconds = (ms: number): string => (ms / 1000).toFixed(1);
  say(
    `  ${seconds(parser.ms)} s; analysis ${seconds(of(large.analyse, "ms"))} s, both passes ${seconds(of(large.both, "ms"))} s`,
  );
  const perByte = (results: Record<string, Record<string, number>[]>): number =>
    of(results.analyse, "ms") / of(results.loop, "ms");
  const peak = of(large.both, "peakMB");
  return [
    {
      figure: "analysis + hash against gcode-parser, 1 GB",
      measured: parser.ms / of(large.analyse, "ms"),
      unit: "times",
      gate: 20,
      stretch: 30,
      atLeast: true,
    },
    {
      figure: "both passes against gcode-parser, 1 GB",
      measured: parser.ms / of(large.both, "ms"),
      unit: "times",
      gate: 12,
      stretch: 18,
      atLeast: true,
    },
    { figure: "peak memory at 1 GB", measured: peak, unit: "MB", gate: 128, stretch: 96 },
    {
      figure: "growth of memory from 10 MB",
      measured: peak - of(small.both, "peakMB"),
      unit: "MB",
      gate: 48,
      stretch: 16,
    },
    { figure: "cost a line, 1 GB ÷ 100 MB", measured: perByte(large) / perByte(middle), gate: 1.15, stretch: 1.05 },
  ];
}

function print(table: readonly Row[]): boolean {
  let reached = true;
  const line = (cells: string[]): void => {
    process.stdout.write(
      `| ${cells[0].padEnd(44)} | ${cells
        .slice(1)
        .map((cell) => cell.padStart(10))
        .join(" | ")} |\n`,
    );
  };
  line(["figure", "measured", "gate", "stretch", "reached"]);
  line(["---", "---", "---", "---", "---"]);
  for (const { figure, measured = Number.NaN, unit = "", gate, stretch, atLeast } of table) {
    const holds = (limit: number): boolean => (atLeast ? measured >= limit : measured <= limit);
    reached &&= holds(gate);
    line([
      figure,
      `${measured.toFixed(2)} ${unit}`.trim(),
      String(gate),
      String(stretch),
      holds(stretch) ? "stretch" : holds(gate) ? "gate" : "no",
    ]);
  }
  return reached;
}

try {
  if (!print(rows())) process.exitCode = 1;
} finally {
  rmSync(folder, { recursive: true, force: true });
}

import { type ChildProcess, spawn } from "node:child_process";
import { createHash } from "node:crypto";
import { mkdtempSync, readdirSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { expect, onTestFinished } from "vitest";

export const ROOT = fileURLToPath(new URL("../../..", import.meta.url));
export const LAUNCH = join(ROOT, "server/cli/launch.mjs");
export const sample = (name: string): string => join(ROOT, "samples", name);
export const TERN = sample("machines/tern.json");
export const SEAL_RING = sample("seal-ring.gcode");
export const SEAL_RING_PROFILE = sample("profiles/seal-ring-stiff-base-and-tough-lip.json");

export interface Outcome {
  status: number | null;
  signal: NodeJS.Signals | null;
  stdout: string;
  stderr: string;
}

interface Call {
  cwd?: string;
  env?: NodeJS.ProcessEnv;
  /** for standard input, which is empty otherwise */
  input?: Uint8Array | string;
}

/** Runs the command line as its callers do, through the launcher, in a process of its own. */
export function quenchline(argv: string[], call: Call = {}): Promise<Outcome> {
  return outcome(start(process.execPath, [LAUNCH, ...argv], call));
}

/** Starts a program; its standard streams are pipes. */
export function start(program: string, argv: string[], { cwd = ROOT, env = {}, input = "" }: Call = {}): ChildProcess {
  // Not what npm, which runs these tests, has left: the command line looks at it.
  const { npm_lifecycle_event: _event, INIT_CWD: _folder, ...inherited } = process.env;
  const child = spawn(program, argv, { cwd, env: { ...inherited, ...env }, stdio: "pipe" });
  // A program that has read enough closes its input.
  child.stdin.on("error", () => {});
  child.stdin.end(input);
  return child;
}

export function outcome(child: ChildProcess): Promise<Outcome> {
  const streams = { stdout: "", stderr: "" };
  for (const name of ["stdout", "stderr"] as const)
    child[name]?.setEncoding("utf8").on("data", (text: string) => {
      streams[name] += text;
    });
  return new Promise((resolve, reject) => {
    child.on("error", reject);
    child.on("close", (status, signal) => resolve({ status, signal, ...streams }));
  });
}

/** An empty folder that goes away after the test. */
export function scratchFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), "quenchline-test-"));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

/** Names in a folder, hidden ones included, in order. */
export const listFolder = (folder: string): string[] => readdirSync(folder).sort();

/** Compares files byte by byte; comparing them as lists takes seconds. */
export const expectSame = (bytes: Buffer, wanted: Buffer): void => expect(bytes.equals(wanted)).toBe(true);

export const sha256 = (bytes: Uint8Array): string => createHash("sha256").update(bytes).digest("hex");

/** A small part for the machine Tern, with `;LAYER:n` markers: a square of 20 mm, or as many sides as are wanted. */
export function smallPart({ layers = 12, sides = 4, lamp = "M106 P2 S0" } = {}): string {
  const lines = ["M140 S140", "M104 S390", "G28", "M190 S140", "M109 S390", "G21", "G90", "M83", lamp];
  for (let layer = 0; layer < layers; layer++) {
    lines.push(
      `;LAYER:${layer}`,
      `G0 Z${(0.2 * (layer + 1)).toFixed(2)} F600`,
      "G0 X110 Y100 F9000",
      `M106 S${80 + layer}`,
    );
    for (let side = 1; side <= sides; side++) {
      const angle = (2 * Math.PI * side) / sides;
      const point = `X${(100 + 10 * Math.cos(angle)).toFixed(3)} Y${(100 + 10 * Math.sin(angle)).toFixed(3)}`;
      lines.push(`G1 ${point} E${(2.4 / sides).toFixed(5)} F1200`);
    }
    lines.push("G0 X90 Y90 F9000");
  }
  lines.push("M107", "M104 S0", "M140 S0");
  return `${lines.join("\n")}\n`;
}

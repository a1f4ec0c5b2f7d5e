import { createHash } from "node:crypto";
import { readFileSync } from "node:fs";
import { expect, test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parsePolymer } from "#shared/formats/polymer.ts";
import { holds, parseProfile } from "#shared/formats/profile.ts";
import { ToolpathReader } from "#shared/layers/read-toolpath.ts";
import type { Layer } from "#shared/layers/reading.ts";
import { prepareTuning } from "#shared/rewrite/prepare-tuning.ts";
import { Rewriter } from "#shared/rewrite/rewriter.ts";

/**
 * The samples read and tuned, held against files in this folder: the layer table, and every line that came or went, with
 * the tuned file's digest. A wanted change is taken over with `npm test -- tests/golden -u`; look at the difference first.
 */
const TUNINGS: [sample: string, machine: string, profile: string][] = [
  ["mast-bracket", "tern", "mast-bracket-stiff-foot-and-tough-post"],
  ["mast-bracket", "tern", "mast-bracket-stiff-throughout"],
  ["valve-plate", "tern", "valve-plate-flat-and-stiff"],
  ["seal-ring", "tern", "seal-ring-stiff-base-and-tough-lip"],
  ["seal-ring", "tern", "seal-ring-held-stiff-and-tough"],
  ["sensor-cap", "fulmar", "sensor-cap-clear-dome"],
];

const sha256 = (data: string | Uint8Array): string => createHash("sha256").update(data).digest("hex");
const document = (path: string): unknown => JSON.parse(readFileSync(`samples/${path}.json`, "utf8"));

function read(bytes: Uint8Array, machineName: string) {
  const machine = parseMachine(document(`machines/${machineName}`));
  const reader = new ToolpathReader(machine);
  reader.push(bytes);
  return { machine, reading: reader.end(sha256(bytes)) };
}

const HEAD =
  "layer,object,z_mm,height_mm,first_line,last_line,time_s,extruding_s,deposited_mm,travel_mm,filament_mm,area_mm2,outline_mm,outline_from";

const row = (layer: Layer): string =>
  [
    layer.index,
    layer.object,
    layer.zMm.toFixed(3),
    layer.heightMm.toFixed(3),
    layer.firstLine,
    layer.lastLine,
    layer.timeS.toFixed(4),
    layer.extrudingTimeS.toFixed(4),
    layer.depositedLengthMm.toFixed(2),
    layer.travelLengthMm.toFixed(2),
    layer.filamentMm.toFixed(3),
    layer.areaMm2.toFixed(1),
    layer.outlineMm.toFixed(1),
    layer.outlineFrom,
  ].join(",");

/** Every line that came (+) or went (-), with its number in the file it stands in. */
function changes(original: string, tuned: string): string {
  const before = original.split("\n");
  const after = tuned.split("\n");
  const out: string[] = [];
  let k = 0;
  for (const [n, line] of after.entries()) {
    const own = line.includes(";ql") || line.startsWith(";quenchline ");
    if (own) out.push(`+${n + 1} ${line.startsWith(";quenchline") ? ";quenchline {…}" : line.trimEnd()}`);
    else {
      while (k < before.length && bare(before[k]) !== bare(line)) out.push(`-${k + 1} ${before[k++].trimEnd()}`);
      k++;
    }
  }
  for (; k < before.length; k++) out.push(`-${k + 1} ${before[k].trimEnd()}`);
  return `${out.join("\n")}\n`;
}

/** A line without the number and checksum that renumbering changes. */
const bare = (line: string): string => line.replace(/^N\d+ /, "").replace(/\*\d+(\s*)$/, "$1");

test.each([...new Map(TUNINGS.map(([sample, machine]) => [sample, machine]))])(
  "the layers of %s are as they were",
  async (sample, machine) => {
    const { reading } = read(readFileSync(`samples/${sample}.gcode`), machine);
    const totals = `# print time ${reading.totals.printTimeS.toFixed(3)} s, ${reading.totals.layers} layers, ${reading.file.lines} lines`;
    await expect(`${[totals, HEAD, ...reading.layers.map(row)].join("\n")}\n`).toMatchFileSnapshot(
      `./${sample}.layers.csv`,
    );
  },
);

test.each(TUNINGS)("%s on %s with %s is tuned to the same bytes", async (sample, machineName, profileName) => {
  const bytes = readFileSync(`samples/${sample}.gcode`);
  const { machine, reading } = read(bytes, machineName);
  const profile = parseProfile(document(`profiles/${profileName}`));
  const { edits } = prepareTuning({
    reading,
    machine,
    profile,
    ...(holds(profile) ? { polymer: parsePolymer(document(`polymers/${profile.polymer.toLowerCase()}`)) } : {}),
    digest: sha256,
    engine: "golden",
    status: "trial-only",
  });
  const pieces: Uint8Array[] = [];
  const rewriter = new Rewriter(edits, reading.file, (piece) => pieces.push(piece.slice()));
  rewriter.push(bytes);
  rewriter.end();
  const tuned = Buffer.concat(pieces);
  const text = `# tuned file ${tuned.length} bytes, SHA-256 ${sha256(tuned)}\n${changes(bytes.toString("latin1"), tuned.toString("latin1"))}`;
  await expect(text).toMatchFileSnapshot(`./${profileName}.changes.txt`);
});

import { test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { bytesOf, failures, proveFiles, readBytes } from "./proving.ts";
import { tuneBytes } from "./real-tuning.ts";
import { numberedFrom } from "./small-part.ts";

let seed = Number(process.env.SEED ?? 1);
const rnd = () => {
  seed = (seed * 1664525 + 1013904223) >>> 0;
  return seed / 2 ** 32;
};
const pick = <T>(...a: T[]): T => a[Math.floor(rnd() * a.length)];
const r3 = (a: number, b: number) => Math.round((a + rnd() * (b - a)) * 1000) / 1000;
function part(): string {
  const named = false;
  const L = 2 + Math.floor(rnd() * 12);
  const lines = ["G21", "G90", "M83", "G28", ...(rnd() < 0.5 ? [`M106 S${Math.floor(rnd() * 256)}`] : [])];
  if (rnd() < 0.3) lines.push("M106 P2 S0");
  const markers = rnd() < 0.8;
  const f = pick(300, 1500, 6000);
  for (let l = 1; l <= L; l++) {
    if (markers) lines.push(`;LAYER:${l - 1}`);
    if (rnd() < 0.2) lines.push(`M106 S${Math.floor(rnd() * 256)}`);
    lines.push(`G0 X10 Y10 Z${(l * 0.2).toFixed(1)} F6000`);
    const n = pick(1, 2, 5, 20);
    for (let i = 0; i < n; i++) {
      lines.push(`G1 X${(rnd() * 100).toFixed(2)} Y${(rnd() * 100).toFixed(2)} E1 F${f}`);
      if (rnd() < 0.3) lines.push(`G0 X${(rnd() * 100).toFixed(2)} Y${(rnd() * 100).toFixed(2)}`);
      if (rnd() < 0.1) lines.push(rnd() < 0.5 ? `M106 S${Math.floor(rnd() * 256)}` : "M107");
      if (rnd() < 0.03) lines.push(`M106 P2 S${Math.floor(rnd() * 256)}`);
      if (rnd() < 0.04) lines.push(...(process.env.NOPAUSE ? [] : [pick("M601", "M600"), "T0"]));
      if (rnd() < 0.02 && process.env.ADJ) lines.push("M601", "M600", "M601");
      if (rnd() < 0.05) lines.push("; comment", "", "T0");
    }
  }
  if (rnd() < 0.7) lines.push("M107", "M104 S0");
  const numbered = rnd() < 0.3;
  const nl = pick("\n", "\n", "\r\n", "\r");
  return (numbered ? numberedFrom(lines, pick(1, 100)) : lines).join(nl) + (rnd() < 0.7 ? nl : "");
}
function docs() {
  const min = pick(0, 0.1, 0.123),
    max = process.env.GRID ? pick(1, 0.8, 0.6) : pick(1, 0.9, 0.7, 0.85);
  const machine = parseMachine({
    format: "quenchline.machine/1",
    name: "M",
    motion: {
      maxSpeedMmS: 200,
      accelMmS2: { print: 1500, travel: 1500, retract: 1500 },
      cornering: { rule: "square-corner-velocity", speedMmS: 5 },
    },
    channels: [
      {
        id: "part-fan",
        kind: "fan",
        drive: { by: "fan-index", index: 0, fullScale: pick(255, 1) },
        minDuty: min,
        maxDuty: max,
        startBoostS: pick(0, 0, 0.2),
        settleS: pick(0, 3),
        ...(rnd() < Number(process.env.FANRATE ?? 0.1) ? { maxDutyPerS: 0.2 } : {}),
      },
      {
        id: "lamp",
        kind: "heater",
        drive: pick<object>(
          { by: "fan-index", index: 2, fullScale: 255 },
          { by: "pin", pin: 4, fullScale: 255 },
          { by: "named-pin", name: "lamp", fullScale: pick(1, 255) },
        ),
        maxDuty: process.env.GRID ? pick(1, 0.8) : pick(1, 0.85, 0.7),
        idleDuty: process.env.GRID ? pick(0, 0, 0.2) : pick(0, 0, 0.1),
        minDuty: pick(0, 0, 0.1),
        settleS: pick(0, 2, 20),
        ...(rnd() < 0.6 ? { maxDutyPerS: pick(0.05, 0.02, 0.2, 0.003) } : {}),
        acts: pick<any>("queued", { immediate: 1 }),
      },
    ],
    pauses: [
      { command: "M601", blocking: true },
      { command: "M600", blocking: process.env.NB ? rnd() < 0.5 : true },
    ],
  });
  const curve = (channel: string) => ({
    channel,
    rule: "curve",
    over: pick("height", "layer-time"),
    points: [
      [0.2, r3(0, 1)],
      [1, r3(0, 1)],
      [3, r3(0, 1)],
    ],
  });
  const profile = parseProfile({
    format: "quenchline.profile/1",
    name: "P",
    polymer: "PEEK",
    bedLayers: { count: pick(0, 1, 2), duty: { "part-fan": 0, lamp: r3(0, 1) } },
    zones: [
      { name: "a", from: 0, to: 1, unit: "mm", target: "none", cooling: curve("part-fan"), heating: curve("lamp") },
      {
        name: "b",
        from: 1,
        unit: "mm",
        target: "none",
        rampMm: pick(0, 0.6),
        cooling: curve("part-fan"),
        heating: curve("lamp"),
      },
    ],
    limits: {
      "part-fan": {
        ...(rnd() < 0.4 ? { maxDutyPerLayer: 0.15 } : {}),
        ...(rnd() < 0.2 ? { maxDuty: process.env.GRID ? 0.4 : 0.65 } : {}),
      },
      lamp: {
        ...(rnd() < 0.4 ? { maxDutyPerLayer: 0.1 } : {}),
        ...(rnd() < 0.3 ? { endRampMm: 1 } : {}),
        ...(rnd() < 0.2 ? { maxDuty: 0.6 } : {}),
      },
    },
    lead: { "part-fan": pick<any>(0, 0, 1, "settle"), lamp: pick<any>(0, "settle", 5, 0.3, 30) },
    withinLayer: pick("replace", "keep-raises"),
  });
  return { machine, profile };
}
(globalThis as any).DBG = process.env.DUMP;
test("fuzz", async () => {
  const N = Number(process.env.N ?? 300);
  let ok = 0;
  const refused: Record<string, number> = {};
  const by: Record<string, [number, string]> = {};
  for (let i = 0; i < N; i++) {
    const start = seed;
    const o = part();
    const { machine, profile } = docs();
    let tuned: Buffer;
    try {
      tuned = tuneBytes(bytesOf(o), machine, profile);
    } catch (e) {
      const c = (e as any).code ?? String(e);
      refused[c] = (refused[c] ?? 0) + 1;
      continue;
    }
    const p = await proveFiles({ original: bytesOf(o), tuned, machine, profile });
    if (process.env.DUMP) {
      const reading = readBytes(bytesOf(o), machine);
      console.log(JSON.stringify(machine.channels), JSON.stringify(machine.pauses));
      console.log(JSON.stringify(profile));
      console.log(
        reading.layers
          .map((l) => [l.index, l.writeAt.line, l.writeAt.timeS.toFixed(3), l.startsAtS.toFixed(3)].join(" "))
          .join("\n"),
      );
      console.log(
        Array.from(reading.travels.line)
          .map((l, k) => `${l}@${reading.travels.timeS[k].toFixed(3)}`)
          .join(" "),
      );
      console.log(
        o
          .split(/\r\n|\r|\n/)
          .map((l, k) => `${k + 1} ${l}`)
          .filter((l) => /M106|M107|M0|M600|SET|M42|LAYER/.test(l))
          .join("\n"),
      );
      console.log(
        tuned
          .toString()
          .split(/\r\n|\r|\n/)
          .map((l, k) => `${k + 1} ${l}`)
          .filter((l) => process.env.DUMP === "2" || /;ql|M106|LAYER|M0|M600|G0|M42/.test(l))
          .map((l) => l.slice(0, 100))
          .join("\n"),
      );
      console.log(failures(p));
    }
    if (p.passed) ok++;
    else
      for (const f of failures(p)) {
        const id = f.split(":")[0];
        const key = id;
        by[key] = [(by[key]?.[0] ?? 0) + 1, by[key]?.[1] ?? `${start} ${f}`];
      }
    let again: Buffer;
    try {
      again = tuneBytes(tuned, machine, profile);
    } catch (e) {
      const c = "again " + ((e as any).code ?? String(e));
      refused[c] = (refused[c] ?? 0) + 1;
      continue;
    }
    if (!again.equals(tuned) && process.env.DUMP) {
      const a = tuned.toString().split(/\r\n|\r|\n/),
        b = again.toString().split(/\r\n|\r|\n/);
      const k = a.findIndex((l, i) => l !== b[i]);
      console.log("T1", k, a.slice(k - 3, k + 5), "T2", b.slice(k - 3, k + 5));
    }
    if (!again.equals(tuned))
      by["retune differs"] = [(by["retune differs"]?.[0] ?? 0) + 1, by["retune differs"]?.[1] ?? String(start)];
    const p2 = await proveFiles({ original: tuned, tuned: again, machine, profile });
    if (p.passed && !p2.passed)
      for (const f of failures(p2)) {
        const id = "again " + f.split(":")[0];
        by[id] = [(by[id]?.[0] ?? 0) + 1, by[id]?.[1] ?? `${start} ${f}`];
      }
  }
  console.log(JSON.stringify({ ok, refused, by }, null, 1));
}, 600000);

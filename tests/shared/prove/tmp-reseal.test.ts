import { readFileSync } from "node:fs";
import { test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { linesOf, sealed } from "./plain-tuning.ts";
import { bytesOf, failures, proveFiles, readBytes } from "./proving.ts";
import { tuneBytes } from "./real-tuning.ts";

const ROOT = new URL("../../../", import.meta.url);
const json = (p: string) => JSON.parse(readFileSync(new URL(p, ROOT), "utf8"));
test("x", async () => {
  for (const [f, m, p, n] of [
    ["seal-ring", "tern", "seal-ring-stiff-base-and-tough-lip", 40],
    ["sensor-cap", "fulmar", "sensor-cap-clear-dome", 60],
    ["valve-plate", "tern", "valve-plate-flat-and-stiff", 20],
    ["mast-bracket", "tern", "seal-ring-stiff-base-and-tough-lip", 40],
  ] as const) {
    const machine = parseMachine(json(`samples/machines/${m}.json`));
    const profile = parseProfile(json(`samples/profiles/${p}.json`));
    const original = readFileSync(new URL(`samples/${f}.gcode`, ROOT));
    const tuned = tuneBytes(original, machine, profile);
    const reading = readBytes(original, machine);
    console.log(
      linesOf(tuned.toString("latin1"))
        .map((l, k) => [k + 1, l.trim()])
        .filter(([k, l]) => /P2.*;ql/.test(l as string))
        .slice(0, 60)
        .map((x) => x.join(" "))
        .join("\n"),
    );
    console.log(f, failures(await proveFiles({ original, tuned, machine, profile, reading })), reading.travels.count);
    if (reading.file.numbered) continue;
    const lines = linesOf(tuned.toString("latin1"));
    const own = lines.map((l, k) => (/;ql[+=]?[\r\n]*$/.test(l) ? k : -1)).filter((k) => k >= 0);
    let tried = 0;
    const missed: string[] = [];
    const by: Record<string, number> = {};
    const attempt = async (name: string, changed: string[]) => {
      const t = bytesOf(sealed(changed, reading, machine, profile).join(""));
      if (t.equals(tuned)) return;
      tried++;
      const proof = await proveFiles({ original, tuned: t, machine, profile, reading });
      if (proof.passed) missed.push(name);
      for (const c of proof.checks) if (!c.passed) by[c.id] = (by[c.id] ?? 0) + 1;
    };
    const step = Math.max(1, Math.floor(own.length / n));
    for (let i = 0; i < own.length; i += step) {
      const k = own[i];
      const line = lines[k];
      await attempt(
        `drop ${k + 1} ${line.trim()}`,
        lines.filter((_, j) => j !== k),
      );
      for (const d of m === "fulmar" ? ["0.333", "0.2"] : ["60", "100"])
        await attempt(
          `set ${k + 1} ${line.trim()} ${d}`,
          lines.map((l, j) => (j === k ? l.replace(/(?<=[S=])[\d.]+(?=[ *])/, d) : l)),
        );
      for (const by of [-200, -30, -1, 1, 30, 200]) {
        const rest = lines.filter((_, j) => j !== k);
        const at = Math.min(Math.max(k + by, 0), rest.length);
        await attempt(`move ${k + 1} ${line.trim()} by ${by}`, [...rest.slice(0, at), line, ...rest.slice(at)]);
      }
    }
    console.log(f, tried, "missed", missed.length, missed.slice(0, 30), by);
  }
}, 600000);

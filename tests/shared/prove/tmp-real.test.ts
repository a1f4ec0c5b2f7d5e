import { existsSync, readdirSync, readFileSync } from "node:fs";
import { test } from "vitest";
import { parseMachine } from "#shared/formats/machine.ts";
import { parseProfile } from "#shared/formats/profile.ts";
import { proveFiles } from "./proving.ts";
import { tuneBytes } from "./real-tuning.ts";

const ROOT = new URL("../../../", import.meta.url);
const json = (p: string) => JSON.parse(readFileSync(new URL(p, ROOT), "utf8"));
test("real", async () => {
  const machines = ["tern", "fulmar"].map((m) => parseMachine(json(`samples/machines/${m}.json`)));
  const files = readdirSync(new URL("samples/", ROOT))
    .filter((f) => f.endsWith(".gcode"))
    .map((f) => `samples/${f}`);
  for (const f of readdirSync(new URL("../shared/corpus/toolpaths/", ROOT)))
    files.push(`../shared/corpus/toolpaths/${f}`);
  const profiles = readdirSync(new URL("samples/profiles/", ROOT));
  for (const f of files)
    for (const m of machines)
      for (const p of profiles) {
        const original = readFileSync(new URL(f, ROOT));
        let profile;
        let tuned;
        try {
          profile = parseProfile(json(`samples/profiles/${p}`));
          tuned = tuneBytes(original, m, profile);
        } catch (e) {
          console.log("SKIP", f, m.name, p, (e as Error).message.slice(0, 140));
          continue;
        }
        const proof = await proveFiles({ original, tuned, machine: m, profile });
        console.log(
          proof.passed ? "ok  " : "FAIL",
          f,
          m.name,
          p,
          proof.kept.lines,
          proof.removed.lines,
          proof.inserted.lines,
          proof.renumbered.lines,
        );
        for (const c of proof.checks) if (!c.passed) console.log("    ", c.id, c.detail);
        const again = tuneBytes(tuned, m, profile);
        if (!again.equals(tuned)) console.log("    RETUNE DIFFERS");
        const proof2 = await proveFiles({ original: tuned, tuned: again, machine: m, profile });
        if (!proof2.passed) for (const c of proof2.checks) if (!c.passed) console.log("     (again)", c.id, c.detail);
        if (f.includes("seal-ring") && p.includes("seal-ring"))
          for (const c of proof.checks) console.log("    ", c.id, c.detail);
      }
}, 600000);

import { test } from "vitest";
import { bytesOf, failures, proveFiles } from "./proving.ts";
import { plainTuning } from "./plain-tuning.ts";
import { smallMachine, smallPart, smallProfile } from "./small-part.ts";
test("x", async () => {
  for (const d of [{}, { newline: "\r\n" }, { newline: "\r" }, { numbered: true }, { finalNewline: false }, { finalNewline: false, bareEnd: true }, { byteOrderMark: true }, { pause: "M0" }, { pause: "M600" }, {named: true}, {named:true, numbered:true}] as any[]) for (const w of ["replace", "keep-raises"]) for (const chunk of [1, 1 << 16]) {
    const machine = smallMachine(d);
    const profile = smallProfile({ withinLayer: w });
    const o = smallPart(d); const t = plainTuning(o, machine, profile);
    const proof = await proveFiles({ original: bytesOf(o), tuned: bytesOf(t), machine, profile, chunk });
    console.log(JSON.stringify(d), w, chunk, proof.passed, proof.kept.lines, proof.renumbered.lines, proof.inserted.lines, failures(proof));
    if (w === "keep-raises" && chunk > 1 && !d.newline && d.numbered) console.log(t);
  }
});

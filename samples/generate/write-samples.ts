import { writeFileSync } from "node:fs";
import { SAMPLES } from "#samples/generate/samples.ts";

/** `npx tsx samples/generate/write-samples.ts` writes the toolpaths anew; unchanged generator, unchanged bytes. */
for (const [name, generate] of Object.entries(SAMPLES)) {
  const text = generate();
  writeFileSync(new URL(`../${name}`, import.meta.url), text, "latin1");
  process.stdout.write(`${name}  ${text.length} bytes\n`);
}

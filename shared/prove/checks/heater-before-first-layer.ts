import type { Check } from "#shared/formats/proof.ts";
import { verdict } from "#shared/prove/checks/verdict.ts";
import type { Evidence } from "#shared/prove/evidence.ts";
import { dutyWords } from "#shared/prove/wording.ts";

/** No line of ours switches a heater on before the first layer; what the file itself does there is said. */
export function checkHeaterBeforeFirstLayer(evidence: Evidence): Check {
  const { reading, events } = evidence;
  const heaters = evidence.channels("heater");
  const said: string[] = [];
  for (const { channel, index } of heaters) {
    const before = events[index].filter(({ entry }) => entry.to < reading.window.start.offset);
    const own = before.find(({ entry }) => entry.what === "own");
    if (own)
      return verdict(
        "heater-before-first-layer",
        `${channel.id} is set at ${evidence.place(own.entry)}, before the first layer.`,
        "",
      );
    const on = before.find(({ duty }) => !(duty === 0));
    if (on) said.push(` The file itself sets ${channel.id} to ${dutyWords(on.duty)} at line ${on.entry.tunedLine}.`);
  }
  const found = heaters.length === 0 ? "No heater is driven." : "No line of ours sets a heater before the first layer.";
  return verdict("heater-before-first-layer", undefined, found + said.join(""));
}

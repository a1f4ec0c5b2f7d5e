import type { Channel } from "#shared/formats/machine.ts";
import type { OutputUse } from "#shared/layers/reading.ts";

/**
 * What to check where a heater is a numbered fan output, and the file belongs to a firmware family that by itself ignores
 * that number but uses it all the same (REFERENCE G13); undefined where there is nothing to check.
 */
export function sharedOutputText({ namedCommand, indexedFanLine }: OutputUse, heater: Channel): string | undefined {
  const { id, drive } = heater;
  if (drive.by !== "fan-index" || drive.index === 0 || !namedCommand || indexedFanLine === undefined) return undefined;
  return `Line ${namedCommand.line} (${namedCommand.name}) belongs to a firmware family that by itself ignores the P of M106, but line ${indexedFanLine} uses P, so a macro must handle it. Check on the machine, lamp unplugged, that M106 P${drive.index} drives ${id} and nothing else.`;
}

import type { Channel, Drive } from "#shared/formats/machine.ts";
import { choiceText } from "#src/lib/document-words.ts";

/** The command that sets an output, as it stands in the tuned file, and what stands for full power in it. */
export function driveText(drive: Drive): { command: string; fullPower: string } {
  switch (drive.by) {
    case "fan-index":
      return { command: `M106 P${drive.index}`, fullPower: `S${drive.fullScale}` };
    case "pin":
      return { command: `M42 P${drive.pin}`, fullPower: `S${drive.fullScale}` };
    case "named-fan":
      return { command: `SET_FAN_SPEED FAN=${drive.name}`, fullPower: "SPEED=1" };
    case "named-pin":
      return { command: `SET_PIN PIN=${drive.name}`, fullPower: `VALUE=${drive.fullScale}` };
  }
}

export function actsText(acts: Channel["acts"]): string {
  return acts === "queued" ? choiceText("queued") : `when the line is read, up to ${acts.immediate} s ahead`;
}

import type { Channel, Machine } from "#shared/formats/machine.ts";
import { LineKind, LineScan, scanLine } from "#shared/gcode/scan-line.ts";
import { channelsByOutput, namedOutput, numberedOutput, parseNamed } from "#shared/machine/output-command.ts";

/** Tells which of the machine's channels a line commands, with the engine's own eyes. */
export function lineChannels(machine: Machine): (line: string) => Channel | undefined {
  const byOutput = channelsByOutput(machine);
  const encoder = new TextEncoder();
  const scan = new LineScan();
  return (line) => {
    scanLine(encoder.encode(`${line}\n`), 0, scan);
    const command =
      scan.kind === LineKind.named
        ? namedCommand(line)
        : scan.kind === LineKind.words && scan.mCount > 0
          ? numberedOutput(scan, scan.mWords[0])
          : undefined;
    const index = command && byOutput.get(command.output);
    return index === undefined ? undefined : machine.channels[index];
  };
}

function namedCommand(line: string) {
  const { name, parameters } = parseNamed(line.replace(/^\s*N\d+\s*/i, "").trim());
  return namedOutput(name, parameters);
}

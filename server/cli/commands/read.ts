import { parseArguments, required } from "#server/cli/arguments.ts";
import { loadMachine } from "#server/cli/documents.ts";
import { EXIT, type ExitStatus } from "#server/cli/exit.ts";
import { ToolpathInput } from "#server/cli/input-stream.ts";
import { layerTable } from "#server/cli/layer-table.ts";
import { readInput } from "#server/cli/read-input.ts";
import { print, printable } from "#server/cli/terminal.ts";
import { writeReading } from "#shared/formats/reading.ts";
import { readingDocument } from "#shared/layers/reading-document.ts";

/** `read`: measures a toolpath and lists its layers. */
export async function read(argv: string[]): Promise<ExitStatus> {
  const { files, values } = parseArguments("read", argv, ["FILE"]);
  const machine = await loadMachine(required(values.machine, "machine", "read"));
  const input = await ToolpathInput.open(files[0], "once");
  try {
    const reading = await readInput(input, machine);
    await print(
      values.json ? writeReading(readingDocument(reading)) : printable(layerTable(input.name, reading, machine)),
    );
    return EXIT.done;
  } finally {
    await input.close();
  }
}

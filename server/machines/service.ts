import { machineGist } from "#server/documents/gists.ts";
import { Documents } from "#server/documents/service.ts";
import { contentOf } from "#shared/formats/document.ts";
import { type Machine, parseMachine, writeMachine } from "#shared/formats/machine.ts";

export const machines = new Documents<Machine>({
  kind: "machine",
  nameOf: ({ name }) => name,
  parse: parseMachine,
  write: (machine) => writeMachine(contentOf(machine)),
  gist: (machine) => ({ machine: machineGist(machine) }),
});

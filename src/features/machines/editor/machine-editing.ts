import type { Machine } from "#shared/formats/machine.ts";
import type { DocumentProblems } from "#src/lib/document-problems.ts";

/** What the parts of the machine editor share. */
export interface MachineEditing {
  machine: Machine;
  problems: DocumentProblems;
  /** changes of one gesture are undone together */
  edit(machine: Machine, gesture?: string): void;
  rest(): void;
}

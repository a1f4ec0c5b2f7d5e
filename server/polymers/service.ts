import { polymerGist } from "#server/documents/gists.ts";
import { Documents } from "#server/documents/service.ts";
import { type Polymer, parsePolymer, writePolymer } from "#shared/formats/polymer.ts";

/** Grades of a polymer are cards of their own; profiles name a card like this. */
export const polymers = new Documents<Polymer>({
  kind: "polymer",
  nameOf: ({ name, variant }) => (variant === "" ? name : `${name} ${variant}`),
  parse: parsePolymer,
  write: writePolymer,
  gist: (polymer) => ({ polymer: polymerGist(polymer) }),
});

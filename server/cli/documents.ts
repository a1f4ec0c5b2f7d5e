import { createHash } from "node:crypto";
import { open } from "node:fs/promises";
import { callerPath } from "#server/cli/caller-path.ts";
import { aboutFile } from "#server/cli/exit.ts";
import { unreadable } from "#server/cli/unreadable.ts";
import { type Machine, parseMachine } from "#shared/formats/machine.ts";
import { parseJson } from "#shared/formats/parse-json.ts";
import { type Polymer, parsePolymer } from "#shared/formats/polymer.ts";
import { type Profile, parseProfile } from "#shared/formats/profile.ts";
import { Refusal } from "#shared/refusal.ts";

/** The largest documents are some hundred kilobytes; what is larger is another kind of file. */
const MOST_BYTES = 16 * 2 ** 20;

/** @throws InputRefused naming the file, and what in it is wrong */
export function loadMachine(name: string): Promise<Machine> {
  return load(name, "machine", parseMachine);
}

/** @throws InputRefused naming the file, and what in it is wrong */
export function loadProfile(name: string): Promise<Profile> {
  return load(name, "profile", parseProfile);
}

/** @throws InputRefused naming the file, and what in it is wrong */
export function loadPolymer(name: string): Promise<Polymer> {
  return load(name, "polymer", parsePolymer);
}

/** Hex digest of a document's canonical text, which equal documents share however they were typed. */
export function documentDigest(text: string): string {
  return createHash("sha256").update(text).digest("hex");
}

function load<Document>(name: string, kind: string, parse: (json: unknown) => Document): Promise<Document> {
  return aboutFile(name, async () => {
    const json = parseJson(await readText(name, kind), `the ${kind} document`);
    refuseOtherKind(json, kind);
    return parse(json);
  });
}

/** Two documents given the wrong way round are one mistake, not a list of unknown fields. */
function refuseOtherKind(json: unknown, kind: string): void {
  const format = typeof json === "object" && json !== null && "format" in json ? json.format : undefined;
  const [, other] = (typeof format === "string" && /^quenchline\.([a-z]+)\/\d+$/.exec(format)) || [];
  if (other === undefined || other === kind) return;
  throw new Refusal(
    `bad-${kind}`,
    `this is a ${other} document (${format}), but a ${kind} document is needed`,
    `Give the ${kind} document with --${kind}.`,
    { path: "format" },
  );
}

async function readText(name: string, kind: string): Promise<string> {
  const bytes = await readBytes(name, kind).catch((error: unknown) => {
    throw unreadable(error, `the ${kind} document`);
  });
  try {
    return new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    throw new Refusal("bad-json", `the ${kind} document is not UTF-8 text`, "Save it as UTF-8.");
  }
}

async function readBytes(name: string, kind: string): Promise<Uint8Array> {
  const handle = await open(callerPath(name));
  try {
    if ((await handle.stat()).size <= MOST_BYTES) return await handle.readFile();
  } finally {
    await handle.close();
  }
  throw new Refusal(
    "document-too-large",
    `the file given as the ${kind} document is larger than ${MOST_BYTES / 2 ** 20} MiB`,
    `Check that it is the ${kind} document and not a toolpath.`,
  );
}

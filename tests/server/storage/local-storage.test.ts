import { createHash } from "node:crypto";
import { mkdtemp, readdir, readFile, rm, writeFile } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterEach, beforeEach, expect, test } from "vitest";
import { LocalStorage } from "#server/storage/local-storage.ts";
import { readRows, tableBytes } from "#server/storage/number-table.ts";
import { Shelf } from "#server/storage/shelf.ts";
import { BytesMissing } from "#server/storage/storage.ts";

let root: string;
let storage: LocalStorage;

beforeEach(async () => {
  root = await mkdtemp(join(tmpdir(), "quenchline-storage-"));
  storage = await LocalStorage.open(root);
});
afterEach(() => rm(root, { recursive: true, force: true }));

async function* stream(...pieces: (string | Error)[]): AsyncGenerator<Uint8Array> {
  for (const piece of pieces) {
    if (piece instanceof Error) throw piece;
    yield Buffer.from(piece);
  }
}
const sha256 = (text: string): string => createHash("sha256").update(text).digest("hex");
const files = async (): Promise<string[]> =>
  (await readdir(root, { recursive: true, withFileTypes: true }))
    .filter((file) => file.isFile())
    .map(({ name }) => name);

async function textOf(hash: string, range?: { start: number; end: number }): Promise<string> {
  let text = "";
  for await (const piece of await storage.open(hash, range)) text += piece;
  return text;
}

test("bytes are found under their own digest, whole and in part, once they are kept", async () => {
  const staged = await storage.stage(stream("lay", "er by ", "layer"), "test");
  expect(staged).toMatchObject({ sha256: sha256("layer by layer"), bytes: 14 });
  expect(await storage.has(staged.sha256)).toBe(false);
  await storage.keep(staged);
  expect(await textOf(staged.sha256)).toBe("layer by layer");
  expect(await textOf(staged.sha256, { start: 6, end: 7 })).toBe("by");
  expect(await storage.size(staged.sha256)).toBe(14);
  expect(await files()).toEqual([staged.sha256]);
});

test("a stream that breaks off leaves nothing, and its error comes through", async () => {
  await expect(storage.stage(stream("half", new Error("gone")), "test")).rejects.toThrow("gone");
  expect(await files()).toEqual([]);
});

test("the same bytes kept twice stand there once", async () => {
  for (let k = 0; k < 2; k++) await storage.keep(await storage.stage(stream("same"), "test"));
  expect(await files()).toEqual([sha256("same")]);
});

test("a large stream in small pieces arrives unchanged", async () => {
  const pieces = Array.from({ length: 5_000 }, (_, k) => `G1 X${k} `.repeat(30));
  const staged = await storage.stage(stream(...pieces), "test");
  await storage.keep(staged);
  expect(staged.sha256).toBe(sha256(pieces.join("")));
  expect(await readFile(join(root, staged.sha256.slice(0, 2), staged.sha256), "utf8")).toBe(pieces.join(""));
});

test("what an earlier run left half done is gone after the next start, and only that", async () => {
  const kept = await storage.stage(stream("kept"), "test");
  await storage.keep(kept);
  await writeFile(join(root, "incoming", "old.part"), "half");
  storage = await LocalStorage.open(root);
  expect(await files()).toEqual([kept.sha256]);
});

test("what one owner has staged is discarded without touching another's", async () => {
  await storage.stage(stream("a"), "job-1");
  const other = await storage.stage(stream("b"), "job-10");
  await storage.discardOf("job-1");
  expect(await files()).toEqual([other.name]);
});

test("asking for what isn't there says so, and a name that is no digest reaches no file", async () => {
  await expect(storage.open(sha256("never"))).rejects.toThrow(BytesMissing);
  await expect(storage.size(sha256("never"))).rejects.toThrow(BytesMissing);
  await storage.remove(sha256("never"));
  await expect(storage.open("../../etc/passwd")).rejects.toThrow("no SHA-256");
});

test("any row of a stored table is read by itself; behind its end there is none", async () => {
  const rows = [
    [0, 1],
    [2 ** 40, 2],
    [Number.MAX_SAFE_INTEGER, 3],
  ];
  const staged = await storage.stage(
    (async function* () {
      yield* tableBytes(rows);
    })(),
    "test",
  );
  await storage.keep(staged);
  expect(await readRows(storage, staged.sha256, 2, 1, 2)).toEqual(rows.slice(1));
  expect(await readRows(storage, staged.sha256, 2, 2, 5)).toEqual(rows.slice(2));
  expect(await readRows(storage, staged.sha256, 2, 3, 1)).toEqual([]);
});

test("bytes whose rows can't be written go again, unless a row refers to them", async () => {
  const used = new Set<string>();
  const shelf = new Shelf(storage, async () => used);
  const fails = async () => {
    throw new Error("no row");
  };
  await expect(shelf.keep([await storage.stage(stream("x"), "test")], fails)).rejects.toThrow("no row");
  expect(await files()).toEqual([]);
  used.add(sha256("y"));
  await expect(shelf.keep([await storage.stage(stream("y"), "test")], fails)).rejects.toThrow("no row");
  expect(await files()).toEqual([sha256("y")]);
});

test("a sweep removes what no row refers to; releasing spares what another row still needs", async () => {
  const used = new Set([sha256("used")]);
  const shelf = new Shelf(storage, async () => used);
  for (const text of ["used", "orphan", "released"]) await storage.keep(await storage.stage(stream(text), "test"));
  await shelf.release([sha256("released"), sha256("used")]);
  expect((await files()).sort()).toEqual([sha256("used"), sha256("orphan")].sort());
  await shelf.sweep();
  expect(await files()).toEqual([sha256("used")]);
});

import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { ROOT } from "#server/root.ts";

interface Import {
  file: string;
  from: string;
  typeOnly: boolean;
}

function importsBelow(folder: string): Import[] {
  return readdirSync(join(ROOT, folder), { withFileTypes: true }).flatMap((entry) => {
    const file = `${folder}/${entry.name}`;
    if (entry.isDirectory()) return importsBelow(file);
    if (!/\.tsx?$/.test(entry.name)) return [];
    const text = readFileSync(join(ROOT, file), "utf8");
    return [...text.matchAll(/^(?:import|export)\s+(type\s)?[^;]*?\bfrom\s+"([^"]+)"/gm)].map(([, type, from]) => ({
      file,
      from,
      typeOnly: type !== undefined,
    }));
  });
}

const server = importsBelow("server");
const breaking = (imports: Import[], into: RegExp, allowed: RegExp): string[] =>
  imports
    .filter(({ file, from }) => into.test(from) && !allowed.test(file))
    .map(({ file, from }) => `${file} imports ${from}`);

/** Types of rows and of requests may be named anywhere. */
const values = server.filter(({ typeOnly }) => !typeOnly);

test("only queries.ts and db/ speak SQL", () => {
  expect(values.some(({ from }) => from === "drizzle-orm")).toBe(true);
  expect(breaking(values, /^drizzle-orm|\/db\/schema\//, /\/queries\.ts$|^server\/db\//)).toEqual([]);
});

test("only routes, http/ and the app itself answer requests", () => {
  expect(breaking(values, /^express$/, /\/routes\.ts$|^server\/http\/|^server\/app\.ts$/)).toEqual([]);
});

test("server and client never import each other", () => {
  expect(breaking(server, /^#src\//, /^$/)).toEqual([]);
  expect(breaking(importsBelow("src"), /^#server\//, /^$/)).toEqual([]);
});

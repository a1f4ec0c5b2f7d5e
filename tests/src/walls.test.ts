import { readdirSync, readFileSync } from "node:fs";
import { join, relative } from "node:path";
import { expect, test } from "vitest";

const root = join(import.meta.dirname, "../..");

interface Import {
  file: string;
  from: string;
}

const imports: Import[] = readdirSync(join(root, "src"), { recursive: true, withFileTypes: true })
  .filter((entry) => entry.isFile() && /\.tsx?$/.test(entry.name))
  .flatMap((entry) => {
    const path = join(entry.parentPath, entry.name);
    const found = readFileSync(path, "utf8").matchAll(/\b(?:from|import)\s*\(?\s*"([^"]+)"/g);
    return [...found].map(([, from]) => ({ file: relative(root, path), from }));
  });

const show = ({ file, from }: Import): string => `${file} imports ${from}`;
const wrong = (test: (entry: Import) => boolean): string[] => imports.filter(test).map(show);
const featureOf = (path: string): string | undefined => /(?:^|#)src\/features\/([^/]+)/.exec(path)?.[1];

test("the client reaches the server through shared/contract only, and never imports tests or samples", () => {
  expect(imports.length).toBeGreaterThan(100);
  expect(wrong(({ from }) => /^#(server|tests|samples)\/|^node:|^drizzle|^express/.test(from))).toEqual([]);
});

test("a feature that needs another gets it from the route", () => {
  expect(
    wrong(
      ({ file, from }) =>
        featureOf(file) !== undefined && featureOf(from) !== undefined && featureOf(file) !== featureOf(from),
    ),
  ).toEqual([]);
});

test("ui and lib know nothing of features, features nothing of pages", () => {
  expect(
    wrong(({ file, from }) => /^src\/(ui|lib)\//.test(file) && /^#src\/(features|routes|app)\//.test(from)),
  ).toEqual([]);
  expect(wrong(({ file, from }) => file.startsWith("src/features/") && /^#src\/(routes|app)\//.test(from))).toEqual([]);
});

import { readdirSync, readFileSync, statSync } from "node:fs";
import { join, relative } from "node:path";
import { expect, test } from "vitest";

/** The pipeline of shared/: a folder imports only from itself and from those before it. */
const PIPELINE = [
  ["refusal"],
  ["units", "formats", "contract"],
  ["gcode"],
  ["machine"],
  ["motion"],
  ["layers"],
  ["polymers"],
  ["crystallinity"],
  ["thermal"],
  ["prediction"],
  ["plan"],
  ["rewrite"],
  ["prove"],
];
const root = join(import.meta.dirname, "..");

interface Import {
  file: string;
  from: string;
}

function importsBelow(folder: string): Import[] {
  const found: Import[] = [];
  for (const name of readdirSync(join(root, folder))) {
    const path = join(folder, name);
    if (statSync(join(root, path)).isDirectory()) found.push(...importsBelow(path));
    else if (/\.(ts|tsx|mjs)$/.test(name)) {
      const text = readFileSync(join(root, path), "utf8");
      for (const [, from] of text.matchAll(/\bfrom\s+"([^"]+)"|\bimport\(\s*"([^"]+)"\s*\)/g))
        if (from) found.push({ file: relative(".", path), from });
    }
  }
  return found;
}

const show = ({ file, from }: Import): string => `${file} imports ${from}`;
const stage = (path: string): number => {
  const name = path.replace(/^(#shared|shared)\//, "").split(/[/.]/)[0];
  return PIPELINE.findIndex((names) => names.includes(name));
};

test("shared/ imports only shared/ and zod", () => {
  const strangers = importsBelow("shared").filter(({ from }) => !from.startsWith("#shared/") && from !== "zod");
  expect(strangers.map(show)).toEqual([]);
});

test("in shared/ the order is the pipeline: a folder imports only from those before it", () => {
  const backward = importsBelow("shared").filter(
    ({ file, from }) => from.startsWith("#shared/") && stage(from) > stage(file),
  );
  expect(backward.map(show)).toEqual([]);
});

test("the proof shares no code with the rewriter, and the rewriter none with the proof", () => {
  const crossing = [...importsBelow("shared/prove"), ...importsBelow("shared/rewrite")].filter(
    ({ file, from }) =>
      (file.includes("prove") && from.includes("/rewrite/")) || (file.includes("rewrite") && from.includes("/prove/")),
  );
  expect(crossing.map(show)).toEqual([]);
});

test("every folder of shared/ has its place in the pipeline", () => {
  const folders = readdirSync(join(root, "shared")).filter((name) =>
    statSync(join(root, "shared", name)).isDirectory(),
  );
  expect(folders.filter((name) => stage(name) < 0)).toEqual([]);
});

test("the product never imports its tests or samples", () => {
  const wrong = [...importsBelow("shared"), ...importsBelow("server")].filter(({ from }) =>
    /^#(tests|samples)\//.test(from),
  );
  expect(wrong.map(show)).toEqual([]);
});

import { readFileSync } from "node:fs";

const read = (path: string): Record<string, unknown> =>
  JSON.parse(readFileSync(new URL(`../../samples/${path}`, import.meta.url), "utf8"));

/** Sample documents as parsed JSON, each with the fields given laid over it. */
export const sampleMachine = (changes: object = {}) => ({ ...read("machines/tern.json"), ...changes });
export const samplePolymer = (changes: object = {}) => ({ ...read("polymers/peek.json"), ...changes });
export const sampleProfile = (changes: object = {}) => ({
  ...read("profiles/seal-ring-stiff-base-and-tough-lip.json"),
  ...changes,
});

import type { ReadingDocument } from "#shared/formats/reading.ts";

export type Finding = ReadingDocument["findings"][number];

/** Kinds of findings that concern one thing, in the order of what they may do to a print. */
const GROUPS: { title: string; codes: readonly string[] }[] = [
  { title: "Fan and lamp", codes: ["no-channel", "output-shared", "controls-inside", "scale-mixed", "window-full"] },
  { title: "Macros", codes: ["macro"] },
  {
    title: "Layers and moves",
    codes: [
      "marker-count",
      "marker-height",
      "marker-late",
      "prime-line",
      "sequential",
      "spiral",
      "arc-invalid",
      "feed-not-positive",
      "number-too-large",
    ],
  },
  { title: "An earlier tuning", codes: ["provenance-broken", "provenance-twice"] },
];
const REST = "Lines of the file";

/** By what they concern; within a group warnings first, else in the order of the file. Groups without any are left out. */
export function findingGroups(findings: readonly Finding[]): { title: string; findings: Finding[] }[] {
  const groupOf = ({ code }: Finding): string => GROUPS.find(({ codes }) => codes.includes(code))?.title ?? REST;
  return [...GROUPS.map(({ title }) => title), REST]
    .map((title) => ({
      title,
      findings: findings
        .filter((finding) => groupOf(finding) === title)
        .sort((a, b) => Number(b.severity === "warning") - Number(a.severity === "warning")),
    }))
    .filter((group) => group.findings.length > 0);
}

import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, test, vi } from "vitest";
import type { Finding } from "#src/features/toolpaths/finding-groups.ts";
import { findingGroups } from "#src/features/toolpaths/finding-groups.ts";
import { Findings } from "#src/features/toolpaths/findings.tsx";

const FINDINGS: Finding[] = [
  { code: "macro", severity: "info", message: "START is a macro", line: 3 },
  { code: "spiral", severity: "info", message: "the part is wound", layer: 7 },
  { code: "controls-inside", severity: "info", message: "lines already set part-fan", line: 1969 },
  { code: "no-channel", severity: "warning", message: "10 lines set unknown outputs", line: 2000, layer: 2 },
  { code: "from-another-time", severity: "info", message: "something else" },
];

test("findings stand by what they concern, warnings first", () => {
  expect(findingGroups(FINDINGS).map(({ title, findings }) => [title, findings.map(({ code }) => code)])).toEqual([
    ["Fan and lamp", ["no-channel", "controls-inside"]],
    ["Macros", ["macro"]],
    ["Layers and moves", ["spiral"]],
    ["Lines of the file", ["from-another-time"]],
  ]);
});

test("a line of a layer opens it, one outside all layers is only named, and no code is shown", async () => {
  const [onPin, onLine] = [vi.fn(), vi.fn()];
  render(<Findings findings={FINDINGS} onPin={onPin} onLine={onLine} hasLine={(line) => line > 100} />);
  const person = userEvent.setup();
  await person.click(screen.getByRole("button", { name: "line 1\u202f969" }));
  expect(onLine).toHaveBeenCalledWith(1969);
  await person.click(screen.getByRole("button", { name: "layer 7" }));
  expect(onPin).toHaveBeenCalledWith(7);
  expect(screen.queryByRole("button", { name: "line 3" })).toBeNull();
  expect(document.body.textContent).not.toContain("controls-inside");
});

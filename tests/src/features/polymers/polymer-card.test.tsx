import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { expect, test } from "vitest";
import { Polymer } from "#shared/formats/polymer.ts";
import { PolymerCard } from "#src/features/polymers/polymer-card.tsx";
import { PolymerEditor } from "#src/features/polymers/polymer-editor.tsx";
import { crystallising } from "#src/features/polymers/polymer-edits.ts";
import { cardOf } from "#tests/src/features/prediction/predictions.ts";

const row = (label: string) => screen.getByText(label).closest("tr") as HTMLElement;
let latest: Polymer;

function Editor({ start }: { start: Polymer }) {
  const [polymer, setPolymer] = useState(start);
  latest = polymer;
  return <PolymerEditor polymer={polymer} onChange={setPolymer} />;
}

test("a number that nobody has verified is marked, and the card says how many there are", () => {
  render(<PolymerCard polymer={cardOf("peek")} />);
  expect(within(row("Glass transition, Tg")).queryByText("?")).toBeNull();
  expect(within(row("Keeps its shape below")).getByText("?")).toBeTruthy();
  expect(within(row("Keeps its shape below")).getAllByText("unverified")).toHaveLength(2);
  expect(screen.getByText(/of its \d+ numbers are not verified/)).toBeTruthy();
});

test("an amorphous card has no melting temperature, and says that nothing crystallises", () => {
  render(<PolymerCard polymer={cardOf("pei")} />);
  expect(screen.queryByText("Melting, Tm")).toBeNull();
  expect(screen.getByText(/Nothing of it crystallises/)).toBeTruthy();
  expect(screen.getByText(/An amorphous polymer/)).toBeTruthy();
});

test("half-times of the team's own are shown with the card", () => {
  const peek = cardOf("peek");
  if (!peek.crystallinity) throw new Error("PEEK crystallises");
  const points: [number, number][] = [
    [200, 12],
    [230, 4],
    [260, 9],
  ];
  const halfTimes = { points, source: "own lab", confidence: "own measurement" as const };
  render(<PolymerCard polymer={{ ...peek, crystallinity: { ...peek.crystallinity, halfTimes } }} />);
  expect(within(screen.getByRole("region", { name: "Half-times" })).getAllByRole("row")).toHaveLength(4);
});

test("a card that stops crystallising is a valid amorphous one, and one that begins gets placeholders", () => {
  const amorphous = crystallising(cardOf("peek"), false);
  expect(Polymer.safeParse(amorphous)).toMatchObject({ success: true });
  expect(amorphous).not.toHaveProperty("tmC");
  const again = crystallising(amorphous, true);
  expect(again.tmC?.confidence).toBe("unverified");
  expect(Polymer.safeParse(again)).toMatchObject({ success: true });
});

test("the editor leaves out the fields that a card does not have", async () => {
  render(<Editor start={cardOf("peek")} />);
  expect(screen.getByRole("textbox", { name: "Melting, Tm, value in °C" })).toBeTruthy();
  await userEvent.click(screen.getByRole("checkbox", { name: /^It crystallises/ }));
  expect(screen.queryByRole("textbox", { name: "Melting, Tm, value in °C" })).toBeNull();
  expect(latest.crystallinity).toBeNull();
});

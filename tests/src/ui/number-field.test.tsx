import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { expect, test } from "vitest";
import { NumberField } from "#src/ui/number-field.tsx";

let latest: number | undefined;

function Field({ unit }: { unit: string }) {
  const [value, setValue] = useState<number | undefined>(0.5);
  latest = value;
  return <NumberField label="Duty" unit={unit} value={value} onChange={setValue} />;
}

async function type(text: string): Promise<void> {
  const person = userEvent.setup();
  const field = screen.getByRole("textbox");
  await person.clear(field);
  await person.type(field, text);
}

test.each([
  ["65%", 0.65],
  ["65 %", 0.65],
  ["7%", 0.07],
  ["0,65", 0.65],
  [".65", 0.65],
  ["100 %", 1],
])("%s in a field for a share is %d", async (text, share) => {
  render(<Field unit="0–1" />);
  await type(text);
  expect(latest).toBe(share);
});

test("after the field is left, a share typed in percent stands there as the number it is", async () => {
  render(<Field unit="0–1" />);
  await type("65%");
  expect(screen.getByRole<HTMLInputElement>("textbox").value).toBe("65%");
  await userEvent.setup().tab();
  expect(screen.getByRole<HTMLInputElement>("textbox").value).toBe("0.65");
});

test("elsewhere a percent sign is no part of a number", async () => {
  render(<Field unit="s" />);
  await type("65%");
  expect(latest).toBeNaN();
  expect(screen.getByText(/Duty is no number\. Type digits/)).toBeTruthy();
});

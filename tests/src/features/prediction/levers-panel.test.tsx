import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { expect, test } from "vitest";
import { ForecastClient, type ForecastWorker } from "#src/features/prediction/forecast-client.ts";
import { LeversPanel } from "#src/features/prediction/levers-panel.tsx";
import type { LeversAsk, Part, Request } from "#src/features/prediction/worker/messages.ts";
import { cardOf } from "#tests/src/features/prediction/predictions.ts";
import { layerOf } from "#tests/src/layer-log/layers.ts";
import { machineOf } from "#tests/src/profile-editor/profiles.ts";

const margins = { belowTgC: 15, aboveTgC: 15, maxCrystallinity: 0.08, minCrystallinity: 0.2 };
const part: Part = { layers: [], machine: machineOf(), polymer: cardOf("peek") };

/** Answers at once: 140 °C, 100 K less at full fan, 100 K more for full lamp. */
function open(props: Partial<Parameters<typeof LeversPanel>[0]> = {}) {
  const asked: LeversAsk[] = [];
  const make = (): ForecastWorker => {
    const worker: ForecastWorker = {
      terminate: () => {},
      onmessage: null,
      onerror: null,
      postMessage({ ask }: Request) {
        const { fanDuties, lampDuties } = ask as LeversAsk;
        asked.push(ask as LeversAsk);
        const interlayerC = lampDuties.flatMap((lamp) => fanDuties.map((fan) => 140 - 100 * fan + 100 * lamp));
        queueMicrotask(() => worker.onmessage?.({ data: { result: { fanDuties, lampDuties, interlayerC } } }));
      },
    };
    return worker;
  };
  const client = new ForecastClient(make);
  const duty = { "part-fan": 0.4, lamp: 0.2 };
  render(<LeversPanel client={client} part={part} layer={layerOf(4)} duty={duty} margins={margins} {...props} />);
  return asked;
}

test("the picture says what it shows, and the same stands in a table", async () => {
  open();
  const picture = await screen.findByRole("img");
  expect(picture.getAttribute("aria-label")).toBe(
    "Interlayer temperature over the duties of part-fan and lamp, from 40 to 225 °C",
  );
  await userEvent.click(screen.getByText("In numbers"));
  const table = screen.getByRole("region", { name: "Interlayer temperature by duty" });
  const rows = within(table).getAllByRole("row");
  // The strongest lamp, which this machine limits to 0.85, stands on top as in the picture.
  expect(rows.map((row) => row.textContent?.slice(0, 4)).slice(1)).toEqual(["0.85", "0.64", "0.42", "0.21", "0.00"]);
  const cells = within(rows[1])
    .getAllByRole("cell")
    .map(({ textContent }) => textContent);
  expect(cells[0]).toBe("225semi-crystalline");
  expect(cells[4]).toBe("125amorphous");
  expect(within(rows[5]).getAllByRole("cell")[0].textContent).toBe("140neither");
});

test("another layer time asks again", async () => {
  const asked = open();
  const time = await screen.findByRole("textbox", { name: "Layer time s" });
  expect((time as HTMLInputElement).value).toBe("14");
  await userEvent.clear(time);
  expect(screen.getByText("Layer time must be above 0.")).toBeTruthy();
  await userEvent.type(time, "60");
  expect(asked.at(-1)?.layer.timeS).toBe(60);
});

test("without a pinned layer, or a nozzle temperature, it says what is missing", () => {
  open({ layer: undefined });
  expect(screen.getByText(/Pin a layer/)).toBeTruthy();
  open({ layer: layerOf(4, { nozzleC: null }) });
  expect(screen.getByText(/no nozzle temperature/)).toBeTruthy();
});

test("nothing crystallises in an amorphous polymer, so there is no such window", async () => {
  open({ part: { ...part, polymer: cardOf("pei") } });
  await screen.findByRole("img");
  expect(screen.queryByText(/semi-crystalline, given time/)).toBeNull();
});

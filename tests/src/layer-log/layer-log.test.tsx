import { act, fireEvent, render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useMemo, useState } from "react";
import { expect, test, vi } from "vitest";
import { LayerLog, type LayerLogProps, type LogAsideView } from "#src/features/layer-log/layer-log.tsx";
import { readingTracks } from "#src/features/layer-log/reading-tracks.ts";
import { layersOf } from "#tests/src/layer-log/layers.ts";

const CHANNELS = [
  { id: "part-fan", kind: "fan" as const },
  { id: "lamp", kind: "heater" as const },
];

function Log({ count = 100, pin = null, ...rest }: { count?: number; pin?: number | null } & Partial<LayerLogProps>) {
  const layers = useMemo(() => layersOf(count), [count]);
  const tracks = useMemo(() => readingTracks(layers, CHANNELS), [layers]);
  const [pinned, setPinned] = useState(pin);
  return <LayerLog layers={layers} tracks={tracks} pinnedLayer={pinned} onPin={setPinned} heightPx={532} {...rest} />;
}

/** Stands at the right and only notes which heights are shown. */
const seen = (views: LogAsideView[]) => (view: LogAsideView) => {
  views.push(view);
  return null;
};

const log = () => screen.getByRole("slider", { name: "Layer log, pinned layer" });

test("the keyboard walks through the layers", async () => {
  const user = userEvent.setup();
  render(<Log />);
  await user.tab();
  expect(document.activeElement).toBe(log());
  expect(log().getAttribute("aria-valuetext")).toBe("No layer pinned");
  await user.keyboard("{ArrowUp}{ArrowUp}{ArrowUp}{ArrowDown}");
  expect(log().getAttribute("aria-valuetext")).toBe("Layer 2 of 100, 0.40 mm");
  await user.keyboard("{PageUp}");
  expect(log().getAttribute("aria-valuenow")).toBe("12");
  await user.keyboard("{End}");
  expect(log().getAttribute("aria-valuenow")).toBe("100");
  await user.keyboard("{Home}");
  expect(log().getAttribute("aria-valuenow")).toBe("1");
});

test("a click pins the layer under the pointer", () => {
  render(<Log />);
  // The plot covers 24 to 524 px: 5 px a layer.
  fireEvent.pointerDown(log(), { button: 0, clientX: 400, clientY: 24 + 42 * 5 + 2 });
  fireEvent.pointerUp(log(), { button: 0, clientX: 400, clientY: 24 + 42 * 5 + 2 });
  expect(log().getAttribute("aria-valuenow")).toBe("58");
});

test("dragging over the silhouette zooms to the band, and Escape shows the whole part again", () => {
  const views: LogAsideView[] = [];
  render(<Log aside={{ title: "Zones", widthPx: 100, render: seen(views) }} />);
  const latest = () => views[views.length - 1];
  expect([latest().fromMm, latest().toMm]).toEqual([0, 20]);
  fireEvent.pointerDown(log(), { button: 0, clientX: 150, clientY: 124 });
  fireEvent.pointerMove(log(), { clientX: 150, clientY: 224 });
  fireEvent.pointerUp(log(), { button: 0, clientX: 150, clientY: 274 });
  expect(latest().toMm).toBeCloseTo(16);
  expect(latest().fromMm).toBeCloseTo(10);
  expect(log().getAttribute("aria-valuetext")).toBe("No layer pinned");
  fireEvent.keyDown(log(), { key: "Escape" });
  expect([latest().fromMm, latest().toMm]).toEqual([0, 20]);
});

test("a band is marked with Shift and shown with Enter; Escape goes back step by step and unpins last", () => {
  const views: LogAsideView[] = [];
  const onUnpin = vi.fn();
  render(<Log pin={50} onUnpin={onUnpin} aside={{ title: "Zones", widthPx: 100, render: seen(views) }} />);
  const latest = () => views[views.length - 1];
  for (let n = 0; n < 9; n++) fireEvent.keyDown(log(), { key: "ArrowUp", shiftKey: true });
  expect(log().getAttribute("aria-valuenow")).toBe("50");
  fireEvent.keyDown(log(), { key: "Enter" });
  expect([latest().fromMm, latest().toMm]).toEqual([expect.closeTo(9.8), expect.closeTo(11.8)]);
  fireEvent.keyDown(log(), { key: "ArrowDown", shiftKey: true });
  fireEvent.keyDown(log(), { key: "Escape" });
  expect(latest().toMm).toBeLessThan(12);
  fireEvent.keyDown(log(), { key: "Escape" });
  expect([latest().fromMm, latest().toMm]).toEqual([0, 20]);
  expect(onUnpin).not.toHaveBeenCalled();
  fireEvent.keyDown(log(), { key: "Escape" });
  expect(onUnpin).toHaveBeenCalledTimes(1);
});

test("dragging over a track neither zooms nor pins", () => {
  const views: LogAsideView[] = [];
  render(<Log aside={{ title: "Zones", widthPx: 100, render: seen(views) }} />);
  fireEvent.pointerDown(log(), { button: 0, clientX: 500, clientY: 124 });
  fireEvent.pointerMove(log(), { clientX: 500, clientY: 224 });
  fireEvent.pointerUp(log(), { button: 0, clientX: 500, clientY: 274 });
  expect(views[views.length - 1].toMm).toBe(20);
  expect(log().getAttribute("aria-valuetext")).toBe("No layer pinned");
});

test("a double click zooms out, and a button does so where there is no keyboard", async () => {
  render(<Log pin={50} />);
  fireEvent.keyDown(log(), { key: "+" });
  await userEvent.click(screen.getByRole("button", { name: "Whole part" }));
  expect(screen.queryByRole("button", { name: "Whole part" })).toBeNull();
  fireEvent.keyDown(log(), { key: "+" });
  fireEvent.doubleClick(log());
  expect(screen.queryByRole("button", { name: "Whole part" })).toBeNull();
});

test("walking out of a zoomed view takes the view along", () => {
  const views: LogAsideView[] = [];
  render(<Log pin={50} aside={{ title: "Zones", widthPx: 100, render: seen(views) }} />);
  for (let i = 0; i < 3; i++) fireEvent.keyDown(log(), { key: "+" });
  expect(views[views.length - 1].toMm).toBeLessThan(12);
  fireEvent.keyDown(log(), { key: "End" });
  expect(views[views.length - 1].toMm).toBeCloseTo(20);
  expect(views[views.length - 1].fromMm).toBeGreaterThan(10);
});

test("hovering reads values out at the head and tells the page which layer it is", () => {
  const onHover = vi.fn();
  const { container } = render(<Log pin={1} onHover={onHover} />);
  const head = container.querySelector("[aria-hidden=true]");
  expect(head?.textContent).toContain("11.0 s");
  fireEvent.pointerMove(log(), { clientX: 400, clientY: 26 });
  expect(head?.textContent).toContain("110.0 s");
  expect(onHover).toHaveBeenLastCalledWith(100);
  fireEvent.pointerLeave(log());
  expect(onHover).toHaveBeenLastCalledWith(null);
  expect(head?.textContent).toContain("11.0 s");
});

test("the pinned layer's numbers are read out once the keys rest", () => {
  vi.useFakeTimers();
  try {
    render(<Log pin={3} />);
    const status = screen.getAllByRole("status")[0];
    expect(status.textContent).toBe("");
    act(() => void vi.advanceTimersByTime(300));
    expect(status.textContent).toBe(
      "Layer 3 of 100, 0.60 mm. Layer time 13.0 s. Deposited length 500 mm. Fan duty 0.40. Heater duty 0.00.",
    );
  } finally {
    vi.useRealTimers();
  }
});

test("what was found at the layer is said below the log", () => {
  const marks = [{ layer: 7, severity: "warning" as const, message: "The fan stalls." }];
  render(<Log pin={6} marks={marks} />);
  expect(screen.queryByText(/The fan stalls/)).toBeNull();
  fireEvent.keyDown(log(), { key: "ArrowUp" });
  expect(within(screen.getByRole("list", { name: "At this layer" })).getByText(/The fan stalls/)).toBeTruthy();
});

test("the table has the same layers in numbers, only those in sight, and pins too", async () => {
  render(<Log count={5000} />);
  await userEvent.click(screen.getByRole("button", { name: "Table" }));
  const table = screen.getByRole("table");
  expect(table.getAttribute("aria-rowcount")).toBe("5001");
  expect(within(table).getAllByRole("row").length).toBeLessThan(80);
  await userEvent.click(within(table).getByRole("button", { name: "4" }));
  const row = within(table).getByRole("button", { name: "4" }).closest("tr");
  expect(row?.getAttribute("aria-current")).toBe("true");
  expect(row?.textContent).toContain("0.80");
});

test("the legend says that colours stand for state, not appearance", () => {
  const zones = [{ name: "base", from: 0, unit: "mm" as const, target: "semi-crystalline" as const }];
  render(<Log zones={zones} />);
  const legend = screen.getByRole("list", { name: "Legend" });
  expect(within(legend).getByText("state, not appearance")).toBeTruthy();
  expect(within(legend).getByText("Semi-crystalline")).toBeTruthy();
  expect(within(legend).queryByText("Amorphous")).toBeNull();
});

test("with a prediction the legend tells what is expected from what is wanted, and the head how far to trust it", () => {
  const layers = layersOf(3);
  const zones = [{ name: "whole", from: 0, unit: "mm" as const, target: "amorphous" as const }];
  const track = {
    id: "interlayer",
    title: "Interlayer temperature",
    shortTitle: "Interlayer",
    unit: "°C",
    decimals: 0,
    domain: [0, 200] as [number, number],
    series: [
      {
        label: "predicted",
        values: [110, 120, 130],
        low: [90, 100, 110],
        high: [130, 140, 150],
        uncertain: true,
        style: { tone: "ink" as const, line: "dotted" as const },
      },
    ],
    windows: [{ state: "amorphous" as const, low: Number.NEGATIVE_INFINITY, high: 128, runs: [[0, 2]] as const }],
    caution: "uncalibrated",
  };
  const { container } = render(
    <LayerLog
      layers={layers}
      tracks={[track]}
      zones={zones}
      states={["amorphous", "undecided", "undecided"]}
      pinnedLayer={2}
      onPin={() => {}}
    />,
  );
  const legend = within(screen.getByRole("list", { name: "Legend" }))
    .getAllByRole("listitem")
    .map(({ textContent }) => textContent);
  for (const entry of ["Amorphous", "Undecided", "predicted", "may lie within", "where the target wants it"])
    expect(legend).toContain(entry);
  expect(legend).not.toContain("changes within the layer");
  expect(container.querySelector("[aria-hidden=true]")?.textContent).toContain("uncalibrated");
  fireEvent.click(screen.getByRole("button", { name: "Table" }));
  const row = screen.getAllByRole("row").find((each) => each.getAttribute("aria-current") === "true");
  const cells = within(row as HTMLElement).getAllByRole("cell");
  expect(cells.slice(1).map(({ textContent }) => textContent)).toEqual(["120", "100", "140"]);
});

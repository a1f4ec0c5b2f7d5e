import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render, screen, waitFor } from "@testing-library/react";
import { expect, test, vi } from "vitest";
import { LayerLines } from "#src/features/toolpaths/layer-lines.tsx";
import { fakeServer } from "#tests/src/fake-server.ts";

function open(marked: number | undefined, truncated = false) {
  Element.prototype.scrollIntoView = vi.fn();
  fakeServer({
    "GET /api/readings/r/lines": () => ({ firstLine: 408, text: "G1 X1\r\nG1 X2\r\nG1 X3\r\n", truncated }),
  });
  const onBehind = vi.fn();
  render(
    <QueryClientProvider client={new QueryClient()}>
      <LayerLines readingId="r" layer={2} marked={marked} onBehind={onBehind} />
    </QueryClientProvider>,
  );
  return onBehind;
}

test("the line that is looked for has the focus brought to it", async () => {
  const onBehind = open(410);
  const lines = await screen.findByRole("region", { name: "Lines of layer 2" });
  await waitFor(() => expect(document.activeElement).toBe(lines));
  expect(onBehind).not.toHaveBeenCalled();
});

test("a line behind those of the layer is looked for in the next one, unless the rest was not sent", async () => {
  const onBehind = open(411);
  await waitFor(() => expect(onBehind).toHaveBeenCalledOnce());
});

test("where the rest was not sent it is said that the line lies there", async () => {
  const onBehind = open(411, true);
  expect(await screen.findByText(/Line 411 lies behind it/)).toBeTruthy();
  expect(onBehind).not.toHaveBeenCalled();
});

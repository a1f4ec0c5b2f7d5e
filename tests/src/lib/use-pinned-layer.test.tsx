import { act, render, screen } from "@testing-library/react";
import { createMemoryRouter, Link, RouterProvider } from "react-router-dom";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import { usePinnedLayer } from "#src/lib/use-pinned-layer.ts";

function Log() {
  const [layer, pin] = usePinnedLayer();
  return (
    <>
      <button type="button" onClick={() => pin(12)}>
        pinned: {layer ?? "none"}
      </button>
      <Link to="/next">on</Link>
    </>
  );
}

/** A log, and a page whose code arrives when the test says so. */
function open(address: string) {
  let arrive = () => {};
  const arrived = new Promise<void>((resolve) => {
    arrive = resolve;
  });
  const next = { path: "/next", lazy: async () => arrived.then(() => ({ element: <p>the next page</p> })) };
  const router = createMemoryRouter([{ path: "/", Component: Log }, next], { initialEntries: [address] });
  render(<RouterProvider router={router} />);
  return { router, arrive };
}

const pass = (ms: number) => act(() => vi.advanceTimersByTimeAsync(ms));

beforeEach(() => {
  vi.useFakeTimers();
});
afterEach(() => {
  vi.useRealTimers();
});

test("the address names the pinned layer once the keys rest, and a link leads to it", async () => {
  const { router } = open("/?reading=7");
  act(() => screen.getByRole("button").click());
  expect(router.state.location.search).toBe("?reading=7");
  await pass(300);
  expect(router.state.location.search).toBe("?reading=7&layer=12");
});

test("a layer in the address is pinned", () => {
  open("/?layer=5");
  expect(screen.getByRole("button").textContent).toBe("pinned: 5");
});

test("a layer pinned just before a link is followed does not call the way to the next page off", async () => {
  const { arrive } = open("/");
  act(() => screen.getByRole("button").click());
  act(() => screen.getByRole("link").click());
  await pass(300);
  arrive();
  await pass(0);
  expect(screen.queryByText("the next page")).not.toBeNull();
});

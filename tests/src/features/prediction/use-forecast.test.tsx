import { act, renderHook } from "@testing-library/react";
import { afterEach, beforeEach, expect, test, vi } from "vitest";
import type { Profile } from "#shared/formats/profile.ts";
import type { ForecastWorker } from "#src/features/prediction/forecast-client.ts";
import { useForecast } from "#src/features/prediction/use-forecast.ts";
import type { ForecastAsk, Part, Reply, Request } from "#src/features/prediction/worker/messages.ts";

beforeEach(() => vi.useFakeTimers());
afterEach(() => vi.useRealTimers());

const part = {} as Part;
const profile = (name: string) => ({ name }) as Profile;

function open() {
  const asked: Request[] = [];
  let worker: ForecastWorker;
  const make = () => {
    worker = { postMessage: (request) => asked.push(request), terminate: () => {}, onmessage: null, onerror: null };
    return worker;
  };
  const answer = (reply: Reply) => act(async () => worker.onmessage?.({ data: reply }));
  const view = renderHook(({ draft }) => useForecast(part, draft, undefined, make), {
    initialProps: { draft: profile("a") as Profile | undefined },
  });
  const asks = () => asked.map(({ ask }) => ask as ForecastAsk).map(({ profile, band }) => [profile.name, band]);
  return { ...view, answer, asks };
}

const forecast = (tookMs: number, label: string): Reply =>
  ({ result: { tookMs, prediction: { label } } }) as unknown as Reply;
const shown = (result: { current: ReturnType<typeof useForecast> }) => ({
  label: (result.current.forecast?.prediction as unknown as { label: string } | undefined)?.label,
  pale: result.current.pale,
});

test("a small part is always predicted with its band, and pale only until the answer is there", async () => {
  const { result, rerender, answer, asks } = open();
  expect(shown(result)).toEqual({ label: undefined, pale: true });
  await answer(forecast(20, "a"));
  expect(shown(result)).toEqual({ label: "a", pale: false });
  rerender({ draft: profile("b") });
  expect(shown(result)).toEqual({ label: "a", pale: true });
  await answer(forecast(20, "b"));
  expect(shown(result)).toEqual({ label: "b", pale: false });
  expect(asks()).toEqual([
    ["a", true],
    ["b", true],
  ]);
});

test("of a large part the band waits until the hand rests", async () => {
  const { result, rerender, answer, asks } = open();
  await answer(forecast(700, "a"));
  for (const name of ["b", "c", "d"]) rerender({ draft: profile(name) });
  await answer(forecast(200, "b"));
  // An answer to an older question is shown, and pale.
  expect(shown(result)).toEqual({ label: "b", pale: true });
  await answer(forecast(200, "d"));
  expect(shown(result)).toEqual({ label: "d", pale: false });
  expect(asks().slice(1)).toEqual([
    ["b", false],
    ["d", false],
  ]);
  await act(() => vi.advanceTimersByTimeAsync(300));
  expect(asks().at(-1)).toEqual(["d", true]);
});

test("what can't be predicted says why, and the last forecast stays, pale", async () => {
  const { result, rerender, answer } = open();
  await answer(forecast(20, "a"));
  rerender({ draft: profile("b") });
  await answer({ refusal: { code: "zone-missing", message: "Layer 9 lies outside.", remedy: "Add one.", place: {} } });
  expect(shown(result)).toEqual({ label: "a", pale: true });
  expect(result.current.obstacle).toMatchObject({ refusal: { code: "zone-missing" } });
  rerender({ draft: profile("c") });
  await answer(forecast(20, "c"));
  expect(result.current.obstacle).toBeUndefined();
});

test("a draft with problems is not asked about", async () => {
  const { result, rerender, answer, asks } = open();
  await answer(forecast(20, "a"));
  rerender({ draft: undefined });
  expect(asks()).toHaveLength(1);
  expect(shown(result)).toEqual({ label: "a", pale: true });
});

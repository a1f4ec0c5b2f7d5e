import { act, renderHook } from "@testing-library/react";
import { expect, test, vi } from "vitest";
import { useLivePlan } from "#src/features/profiles/editor/use-live-plan.ts";
import { machineOf, profileOf } from "#tests/src/profile-editor/profiles.ts";

const LAYERS = Array.from({ length: 45 }, (_, i) => ({
  index: i + 1,
  object: 1,
  zMm: Math.round((i + 1) * 200) / 1000,
  heightMm: 0.2,
  timeS: 36,
  depositedLengthMm: 1000,
}));
const machine = machineOf();
const frame = () => act(() => new Promise((done) => requestAnimationFrame(() => done(undefined))));

test("the plan follows the profile, once a frame however often it changes", async () => {
  const asked = vi.spyOn(globalThis, "requestAnimationFrame");
  const { result, rerender } = renderHook(({ profile }) => useLivePlan(LAYERS, machine, profile), {
    initialProps: { profile: profileOf() },
  });
  const cancelled = vi.spyOn(globalThis, "cancelAnimationFrame");
  const hot = profileOf();
  hot.zones[0].heating = [{ channel: "lamp", rule: "fixed", duty: 0.7 }];
  rerender({ profile: profileOf() });
  rerender({ profile: hot });
  expect(cancelled).toHaveBeenCalledTimes(2);
  expect(asked).toHaveBeenCalledTimes(3);
  await frame();
  expect(result.current.plan?.layers[20].duty.lamp).toBeCloseTo(0.7, 2);
  expect(result.current.plan?.layers).toHaveLength(45);
});

test("while the draft has problems the last plan stays", async () => {
  const { result, rerender } = renderHook(({ profile }) => useLivePlan(LAYERS, machine, profile), {
    initialProps: { profile: profileOf() as ReturnType<typeof profileOf> | undefined },
  });
  await frame();
  const { plan } = result.current;
  rerender({ profile: undefined });
  await frame();
  expect(result.current.plan).toBe(plan);
});

test("a part that no zone covers is a refusal, not a fault", async () => {
  const low = profileOf({ zones: [{ ...profileOf().zones[0] }] });
  const { result } = renderHook(() => useLivePlan(LAYERS, machine, low));
  await frame();
  expect(result.current.refusal?.code).toBe("zone-missing");
  expect(result.current.plan).toBeUndefined();
});

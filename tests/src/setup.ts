import { cleanup } from "@testing-library/react";
import { afterEach, beforeEach, expect, vi } from "vitest";

beforeEach(() => {
  vi.spyOn(console, "error").mockImplementation(() => undefined);
});

afterEach(() => {
  cleanup();
  // What React or a component complains about is a fault, even where the test would pass.
  expect(vi.mocked(console.error).mock.calls).toEqual([]);
  vi.restoreAllMocks();
});

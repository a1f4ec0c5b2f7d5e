import { act, renderHook } from "@testing-library/react";
import { expect, test } from "vitest";
import { useDraft } from "#src/lib/use-draft.ts";

const BASE = { number: 3, document: { name: "as saved" } };
const open = (base = BASE) => renderHook(() => useDraft("profiles.1", base));

test("until something is changed the draft is what it began from", () => {
  const { result } = open();
  expect(result.current).toMatchObject({ document: BASE.document, basedOn: 3, changed: false });
});

test("what was typed outlives the page, with the version it began from", () => {
  const first = open();
  act(() => first.result.current.change({ name: "typed" }));
  first.unmount();
  const again = open({ number: 4, document: { name: "saved by somebody else" } });
  expect(again.result.current).toMatchObject({ document: { name: "typed" }, basedOn: 3, changed: true });
  expect(again.result.current.resumedFrom).toBeDefined();
});

test("a draft put on top of a newer version keeps what was typed", () => {
  const { result } = open();
  act(() => result.current.change({ name: "typed" }));
  act(() => result.current.rebase(4));
  expect(result.current).toMatchObject({ document: { name: "typed" }, basedOn: 4 });
});

test("discarded is gone, also for the next visit", () => {
  const first = open();
  act(() => first.result.current.change({ name: "typed" }));
  act(() => first.result.current.discard());
  expect(first.result.current).toMatchObject({ document: BASE.document, changed: false });
  first.unmount();
  expect(open().result.current.changed).toBe(false);
});

test("something unreadable in storage is no draft", () => {
  localStorage.setItem("quenchline.draft.profiles.1", "{");
  expect(open().result.current.changed).toBe(false);
});

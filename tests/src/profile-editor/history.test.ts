import fc from "fast-check";
import { expect, test } from "vitest";
import { type Past, recorded, redone, undone } from "#src/lib/history.ts";

const EMPTY: Past<number> = { before: [], after: [] };

test("changes of one gesture are one step, others one each", () => {
  let past = recorded(EMPTY, 0, "drag");
  past = recorded(past, 1, "drag");
  past = recorded(past, 2, "drag");
  past = recorded(past, 3, "other");
  past = recorded(past, 4);
  past = recorded(past, 5);
  expect(past.before).toEqual([0, 3, 4, 5]);
});

test("a change after an undo forgets what was undone", () => {
  const back = undone(recorded(recorded(EMPTY, 0), 1), 2);
  expect(back?.value).toBe(1);
  expect(recorded(back!.past, 1).after).toEqual([]);
});

test("there is nothing to undo or redo in the beginning", () => {
  expect(undone(EMPTY, 0)).toBeUndefined();
  expect(redone(EMPTY, 0)).toBeUndefined();
});

test("undoing everything and redoing it leads back to where one was", () =>
  fc.assert(
    fc.property(fc.array(fc.integer(), { maxLength: 30 }), (values) => {
      let [past, value] = [EMPTY, -1];
      for (const next of values) [past, value] = [recorded(past, value), next];
      const last = value;
      for (let step = undone(past, value); step; step = undone(past, value)) ({ past, value } = step);
      expect(value).toBe(-1);
      for (let step = redone(past, value); step; step = redone(past, value)) ({ past, value } = step);
      expect(value).toBe(last);
    }),
  ));

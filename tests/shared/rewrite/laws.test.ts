import fc from "fast-check";
import { describe, expect, test, vi } from "vitest";
import type { Channel } from "#shared/formats/machine.ts";
import { hostChecksum } from "#shared/gcode/host-checksum.ts";
import { type Generated, generated, profiles } from "#tests/shared/rewrite/generated.ts";
import {
  apply,
  commandOf,
  isOwn,
  isOwnCommand,
  linesOf,
  read,
  rowsOf,
  tune,
  tuneWhole,
  unnumbered,
} from "#tests/shared/rewrite/tuning.ts";

// Many small files are read and tuned: on a busy machine that takes a while.
vi.setConfig({ testTimeout: 60_000 });
const RUNS = { numRuns: 60 };
const CLOSE = 1e-9;

/** Lines that the tuning may take out: those that set a driven channel's duty inside the window, and that alone. */
function mayGo({ rows, first, end, profile }: Generated): boolean[] {
  const { cooling, heating } = profile.zones[0];
  const driven = new Set([...cooling, ...heating].map(({ channel }) => channel));
  return rows.map(({ sets }, k) => sets !== undefined && driven.has(sets) && k >= first && k < end);
}

/** What one of our commands sets, and to which duty. */
function setBy(line: string, channels: readonly Channel[]): { id: string; duty: number } | undefined {
  const command = commandOf(line);
  for (const { id, drive } of channels) {
    const [start, full] = {
      "fan-index": () => [
        `M106${drive.by === "fan-index" && drive.index > 0 ? ` P${drive.index}` : ""} S`,
        scaleOf(drive),
      ],
      pin: () => [`M42 P${drive.by === "pin" && drive.pin} S`, scaleOf(drive)],
      "named-fan": () => [`SET_FAN_SPEED FAN=${"name" in drive && drive.name} SPEED=`, 1],
      "named-pin": () => [`SET_PIN PIN=${"name" in drive && drive.name} VALUE=`, scaleOf(drive)],
    }[drive.by]() as [string, number];
    if (command.startsWith(start)) return { id, duty: Number(command.slice(start.length)) / full };
  }
  return undefined;
}

const scaleOf = (drive: Channel["drive"]): number => ("fullScale" in drive ? drive.fullScale : 1);

const stepsOf = (drive: Channel["drive"]): number =>
  (drive.by === "fan-index" || drive.by === "pin") && drive.fullScale === 255 ? 255 : 1000;

describe("with no edits", () => {
  test("any bytes come out as they went in, however they were cut", () =>
    fc.assert(
      fc.property(
        fc.uint8Array({ maxLength: 300 }),
        fc.array(fc.integer({ min: 1, max: 40 }), { maxLength: 5 }),
        fc.boolean(),
        (bytes, cut, numbered) => {
          const text = Buffer.from(bytes).toString("latin1");
          expect(apply(text, [], { numbered }, cut)).toBe(text);
        },
      ),
    ));

  test("any toolpath comes out as it went in, however it was cut", () =>
    fc.assert(
      fc.property(generated(), ({ text, ending, cut }) => {
        expect(apply(text, [], { numbered: ending.numberedFrom !== undefined }, cut)).toBe(text);
      }),
      RUNS,
    ));
});

/** Any file, with a profile that drives the fan, the lamp or both. */
const part = fc
  .constantFrom<("fan" | "lamp")[]>(["fan", "lamp"], ["fan"], ["lamp"])
  .chain((drives) => generated(drives));

describe("whatever the toolpath", () => {
  test("all lines but ours and those on driven channels stay as they are, in their order", () =>
    fc.assert(
      fc.property(part, (given) => {
        const { text, machine, profile, ending } = given;
        const numbered = ending.numberedFrom !== undefined;
        const seen = (whole: string) => (numbered ? linesOf(whole).map(unnumbered) : linesOf(whole));
        const left = seen(tune(text, machine, profile)).filter((line) => !isOwn(line));
        const goes = mayGo(given);
        const before = seen(text);
        // Where our lines follow it, an open last line gets a terminator.
        if (!/[\r\n]$/.test(text)) left.push(left.pop()!.replace(/[\r\n]+$/, ""));
        if (profile.withinLayer === "replace") {
          expect(left).toEqual(before.filter((_, k) => !goes[k]));
          return;
        }
        let next = 0;
        for (const [k, line] of before.entries())
          if (left[next] === line) next++;
          else expect(goes[k], `line ${k + 1} is missing`).toBe(true);
        expect(next).toBe(left.length);
      }),
      RUNS,
    ));

  test("nothing changes outside the window", () =>
    fc.assert(
      fc.property(part, ({ text, machine, profile, first, end, ending }) => {
        const tuned = tune(text, machine, profile);
        const before = linesOf(text).slice(0, first).join("");
        expect(tuned.slice(0, before.length)).toBe(before);
        const numbered = ending.numberedFrom !== undefined;
        const seen = (whole: string) => (numbered ? rowsOf(whole).map(unnumbered) : rowsOf(whole));
        const behind = seen(text).slice(end);
        if (behind.length > 0) expect(seen(tuned).slice(-behind.length)).toEqual(behind);
      }),
      RUNS,
    ));

  test("tuning again, from the original or from the tuned file, gives the same bytes in any chunking", () =>
    fc.assert(
      fc.property(part, ({ text, machine, profile, cut }) => {
        const tuned = tune(text, machine, profile);
        expect(tune(text, machine, profile, { cut })).toBe(tuned);
        expect(tune(tuned, machine, profile, { cut })).toBe(tuned);
      }),
      RUNS,
    ));

  test("the tuned file has the same layers with the same times", () =>
    fc.assert(
      fc.property(part, ({ text, machine, profile }) => {
        const facts = (whole: string) => {
          const { layers, totals, beforeFirstLayerS, afterLastLayerS } = read(whole, machine);
          return {
            totals,
            beforeFirstLayerS,
            afterLastLayerS,
            layers: layers.map(
              ({ index, object, zMm, startsAtS, timeS, depositedLengthMm, travelLengthMm, marker }) => ({
                ...{ index, object, zMm, startsAtS, timeS, depositedLengthMm, travelLengthMm, marker },
              }),
            ),
          };
        };
        expect(facts(tune(text, machine, profile))).toEqual(facts(text));
      }),
      RUNS,
    ));

  test("every duty of ours is a step of its drive, and off or within the limits", () =>
    fc.assert(
      fc.property(part, ({ text, machine, profile }) => {
        for (const line of linesOf(tune(text, machine, profile)).filter(isOwnCommand)) {
          const set = setBy(line, machine.channels);
          const channel = machine.channels.find(({ id }) => id === set?.id)!;
          const step = set!.duty * stepsOf(channel.drive);
          expect(Math.abs(step - Math.round(step)), line).toBeLessThan(1e-6);
          expect(set!.duty, line).toBeLessThanOrEqual(channel.maxDuty + CLOSE);
          if (channel.kind === "fan" && set!.duty > 0)
            expect(set!.duty, line).toBeGreaterThanOrEqual(channel.minDuty - CLOSE);
        }
      }),
      RUNS,
    ));

  test("numbers go on one by one, every checksum is right, and what stands before our lines keeps its number", () =>
    fc.assert(
      fc.property(part, ({ text, machine, profile, ending }) => {
        if (ending.numberedFrom === undefined) return;
        let number = ending.numberedFrom;
        for (const row of rowsOf(tune(text, machine, profile))) {
          if (/^\s*(;|\(|$)/.test(row)) continue;
          const [, command, given, sum] = /^(N(\d+) .*)\*(\d+)(?: ;[^*]*)?$/.exec(row)!;
          expect(Number(given), row).toBe(number++);
          expect(Number(sum), row).toBe(hostChecksum(command));
        }
      }),
      RUNS,
    ));
});

describe("whatever the toolpath, the lamp", () => {
  test("is off behind the last laying move, and our command says so last, whatever the end script does", () =>
    fc.assert(
      fc.property(generated(), ({ text, rows, end, machine, profile }) => {
        const tuned = rowsOf(tune(text, machine, profile));
        const last = tuned
          .map((row) => isOwnCommand(row) && setBy(row, machine.channels)?.id === "lamp")
          .lastIndexOf(true);
        expect(setBy(tuned[last], machine.channels)).toEqual({ id: "lamp", duty: 0 });
        const behind = tuned.slice(last + 1).filter((row) => !isOwn(row));
        expect(behind).toHaveLength(rows.length - end);
      }),
      RUNS,
    ));

  test("is never above idle at a pause of the print", () =>
    fc.assert(
      fc.property(generated(), ({ text, machine, profile }) => {
        const lamp = machine.channels[1];
        let duty: number | undefined;
        for (const line of linesOf(tune(text, machine, profile))) {
          const set = isOwnCommand(line) ? setBy(line, machine.channels) : undefined;
          if (set?.id === "lamp") duty = set.duty;
          // Before the first layer only the file itself has set it.
          if (/^(N\d+ )?(M0\b|M600)/.test(line) && duty !== undefined)
            expect(duty).toBeLessThanOrEqual(lamp.idleDuty + CLOSE);
        }
      }),
      RUNS,
    ));
});

test("commands are written only where the duty changes; the first and the lamp's last always stand", () =>
  fc.assert(
    fc.property(generated(), ({ text, machine, profile }) => {
      const tuned = tune(text, machine, { ...profile, withinLayer: "replace" });
      for (const id of ["part-fan", "lamp"]) {
        const duties = linesOf(tuned)
          .filter(isOwnCommand)
          .map((line) => setBy(line, machine.channels)!)
          .filter((set) => set.id === id)
          .map(({ duty }) => duty);
        const middle = id === "lamp" ? duties.slice(0, -1) : duties;
        for (let k = 1; k < middle.length; k++) expect(middle[k]).not.toBe(middle[k - 1]);
      }
    }),
    RUNS,
  ));

test("without leads, start boosts, largest changes per second and pauses, each layer begins under its plan", () =>
  fc.assert(
    fc.property(generated(), ({ text, machine: given, profile }) => {
      fc.pre(!/\*/.test(text));
      const quiet = text.replace(/M0\b|M600/g, "M400");
      const machine = { ...given, channels: given.channels.map((channel) => ({ ...channel, startBoostS: 0 })) };
      const plain = {
        ...profile,
        withinLayer: "replace" as const,
        lead: {},
        limits: Object.fromEntries(
          Object.entries(profile.limits).map(([id, own]) => [id, { ...own, maxDutyPerS: undefined }]),
        ),
      };
      const { plan, text: tuned } = tuneWhole(quiet, machine, plain);
      const { layers, controls } = read(tuned, machine);
      for (const [k, layer] of layers.entries())
        for (const [index, { id, drive }] of machine.channels.slice(0, 2).entries()) {
          const before = controls
            .filter((line) => line.channel === index && line.does === "duty" && line.offset < layer.firstByte)
            .pop();
          expect(before?.ours).toBeTruthy();
          const difference = Math.abs(before!.duty - plan.layers[k].duty[id]);
          expect(difference, `${id}, layer ${k + 1}`).toBeLessThan(0.1 / stepsOf(drive));
        }
    }),
    RUNS,
  ));

test("tuning a tuned file with another profile is tuning the original with it", () => {
  const other = profiles(["fan", "lamp"]).map((profile) => ({ ...profile, withinLayer: "replace" as const }));
  return fc.assert(
    fc.property(part, other, ({ text, machine, profile, cut }, next) => {
      expect(tune(tune(text, machine, profile), machine, next, { cut })).toBe(tune(text, machine, next));
    }),
    RUNS,
  );
});

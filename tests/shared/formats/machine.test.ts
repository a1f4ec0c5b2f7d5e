import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { contentOf } from "#shared/formats/document.ts";
import { type Channel, Machine, parseMachine, writeMachine } from "#shared/formats/machine.ts";
import { parseJson } from "#shared/formats/parse-json.ts";
import { type Json, problemsOf, refusal, tern } from "#tests/shared/formats/documents.ts";

/** Problems of the example machine after it was spoilt. */
function problems(spoil: (machine: Json) => void): string[] {
  const machine = tern();
  spoil(machine);
  return problemsOf(() => parseMachine(machine));
}

const smallest = {
  format: "quenchline.machine/1",
  name: "Fulmar",
  motion: {
    maxSpeedMmS: 150,
    accelMmS2: { print: 1000, travel: 2000, retract: 1000 },
    cornering: { rule: "junction-deviation", deviationMm: 0.013 },
  },
  channels: [{ id: "lamp", kind: "heater", drive: { by: "named-pin", name: "lamp" } }],
};

describe("defaults", () => {
  test("are filled in where optional fields are left out", () => {
    const { motion, channels, pauses } = parseMachine(smallest);
    expect(motion).toEqual({
      ...smallest.motion,
      axes: {},
      extruderLimits: "extrude-only",
      stopAtExtrudeOnly: true,
      arcSegmentMm: 1,
      firmwareRetract: { lengthMm: 0, speedMmS: 20 },
      initialSpeedMmS: 25,
      lookAhead: "full",
      honourFileLimits: false,
      axisModeSetsExtruder: false,
      dwellP: "ms",
      filamentDiameterMm: 1.75,
    });
    expect(channels[0]).toEqual({
      id: "lamp",
      kind: "heater",
      drive: { by: "named-pin", name: "lamp", fullScale: 1 },
      minDuty: 0,
      maxDuty: 1,
      idleDuty: 0,
      startBoostS: 0,
      settleS: 0,
      acts: "queued",
    });
    expect(pauses).toEqual([]);
  });

  test("are not shared between documents", () => {
    parseMachine(smallest).motion.axes.x = { maxSpeedMmS: 1 };
    expect(parseMachine(smallest).motion.axes).toEqual({});
  });

  test("switch the two extra corner limits off", () => {
    const machine = tern();
    machine.motion.cornering = { rule: "square-corner-velocity", speedMmS: 5 };
    expect(parseMachine(machine).motion.cornering).toEqual({
      rule: "square-corner-velocity",
      speedMmS: 5,
      cruiseRatio: 0,
    });
  });
});

describe("round trip", () => {
  test("a machine is read back as it was written", () => {
    const machine = parseMachine(tern());
    expect(parseMachine(parseJson(writeMachine(machine), "machine"))).toEqual(machine);
  });

  test("whatever channels a machine has, it is read back as it was written", () => {
    fc.assert(
      fc.property(fc.uniqueArray(channel, { maxLength: 8, selector: ({ id }) => id }), (channels) => {
        const machine = Machine.safeParse({ ...smallest, channels });
        fc.pre(machine.success);
        expect(parseMachine(JSON.parse(writeMachine(machine.data)))).toEqual(machine.data);
      }),
    );
  });

  test("a version is kept, and is no part of what the machine says", () => {
    const machine = parseMachine({ ...tern(), version: 3 });
    expect(parseMachine(JSON.parse(writeMachine(machine)))).toEqual(machine);
    expect(writeMachine(contentOf(machine))).toBe(writeMachine(parseMachine(tern())));
  });

  test.each([0, -1, 1.5, "2"])("a version %j is refused", (version) => {
    expect(() => parseMachine({ ...tern(), version })).toThrow(
      /^The machine document is not usable:\nversion: must be/,
    );
  });

  test("the order in which fields were given does not show in the text", () => {
    const { format, ...rest } = tern();
    expect(writeMachine(parseMachine({ ...rest, format }))).toBe(writeMachine(parseMachine(tern())));
  });
});

const duty = fc.double({ min: 0, max: 1, noNaN: true });
const fullScale = fc.constantFrom(1 as const, 255 as const);
const channel: fc.Arbitrary<Partial<Channel>> = fc.record(
  {
    id: fc.stringMatching(/^[a-z][a-z0-9]{0,5}(-[a-z0-9]{1,5}){0,2}$/),
    kind: fc.constant("heater" as const),
    drive: fc.oneof(
      fc.record({ by: fc.constant("fan-index" as const), index: fc.nat(99), fullScale }),
      fc.record({ by: fc.constant("pin" as const), pin: fc.nat(999), fullScale }),
      fc.record({ by: fc.constant("named-fan" as const), name: fc.stringMatching(/^[A-Za-z_][\w.-]{0,9}$/) }),
      fc.record({
        by: fc.constant("named-pin" as const),
        name: fc.stringMatching(/^[A-Za-z_][\w.-]{0,9}$/),
        fullScale: fc.constantFrom(1, 100, 255),
      }),
    ),
    idleDuty: duty,
    settleS: fc.double({ min: 0, max: 600, noNaN: true }),
    maxDutyPerS: fc.double({ min: 0.001, max: 10, noNaN: true }),
    acts: fc.oneof(
      fc.constant("queued" as const),
      fc.record({ immediate: fc.double({ min: 0, max: 60, noNaN: true }) }),
    ),
  },
  { requiredKeys: ["id", "kind", "drive"] },
);

describe("fields", () => {
  test("an unknown one is named, with the nearest spelling and what is allowed", () => {
    const [problem] = problems((machine) => {
      machine.channels[0].minduty = 0.1;
    });
    expect(problem).toMatch(
      /^channels\[0\]\.minduty: is not a known field\. Did you mean "minDuty"\? The fields here are id, kind,/,
    );
  });

  test("several unknown ones each have a line of their own", () => {
    const lines = problems((machine) => Object.assign(machine.motion.accelMmS2, { printing: 1, bed: 2 }));
    expect(lines.map((line) => line.split(":")[0])).toEqual(["motion.accelMmS2.printing", "motion.accelMmS2.bed"]);
  });

  test.each<[string, (machine: Json) => void, string]>([
    ["missing text", (m) => delete m.name, "name: is missing. Add it: a text."],
    ["missing object", (m) => delete m.motion, "motion: is missing. Add it: an object."],
    [
      "missing rule",
      (m) => delete m.motion.cornering.rule,
      'motion.cornering.rule: is missing. Add it: one of "square-corner-velocity", "junction-deviation", "axis-jerk".',
    ],
    [
      "number in quotes",
      (m) => (m.motion.maxSpeedMmS = "200"),
      'motion.maxSpeedMmS: must be a number, got "200". Remove the quotes.',
    ],
    ["null", (m) => (m.pauses = null), "pauses: must be a list, got null. Leave an optional field out instead."],
    ["infinite number", (m) => (m.motion.maxSpeedMmS = 1 / 0), "motion.maxSpeedMmS: must be a number, got Infinity."],
    [
      "not a whole number",
      (m) => (m.channels[1].drive.index = 1.5),
      "channels[1].drive.index: must be a whole number, got 1.5.",
    ],
    ["out of range", (m) => (m.channels[1].settleS = -1), "channels[1].settleS: must be between 0 and 600, got -1."],
    ["zero speed", (m) => (m.motion.maxSpeedMmS = 0), "motion.maxSpeedMmS: must be above 0 and at most 5000, got 0."],
    [
      "duty in per cent",
      (m) => (m.channels[1].maxDuty = 85),
      "channels[1].maxDuty: must be above 0 and at most 1, got 85. Give the duty as a fraction of full power, such as 0.62 for 62 %.",
    ],
    ["unknown choice", (m) => (m.motion.dwellP = "minutes"), 'motion.dwellP: must be one of "ms", "s", got "minutes".'],
    [
      "misspelt choice",
      (m) => (m.channels[1].kind = "heatr"),
      'channels[1].kind: must be one of "fan", "heater", got "heatr". Did you mean "heater"?',
    ],
    [
      "full scale",
      (m) => (m.channels[0].drive.fullScale = 100),
      "channels[0].drive.fullScale: must be one of 255, 1, got 100.",
    ],
    [
      "acts",
      (m) => (m.channels[0].acts = { immediate: -1 }),
      "channels[0].acts.immediate: must be between 0 and 60, got -1.",
    ],
    [
      "look-ahead",
      (m) => (m.motion.lookAhead = 0),
      "motion.lookAhead: must be a whole number between 1 and 100000, got 0.",
    ],
    [
      "neither of two kinds",
      (m) => (m.motion.lookAhead = "half"),
      'motion.lookAhead: must be "full" or a number of blocks from 1 to 100000, got "half".',
    ],
    [
      "other format",
      (m) => (m.format = "quenchline.profile/1"),
      'format: must be "quenchline.machine/1", got "quenchline.profile/1".',
    ],
    [
      "too many channels",
      (m) => (m.channels = Array(65).fill(m.channels[0])),
      "channels: has more than 64 entries. Shorten the list.",
    ],
  ])("a wrong one is refused with its path and what would be right: %s", (_, spoil, line) => {
    expect(problems(spoil)[0]).toBe(line);
  });

  test("all problems are reported at once, and the first one is the place", () => {
    const machine = tern();
    machine.name = "";
    machine.channels[0].maxDuty = 2;
    const { code, message, place } = refusal(() => parseMachine(machine));
    expect(code).toBe("bad-machine");
    expect(place).toEqual({ path: "name" });
    expect(message.split("\n")).toHaveLength(3);
  });

  test("after thirty problems the rest is counted", () => {
    const lines = problems((machine) => {
      machine.channels = Array.from({ length: 40 }, () => 0);
    });
    expect(lines).toHaveLength(31);
    expect(lines[30]).toBe("and 10 more");
  });

  test("a document that is no object at all is refused as a whole", () => {
    expect(problemsOf(() => parseMachine([]))).toEqual(["the document: must be an object, got a list."]);
  });
});

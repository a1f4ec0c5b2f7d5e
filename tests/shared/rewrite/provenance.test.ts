import fc from "fast-check";
import { describe, expect, test } from "vitest";
import { writeMachine } from "#shared/formats/machine.ts";
import { writeProfile } from "#shared/formats/profile.ts";
import { type Provenance, provenanceLine } from "#shared/rewrite/provenance.ts";
import { machineWith, perLayer, profileWith } from "#tests/shared/rewrite/documents.ts";
import { partLines, plain, written } from "#tests/shared/rewrite/toolpath.ts";
import {
  isProvenance,
  linesOf,
  provenanceOf,
  refusalOf,
  rowsOf,
  sha256,
  tune,
  tuneWhole,
} from "#tests/shared/rewrite/tuning.ts";

const machine = machineWith();
const profile = profileWith({ fan: 0.4, lamp: 0.2 });
const text = written(partLines({ layers: plain(3, { middle: ["M106 S200"] }) }));

describe("the provenance line", () => {
  test("says what the file was tuned with, and from which file", () => {
    const given = { engine: "1.2.3", status: "approved" } as const;
    expect(provenanceOf(tune(text, { ...machine, version: 2 }, { ...profile, version: 4 }, given))).toEqual({
      v: 1,
      profile: { name: "Seal ring", sha256: sha256(writeProfile(profile)), version: 4 },
      machine: { name: "Tern", sha256: sha256(writeMachine(machine)), version: 2 },
      original: sha256(text),
      engine: "1.2.3",
      status: "approved",
      channels: ["part-fan", "lamp"],
      withinLayer: "replace",
      lines: 3,
      seal: expect.stringMatching(/^[0-9a-f]{64}$/),
    });
  });

  test("versions that say the same have the same digest, and are tuned alike", () => {
    const [one, two] = [1, 2].map((version) => tune(text, { ...machine, version }, { ...profile, version }));
    expect(provenanceOf(one).profile.sha256).toBe(provenanceOf(two).profile.sha256);
    expect(provenanceOf(one).machine.sha256).toBe(provenanceOf(two).machine.sha256);
    expect(linesOf(one).filter((line) => !isProvenance(line))).toEqual(
      linesOf(two).filter((line) => !isProvenance(line)),
    );
  });

  test("leaves out versions that nobody keeps", () => {
    const { profile: named } = provenanceOf(tune(text, machine, profile));
    expect(Object.keys(named)).toEqual(["name", "sha256"]);
  });

  test("keeps the original's digest when the file is tuned again", () => {
    const again = tune(tune(text, machine, profile), machine, profileWith({ fan: 0.6, lamp: 0.3 }));
    expect(provenanceOf(again).original).toBe(sha256(text));
    expect(linesOf(again).filter(isProvenance)).toHaveLength(1);
  });

  test("is one comment of printable ASCII, whatever the names hold", () => {
    fc.assert(
      fc.property(fc.string({ unit: "binary" }), fc.string({ unit: "grapheme" }), (profileName, machineName) => {
        const line = provenanceLine(withNames(profileName, machineName));
        expect(line).toMatch(/^;quenchline \{[ -~]*\}$/);
        expect(JSON.parse(line.slice(12))).toEqual(withNames(profileName, machineName));
      }),
    );
  });

  test.each([
    ["a line feed", "a\nM106 P2 S255"],
    ["a carriage return", "a\rM106 P2 S255"],
    ["a line separator", "a\u2028M106 P2 S255"],
    ["a paragraph separator", "a\u2029M106 P2 S255"],
    ["a next-line character", "a\u0085M106 P2 S255"],
    ["an escape and a bell", "a\u001b[2K\u0007"],
    ["a delete character", "a\u007f"],
  ])("is one line even for a name that no document lets in: %s", (_, name) => {
    expect(provenanceLine(withNames(name, name))).toMatch(/^[ -~]+$/);
  });

  test.each([
    ["quotes and backslashes", '"},"x":"\\ \\n \\u000a'],
    ["what begins a command", ");M106 P2 S255 ;ql"],
    ["letters beyond ASCII", "Dichtung Größe 10 – 環 🌡"],
  ])("never lets a name become a command: %s", (_, name) => {
    const named = { ...profile, name };
    const tuned = tune(text, { ...machine, name }, named);
    expect(rowsOf(tuned)).toHaveLength(rowsOf(tune(text, machine, profile)).length);
    expect(provenanceOf(tuned).profile.name).toBe(name);
    expect(tune(tuned, { ...machine, name }, named)).toBe(tuned);
  });

  test("has no number and no checksum in a numbered file, and no reader takes it for a marker", () => {
    const numbered = written(partLines({ layers: plain(3) }), { numberedFrom: 1 });
    const { text: tuned, reading } = tuneWhole(numbered, machine, profile);
    const again = tuneWhole(tuned, machine, profile);
    expect(linesOf(tuned).filter(isProvenance)).toHaveLength(1);
    expect(again.reading.layers.map(({ marker }) => marker)).toEqual(reading.layers.map(({ marker }) => marker));
  });
});

function withNames(profileName: string, machineName: string): Provenance {
  return {
    v: 1,
    profile: { name: profileName, sha256: "a" },
    machine: { name: machineName, sha256: "b" },
    original: "c",
    engine: "1",
    status: "trial-only",
    channels: ["lamp"],
    withinLayer: "replace",
    lines: 1,
    seal: "d",
  };
}

describe("the seal", () => {
  const sealOf = (of: string, given = profile) => provenanceOf(tune(of, machine, given)).seal;

  test("is the same for the same tuning, from the original and from the tuned file", () => {
    expect(sealOf(tune(text, machine, profile))).toBe(sealOf(text));
  });

  test("changes with a duty and with a place", () => {
    expect(sealOf(text, profileWith({ fan: 0.4, lamp: 0.3 }))).not.toBe(sealOf(text));
    expect(sealOf(text.replace("G92 E0\n", "G92 E0\nG92 E0\n"))).not.toBe(sealOf(text));
  });

  test("holds kept raises too", () => {
    const keeps = profileWith({ fan: 0.4, lamp: 0.2 }, { withinLayer: "keep-raises" });
    expect(sealOf(text.replace("S200", "S210"), keeps)).not.toBe(sealOf(text, keeps));
  });
});

describe("a file tuned before", () => {
  const tuned = tune(text, machine, profile);
  const refused = (file: string, on = machine, by = profile) => {
    const { code, place, remedy } = refusalOf(() => tune(file, on, by));
    expect(remedy).toBe("Tune the original file instead of this one.");
    return `${code}, line ${place.line}`;
  };
  const without = (keep: (line: string) => boolean) => linesOf(tuned).filter(keep).join("");
  const line = linesOf(tuned).findIndex(isProvenance) + 1;

  test("is refused where its provenance line is missing", () => {
    expect(refused(without((row) => !isProvenance(row)))).toBe(`provenance-missing, line ${line}`);
  });

  test("is refused where it has two", () => {
    const [provenance] = linesOf(tuned).filter(isProvenance);
    expect(refused(tuned.replace(provenance, () => provenance + provenance))).toBe(`provenance-twice, line ${line}`);
  });

  test.each([
    ["cut short", (row: string) => `${row.slice(0, 60)}\n`],
    ["without the original's digest", (row: string) => row.replace(/"original":"[^"]*",/, "")],
    ["with a digest that is none", (row: string) => row.replace(/"original":"../, '"original":"zz')],
    ["without its channels", (row: string) => row.replace(/"channels":\[[^\]]*\],/, "")],
    ["with channels that are no list", (row: string) => row.replace(/"channels":\[[^\]]*\]/, '"channels":"lamp"')],
  ])("is refused where its provenance line is damaged: %s", (_, damage) => {
    const damaged = linesOf(tuned).map((row) => (isProvenance(row) ? damage(row) : row));
    expect(refused(damaged.join(""))).toBe(`provenance-broken, line ${line}`);
  });

  test("is refused where it drove channels that the profile does not drive", () => {
    expect(refused(tuned, machine, profileWith({ fan: 0.4 }))).toBe(`tuned-for-other-channels, line ${line}`);
    const { message } = refusalOf(() => tune(tuned, machine, profileWith({ fan: 0.4 })));
    expect(message).toContain("lamp");
  });

  test("is refused where it was tuned for a machine with other outputs", () => {
    const elsewhere = machineWith({ lamp: { drive: { by: "fan-index", index: 3, fullScale: 255 } } });
    expect(refused(tuned, elsewhere)).toBe(`tuned-for-other-machine, line ${line + 2}`);
  });

  test("may be tuned by a profile that drives more", () => {
    const fanOnly = tune(text, machine, profileWith({ fan: 0.4 }));
    expect(tune(fanOnly, machine, profile)).toBe(tuned);
  });

  describe("by a profile that keeps raises", () => {
    const keeps = profileWith({ fan: 0.4, lamp: 0.2 }, { withinLayer: "keep-raises" });

    test("may be tuned again with the same documents", () => {
      const once = tune(text, machine, keeps);
      expect(tune(once, machine, keeps)).toBe(once);
    });

    test("is refused with other documents: the raises that they would keep may be gone", () => {
      expect(refused(tuned, machine, keeps)).toBe(`raises-lost, line ${line}`);
      const other = profileWith({ fan: 0.2, lamp: 0.2 }, { withinLayer: "keep-raises" });
      expect(refused(tune(text, machine, keeps), machine, other)).toBe(`raises-lost, line ${line}`);
      expect(refused(tune(text, machine, keeps), machineWith({ name: "Gannet" }), keeps)).toBe(
        `raises-lost, line ${line}`,
      );
    });

    test("may be tuned where the earlier tuning let the fan alone", () => {
      const lampOnly = tune(text, machine, profileWith({ lamp: perLayer(0.1, 0.2) }));
      expect(tune(lampOnly, machine, keeps)).toBe(tune(text, machine, keeps));
    });
  });
});

test("a comment of the user's that looks like ours on a line that is no command of ours stays", () => {
  const lines = ["M117 warm ;ql", "G92 E0 ;ql", "; ;ql", ";quenchline", "; quenchline {}"];
  const tuned = tune(written(partLines({ layers: [{ middle: lines }] })), machine, profile);
  for (const line of lines) expect(rowsOf(tuned)).toContain(line);
});

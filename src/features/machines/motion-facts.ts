import type { Machine } from "#shared/formats/machine.ts";
import { choiceText, named, wordsOf } from "#src/lib/document-words.ts";
import { fixedText } from "#src/lib/number-text.ts";
import type { Fact } from "#src/ui/facts.tsx";

type Motion = Machine["motion"];

/** A machine's motion in two columns: how fast it may go, and how it reads a file. */
export function motionFacts(motion: Motion): [limits: Fact[], reading: Fact[]] {
  const { accelMmS2, lookAhead, firmwareRetract } = motion;
  return [
    [
      measured("maxSpeedMmS", motion.maxSpeedMmS),
      ...(["print", "travel", "retract"] as const).map((kind) => measured(`accelMmS2.${kind}`, accelMmS2[kind])),
      ...axisFacts(motion),
      said("extruderLimits", choiceText(motion.extruderLimits)),
      ...cornerFacts(motion.cornering),
    ],
    [
      said("lookAhead", lookAhead === "full" ? choiceText("full") : `${lookAhead} blocks`),
      said("stopAtExtrudeOnly", yesNo(motion.stopAtExtrudeOnly)),
      said("honourFileLimits", yesNo(motion.honourFileLimits)),
      said("axisModeSetsExtruder", yesNo(motion.axisModeSetsExtruder)),
      said("dwellP", motion.dwellP),
      measured("initialSpeedMmS", motion.initialSpeedMmS),
      measured("arcSegmentMm", motion.arcSegmentMm),
      measured("firmwareRetract.lengthMm", firmwareRetract.lengthMm),
      measured("firmwareRetract.speedMmS", firmwareRetract.speedMmS),
      { ...measured("filamentDiameterMm", 0), value: fixedText(motion.filamentDiameterMm, 2) },
    ],
  ];
}

function axisFacts({ axes }: Motion): Fact[] {
  return (["x", "y", "z", "e"] as const).flatMap((axis) =>
    (["maxSpeedMmS", "maxAccelMmS2"] as const).flatMap((field) => {
      const value = axes[axis]?.[field];
      return value === undefined ? [] : measured(`axes.${axis}.${field}`, value);
    }),
  );
}

function cornerFacts(cornering: Motion["cornering"]): Fact[] {
  const rule = said("cornering.rule", choiceText(cornering.rule));
  switch (cornering.rule) {
    case "square-corner-velocity": {
      const { speedMmS, cruiseRatio, extruderStepMmS: step } = cornering;
      return [
        rule,
        measured("cornering.speedMmS", speedMmS),
        { ...measured("cornering.cruiseRatio", cruiseRatio), unit: undefined },
        step === undefined
          ? said("cornering.extruderStepMmS", "no limit")
          : measured("cornering.extruderStepMmS", step),
      ];
    }
    case "junction-deviation":
      return [rule, measured("cornering.deviationMm", cornering.deviationMm)];
    case "axis-jerk":
      return [
        rule,
        ...(["x", "y", "z", "e"] as const).map((axis) =>
          measured(`cornering.jerkMmS.${axis}`, cornering.jerkMmS[axis]),
        ),
      ];
  }
}

function measured(field: string, value: number): Fact {
  return { ...named(`motion.${field}`), value };
}

const said = (field: string, value: string): Fact => ({ label: wordsOf(`motion.${field}`), value });
const yesNo = (value: boolean): string => (value ? "yes" : "no");

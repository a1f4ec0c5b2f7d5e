/** The state a layer is meant to be in, as profiles name it. */
export type TargetState = "amorphous" | "semi-crystalline" | "none";

export const STATE_NAMES: Record<TargetState, string> = {
  amorphous: "Amorphous",
  "semi-crystalline": "Semi-crystalline",
  none: "No target",
};

/** The state a layer is expected to have: undecided where it is neither the one nor the other. */
export type PredictedState = "amorphous" | "semi-crystalline" | "undecided";

export const PREDICTED_NAMES: Record<PredictedState, string> = {
  amorphous: "Amorphous",
  "semi-crystalline": "Semi-crystalline",
  undecided: "Undecided",
};

/**
 * CSS backgrounds for the states, the same stipple, lamellae and hatch as the layer log draws: what they say must not
 * rest on colour alone.
 */
export const STATE_FILLS: Record<TargetState | PredictedState, { background: string; backgroundSize?: string }> = {
  amorphous: {
    background:
      "radial-gradient(circle at 1.5px 1.5px, var(--amber-hatch) 0.6px, transparent 0.9px), radial-gradient(circle at 5.5px 5.5px, var(--amber-hatch) 0.6px, transparent 0.9px), color-mix(in srgb, var(--amber) 50%, transparent)",
    backgroundSize: "8px 8px",
  },
  "semi-crystalline": {
    background:
      "repeating-linear-gradient(to bottom, transparent 0 1px, color-mix(in srgb, var(--bone-hatch) 55%, transparent) 1px 2px, transparent 2px 4px), var(--bone)",
  },
  undecided: {
    background:
      "repeating-linear-gradient(135deg, color-mix(in srgb, var(--amber) 55%, transparent) 0 2.83px, var(--bone) 2.83px 5.66px)",
  },
  none: {
    background:
      "repeating-linear-gradient(135deg, transparent 0 4.66px, color-mix(in srgb, var(--rule) 70%, transparent) 4.66px 5.66px)",
  },
};

/** The state a layer is meant to be in, as profiles name it. */
export type TargetState = "amorphous" | "semi-crystalline" | "none";

export const STATE_NAMES: Record<TargetState, string> = {
  amorphous: "Amorphous",
  "semi-crystalline": "Semi-crystalline",
  none: "No target",
};

/**
 * CSS backgrounds for the states, the same stipple, lamellae and hatch as the layer log draws: what they say must not
 * rest on colour alone.
 */
export const STATE_FILLS: Record<TargetState, { background: string; backgroundSize?: string }> = {
  amorphous: {
    background:
      "radial-gradient(circle at 1.5px 1.5px, var(--amber-ink) 0.6px, transparent 0.9px), radial-gradient(circle at 5.5px 5.5px, var(--amber-ink) 0.6px, transparent 0.9px), color-mix(in srgb, var(--amber) 50%, transparent)",
    backgroundSize: "8px 8px",
  },
  "semi-crystalline": {
    background:
      "repeating-linear-gradient(to bottom, transparent 0 1px, color-mix(in srgb, var(--bone-edge) 55%, transparent) 1px 2px, transparent 2px 4px), var(--bone)",
  },
  none: {
    background:
      "repeating-linear-gradient(135deg, transparent 0 4.66px, color-mix(in srgb, var(--rule) 70%, transparent) 4.66px 5.66px)",
  },
};

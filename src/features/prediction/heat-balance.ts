import type { HeatBalance } from "#shared/prediction/heat-balance.ts";

/** One way in which heat comes or goes. */
export interface HeatFlow {
  label: string;
  joules: number;
  /** of all that comes, or of all that goes, 0-1 */
  share: number;
}

/**
 * A layer's heat as two lists that add up to the same. Whatever runs the other way than its name says, such as air that
 * warms a cold layer, stands on the other side.
 */
export function heatFlows(balance: HeatBalance): { from: HeatFlow[]; to: HeatFlow[] } {
  const signed = [
    { joules: balance.lostJ, from: "its own cooling", to: "warming the layer itself" },
    { joules: balance.fromLampJ, from: "lamp", to: "lamp" },
    { joules: balance.fromCrystallisingJ, from: "crystallising", to: "melting" },
    { joules: -balance.toAirJ, from: "air", to: "air" },
    { joules: -balance.radiatedJ, from: "warmer walls", to: "radiated" },
    { joules: -balance.toBelowJ, from: "the layers below", to: "the layers below" },
  ];
  const side = (sign: 1 | -1, name: "from" | "to"): HeatFlow[] => {
    const flows = signed.filter(({ joules }) => sign * joules > 0);
    const sum = flows.reduce((total, { joules }) => total + sign * joules, 0);
    return flows
      .map((flow) => ({ label: flow[name], joules: sign * flow.joules, share: (sign * flow.joules) / sum }))
      .sort((a, b) => b.joules - a.joules);
  };
  return { from: side(1, "from"), to: side(-1, "to") };
}

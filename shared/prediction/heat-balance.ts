import { startMarch } from "#shared/prediction/march.ts";
import type { Model } from "#shared/prediction/model.ts";
import type { ChannelDuties } from "#shared/thermal/forcing.ts";

/** Where the heat of one layer comes from and goes to while it is the top, J. */
export interface HeatBalance {
  /** what it gives up between the nozzle's temperature and that at which it is covered */
  lostJ: number;
  fromLampJ: number;
  fromCrystallisingJ: number;
  toAirJ: number;
  radiatedJ: number;
  /** to the layer below, or the bed */
  toBelowJ: number;
  /** how long it was the top, s */
  timeS: number;
}

/**
 * The heat of one layer over its own time and waits: lost + lamp + crystallising = air + radiated + below.
 *
 * @param position of the layer in print order, from 0
 */
export function heatBalance(model: Model, duties: readonly ChannelDuties[], position: number): HeatBalance {
  const march = startMarch(model, duties);
  while (march.next < position) march.layer();
  const balance = { lostJ: 0, fromLampJ: 0, fromCrystallisingJ: 0, toAirJ: 0, radiatedJ: 0, toBelowJ: 0, timeS: 0 };
  march.layer((dtS, column, warmedC, crystallisedJ) => {
    const top = column.count - 1;
    balance.timeS += dtS;
    balance.lostJ -= column.capacityJK[top] * warmedC;
    balance.fromLampJ += dtS * (column.topM2[top] * column.topFluxWM2 + column.sideM2[top] * column.sideFluxWM2);
    balance.fromCrystallisingJ += crystallisedJ;
    balance.toAirJ += column.topToAirJ;
    balance.radiatedJ += column.topRadiatedJ;
    balance.toBelowJ -= column.topFromBelowJ;
  });
  return balance;
}

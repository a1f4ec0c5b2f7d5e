import type { Machine } from "#shared/formats/machine.ts";
import type { PlanDocument } from "#shared/formats/plan.ts";
import type { Polymer } from "#shared/formats/polymer.ts";
import type { PredictionDocument } from "#shared/formats/prediction.ts";
import type { Profile } from "#shared/formats/profile.ts";
import type { LayerReading } from "#shared/formats/reading.ts";
import type { HeatBalance } from "#shared/prediction/heat-balance.ts";
import type { LeverMapLayer } from "#shared/prediction/lever-map.ts";

/** What stays the same while a profile is edited; it is handed over once. */
export interface Part {
  layers: readonly LayerReading[];
  machine: Machine;
  polymer: Polymer;
}

/** Plans the part with a profile, unless a plan is given, and predicts it. */
export interface ForecastAsk {
  kind: "forecast";
  profile: Profile;
  plan?: PlanDocument;
  /** worst cases too: three times the work */
  band: boolean;
}

/** Where the heat of one layer of the latest forecast goes. */
export interface BalanceAsk {
  kind: "balance";
  /** position in print order */
  position: number;
}

/** What fan and lamp do to a layer like this one, over a grid of duties. */
export interface LeversAsk {
  kind: "levers";
  layer: LeverMapLayer;
  fan: string;
  lamp: string;
  fanDuties: number[];
  lampDuties: number[];
  /** duties of the channels that stay as they are */
  others: Record<string, number>;
}

export type Ask = ForecastAsk | BalanceAsk | LeversAsk;

export interface Forecast {
  /** of a profile that holds, the plan that was solved; any other is planned by the page itself, at once */
  solved?: PlanDocument;
  prediction: PredictionDocument;
  /** without the way to the worker and back */
  tookMs: number;
}

export interface Levers {
  fanDuties: number[];
  lampDuties: number[];
  /** °C, [lamp * fans + fan] */
  interlayerC: ArrayLike<number>;
}

export interface Results {
  forecast: Forecast;
  balance: HeatBalance;
  levers: Levers;
}

/** To the worker: with `part` where it is another one than before. */
export interface Request {
  part?: Part;
  ask: Ask;
}

/** From the worker, in the order of the requests. A refusal is for a person to put right; a fault is ours. */
export type Reply =
  | { result: Results[keyof Results] }
  | { refusal: { code: string; message: string; remedy: string; place: { path?: string; layer?: number } } }
  | { fault: string };

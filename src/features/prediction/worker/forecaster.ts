import { holds } from "#shared/formats/profile.ts";
import { channelDuties } from "#shared/plan/channel-duties.ts";
import type { Plan } from "#shared/plan/plan.ts";
import { planDuties } from "#shared/plan/plan-duties.ts";
import { predictPlan } from "#shared/plan/predict-plan.ts";
import { heatBalance } from "#shared/prediction/heat-balance.ts";
import { leverMap } from "#shared/prediction/lever-map.ts";
import { makeModel } from "#shared/prediction/model.ts";
import { Refusal } from "#shared/refusal.ts";
import type {
  Ask,
  BalanceAsk,
  Forecast,
  ForecastAsk,
  Levers,
  LeversAsk,
  Part,
  Reply,
  Request,
  Results,
} from "#src/features/prediction/worker/messages.ts";

/** Answers requests one by one, and remembers the part and what was planned last. */
export class Forecaster {
  private part: Part | undefined;
  private planned: { ask: ForecastAsk; plan: Plan } | undefined;

  answer({ part, ask }: Request): Reply {
    if (part) {
      this.part = part;
      this.planned = undefined;
    }
    try {
      return { result: this.resultOf(ask) };
    } catch (error) {
      if (!(error instanceof Refusal)) return { fault: error instanceof Error ? error.message : String(error) };
      const { code, message, remedy, place } = error;
      return { refusal: { code, message, remedy, place } };
    }
  }

  private resultOf(ask: Ask): Results[keyof Results] {
    if (!this.part) throw new Error("asked before there was a part");
    switch (ask.kind) {
      case "forecast":
        return this.forecast(this.part, ask);
      case "balance":
        return this.balance(this.part, ask);
      case "levers":
        return levers(this.part, ask);
    }
  }

  private forecast(part: Part, ask: ForecastAsk): Forecast {
    const beginMs = performance.now();
    // Only the duties of a plan that stands already are needed here; its advice stays with the page.
    const plan: Plan = ask.plan ? { ...ask.plan, advice: [] } : planDuties({ ...part, profile: ask.profile });
    this.planned = { ask, plan };
    const prediction = predictPlan({ ...part, profile: ask.profile, plan, band: ask.band });
    const tookMs = performance.now() - beginMs;
    return ask.plan || !holds(ask.profile) ? { prediction, tookMs } : { solved: plan, prediction, tookMs };
  }

  private balance(part: Part, { position }: BalanceAsk): Results["balance"] {
    if (!this.planned) throw new Error("asked before there was a forecast");
    const { ask, plan } = this.planned;
    const duties = channelDuties(plan, part.layers, part.machine, ask.profile);
    return heatBalance(makeModel(part), duties, position);
  }
}

function levers({ machine, polymer }: Part, ask: LeversAsk): Levers {
  const { kind: _, ...asked } = ask;
  const { interlayerC } = leverMap({ machine, polymer, ...asked });
  return { fanDuties: ask.fanDuties, lampDuties: ask.lampDuties, interlayerC };
}

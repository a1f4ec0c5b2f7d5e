import { useEffect, useMemo, useRef, useState } from "react";
import type { PlanDocument } from "#shared/formats/plan.ts";
import type { Profile } from "#shared/formats/profile.ts";
import { type Answer, ForecastClient } from "#src/features/prediction/forecast-client.ts";
import { startWorker } from "#src/features/prediction/start-worker.ts";
import type { Forecast, Part, Reply } from "#src/features/prediction/worker/messages.ts";

/** Why there is no forecast for what is on the table. */
export type Obstacle = Exclude<Reply, { result: unknown }>;

export interface LiveForecast {
  /** the latest forecast that could be made; undefined where none was yet */
  forecast: Forecast | undefined;
  /** it belongs to an older draft: the new one is on its way, or can't be made */
  pale: boolean;
  obstacle: Obstacle | undefined;
  /** whom to ask about single layers of this forecast */
  client: ForecastClient;
}

/** Worst cases cost three times as much: where they take longer than this, they wait until the hand rests. */
const QUICK_MS = 150;
const REST_MS = 250;

interface Question {
  part: Part;
  profile: Profile;
  plan: PlanDocument | undefined;
}

interface Shown {
  /** which question the forecast answers */
  question?: Question;
  forecast?: Forecast;
  obstacle?: Obstacle;
}

/**
 * The forecast of a part with a profile, made anew in a worker whenever either changes. While a curve point is dragged
 * the answers to older questions are shown as they come.
 *
 * @param part undefined while there is no polymer card to predict with
 * @param profile undefined while the draft has problems
 * @param plan a plan that stands already; left out: the profile's
 */
export function useForecast(
  part: Part | undefined,
  profile: Profile | undefined,
  plan?: PlanDocument,
  makeWorker = startWorker,
): LiveForecast {
  const [client] = useState(() => new ForecastClient(makeWorker));
  useEffect(() => () => client.close(), [client]);
  const [shown, setShown] = useState<Shown>({});
  const bandMs = useRef(0);
  const question = useMemo(() => part && profile && { part, profile, plan }, [part, profile, plan]);

  useEffect(() => {
    if (!question) return;
    const ask = async (band: boolean) => {
      const answer = await client.ask(question.part, { kind: "forecast", ...asked(question), band });
      if (band && answer && "result" in answer) bandMs.current = answer.result.tookMs;
      if (answer) setShown((old) => shownOf(answer, question, old));
    };
    const quick = bandMs.current <= QUICK_MS;
    void ask(quick);
    if (quick) return;
    const timer = setTimeout(() => void ask(true), REST_MS);
    return () => clearTimeout(timer);
  }, [client, question]);

  return { forecast: shown.forecast, pale: shown.question !== question, obstacle: shown.obstacle, client };
}

const asked = ({ profile, plan }: Question) => (plan ? { profile, plan } : { profile });

function shownOf(answer: Exclude<Answer<"forecast">, undefined>, question: Question, old: Shown): Shown {
  return "result" in answer ? { question, forecast: answer.result } : { ...old, obstacle: answer };
}

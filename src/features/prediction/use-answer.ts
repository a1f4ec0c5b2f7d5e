import { useEffect, useState } from "react";
import type { Answer, ForecastClient } from "#src/features/prediction/forecast-client.ts";
import type { Ask, Part } from "#src/features/prediction/worker/messages.ts";

type Kind = "balance" | "levers";

/**
 * The worker's answer to a question about one layer; undefined until it is there.
 *
 * @param ask undefined: nothing is asked. Another object is another question
 */
export function useAnswer<K extends Kind>(
  client: ForecastClient,
  part: Part | undefined,
  ask: Extract<Ask, { kind: K }> | undefined,
): Answer<K> {
  const [said, setSaid] = useState<{ ask: unknown; answer: Answer<K> }>();
  useEffect(() => {
    if (!part || !ask) return;
    let gone = false;
    client.ask<K>(part, ask).then((answer) => {
      if (!gone && answer) setSaid({ ask, answer });
    });
    return () => {
      gone = true;
    };
  }, [client, part, ask]);
  return said && said.ask === ask ? said.answer : undefined;
}

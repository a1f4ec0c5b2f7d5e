import { useMemo } from "react";
import type { ForecastClient } from "#src/features/prediction/forecast-client.ts";
import { type HeatFlow, heatFlows } from "#src/features/prediction/heat-balance.ts";
import { useAnswer } from "#src/features/prediction/use-answer.ts";
import type { BalanceAsk, Forecast, Part } from "#src/features/prediction/worker/messages.ts";
import { fixedText } from "#src/lib/number-text.ts";

interface Props {
  client: ForecastClient;
  part: Part;
  /** the forecast it is asked about; undefined while that is on its way */
  forecast: Forecast | undefined;
  position: number;
}

/** Where the heat of one layer comes from and goes to, from its first bead until the next layer. */
export function BalancePanel({ client, part, forecast, position }: Props) {
  const ask = useMemo((): BalanceAsk | undefined => forecast && { kind: "balance", position }, [forecast, position]);
  const answer = useAnswer(client, part, ask);
  const balance = answer && "result" in answer ? answer.result : undefined;
  const flows = balance && heatFlows(balance);
  return (
    <section aria-label="Heat of the layer" className="text-small" aria-busy={!flows}>
      <h4 className="flex items-baseline justify-between border-b border-ink pb-1 font-semibold">
        <span>Heat of the layer</span>
        <span className="font-mono font-normal text-soft">{balance ? `${fixedText(balance.timeS, 1)} s` : ""}</span>
      </h4>
      {flows ? (
        <>
          <Flows side="from" flows={flows.from} />
          <Flows side="to" flows={flows.to} />
        </>
      ) : (
        <p className="py-1 text-soft">{answer ? "It could not be computed." : "Computing …"}</p>
      )}
    </section>
  );
}

function Flows({ side, flows }: { side: "from" | "to"; flows: readonly HeatFlow[] }) {
  const decimals = Math.max(...flows.map(({ joules }) => joules)) < 10 ? 2 : 1;
  return (
    <dl className="grid grid-cols-[2.5rem_minmax(0,1fr)_auto_3.5rem] gap-x-2">
      {flows.map(({ label, joules, share }, i) => (
        <div key={label} className="relative col-span-4 grid grid-cols-subgrid border-b border-hair py-1">
          <dt className="contents">
            <span className="text-soft">{i === 0 ? side : ""}</span>
            <span>{label}</span>
          </dt>
          <dd className="contents font-mono">
            <span className="text-right">
              {fixedText(joules, decimals)} <span className="text-soft">J</span>
            </span>
            <span className="text-right">
              {fixedText(share * 100, 0)} <span className="text-soft">%</span>
            </span>
          </dd>
          {/* The share once more as a length. */}
          <span
            aria-hidden
            className={`absolute bottom-[-1px] left-0 h-0.5 ${side === "from" ? "bg-heat" : "bg-cool"}`}
            style={{ width: `${share * 100}%` }}
          />
        </div>
      ))}
    </dl>
  );
}

import type { Polymer } from "#shared/formats/polymer.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { Table } from "#src/ui/table.tsx";
import { Unverified } from "#src/ui/unverified.tsx";

type Given = NonNullable<NonNullable<Polymer["crystallinity"]>["halfTimes"]>;

/** Isothermal half-times of the team's own. They go before the rate that is written down on the card. */
export function HalfTimes({ halfTimes: { points, source, confidence } }: { halfTimes: Given }) {
  const number = (value: number, decimals: number) => {
    const text = fixedText(value, decimals);
    return confidence === "unverified" ? <Unverified word={false}>{text}</Unverified> : text;
  };
  return (
    <div className="mt-5 max-w-xl">
      <h3 className="font-semibold">Half-times</h3>
      <p className="text-small text-soft">
        The rate is fitted to them; the fastest rate, its temperature and the half-width above stay aside. {source}.{" "}
        Confidence: {confidence}.
      </p>
      <Table
        label="Half-times"
        rows={points}
        keyOf={([tempC]) => tempC}
        columns={[
          { head: "Temperature", unit: "°C", number: true, cell: ([tempC]) => number(tempC, 1) },
          { head: "Half-time", unit: "s", number: true, cell: ([, timeS]) => number(timeS, 2) },
        ]}
      />
    </div>
  );
}

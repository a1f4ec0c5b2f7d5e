import type { Profile, Rule, Zone } from "#shared/formats/profile.ts";
import { bandText, leadText, limitText, patternText, ruleText } from "#src/features/profiles/rule-text.ts";
import { TargetBand, TargetMark } from "#src/features/profiles/target-mark.tsx";
import { choiceText, named, wordsOf } from "#src/lib/document-words.ts";
import { FactList } from "#src/ui/facts.tsx";
import { Section } from "#src/ui/section.tsx";

/** What a profile says. Zones stand as they lie in the part: the last one on top. */
export function ProfileSheet({ profile }: { profile: Profile }) {
  const { zones, polymer, bedLayers, limits, lead, withinLayer, margins = {} } = profile;
  const driven = [
    ...new Set(zones.flatMap(({ cooling, heating }) => [...cooling, ...heating].map(({ channel }) => channel))),
  ];
  const overrides = Object.entries(margins).filter(([, value]) => value !== undefined);
  return (
    <>
      <Section title="Zones" note="the top of the part is up">
        <ol className="flex flex-col-reverse border-y border-ink">
          {zones.map((zone) => (
            <ZoneRow key={`${zone.name} ${zone.from}`} zone={zone} />
          ))}
        </ol>
      </Section>
      <Section title="The whole profile">
        <div className="max-w-3xl">
          <FactList
            facts={[
              { label: "Polymer", value: polymer },
              { label: "Bed layers", value: bedLayers.count === 0 ? "none" : bedText(bedLayers) },
              ...driven.flatMap((id) => [
                { label: `Limits of ${id}`, value: limitText(limits[id] ?? {}) || "the machine's" },
                { label: `Ahead, ${id}`, value: leadText(lead[id]) },
              ]),
              {
                label: wordsOf("withinLayer"),
                value: choiceText(withinLayer),
              },
              ...overrides.map(([name, value]) => ({ ...named(`margins.${name}`), value: String(value) })),
            ]}
          />
        </div>
      </Section>
    </>
  );
}

function ZoneRow({ zone }: { zone: Zone }) {
  const { name, target, pattern, rampMm, cooling, heating } = zone;
  return (
    <li className="flex gap-4 border-b border-hair first:border-b-0">
      <TargetBand target={target} />
      <div className="grid grow gap-x-8 gap-y-1 py-3 @3xl:grid-cols-[14rem_minmax(0,1fr)]">
        <div>
          <h3 className="font-semibold">{name}</h3>
          <p className="font-mono text-small">{bandText(zone)}</p>
          {pattern ? <p>{patternText(pattern)}</p> : <TargetMark target={target} />}
          {rampMm > 0 && <p className="text-small text-soft">ramps in over {rampMm} mm</p>}
        </div>
        <dl className="min-w-0">
          {cooling.map((rule) => (
            <RuleRow key={`c ${rule.channel}`} side="Cooling" rule={rule} />
          ))}
          {heating.map((rule) => (
            <RuleRow key={`h ${rule.channel}`} side="Heating" rule={rule} />
          ))}
        </dl>
      </div>
    </li>
  );
}

function RuleRow({ side, rule }: { side: "Cooling" | "Heating"; rule: Rule }) {
  return (
    <div className="grid gap-x-4 @xl:grid-cols-[11rem_minmax(0,1fr)]">
      <dt>
        <span className={side === "Cooling" ? "font-semibold text-cool-ink" : "font-semibold text-heat-ink"}>
          {side}
        </span>{" "}
        <code className="font-mono text-small">{rule.channel}</code>
      </dt>
      <dd className="font-mono text-small leading-6">{ruleText(rule)}</dd>
    </div>
  );
}

function bedText({ count, duty }: Profile["bedLayers"]): string {
  const duties = Object.entries(duty).map(([id, value]) => `${id} ${value.toFixed(2)}`);
  return [`the first ${count}`, ...duties].join(", ");
}

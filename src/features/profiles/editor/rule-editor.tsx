import type { CurveOver, CurvePoint, Rule } from "#shared/formats/profile.ts";
import { GENTLE_FAN } from "#shared/plan/hold/lever.ts";
import { CURVE_GRIDS, curveDuty, OVER_NAMES, overRange } from "#src/features/profiles/editor/curve-edits.ts";
import { CurvePlot } from "#src/features/profiles/editor/curve-plot.tsx";
import { CurveTable } from "#src/features/profiles/editor/curve-table.tsx";
import type { EditedChannel } from "#src/features/profiles/editor/driven.ts";
import type { DocumentProblems } from "#src/lib/document-problems.ts";
import { SelectField } from "#src/ui/field.tsx";
import { NumberField, problemText } from "#src/ui/number-field.tsx";

/** What curves are read at, for every layer of the part: shown under the plots. */
export type RuleRugs = Partial<Record<CurveOver, ArrayLike<number>>>;

export interface RuleEditorProps {
  rule: Rule;
  channel: EditedChannel;
  zoneName: string;
  /** e.g. `zones[0].cooling[0]` */
  path: string;
  problems: DocumentProblems;
  /** range of heights of the zone, mm */
  heightsMm: readonly [number, number];
  rugs: RuleRugs;
  /** the pinned layer's values, by quantity */
  at: Partial<Record<CurveOver, number>>;
  leastDuty: number;
  mostDuty: number;
  onChange(rule: Rule, gesture?: string): void;
  onRest(): void;
}

/** One channel's rule in one zone: a fixed duty, a curve on a plot and in a table, or solved from the zone's target. */
export function RuleEditor(props: RuleEditorProps) {
  const { rule, channel, zoneName, path, problems, heightsMm, rugs, at, leastDuty, mostDuty, onChange, onRest } = props;
  const fan = channel.side === "cooling";
  const kind = fan ? "fan" : "heater";
  const misnamed = problems.at(`${path}.channel`);
  const wrong = problemText(`This ${kind}`, problems.at(path)) ?? (misnamed && problemText(`${channel.id}:`, misnamed));
  return (
    <fieldset className="flex flex-col gap-3 border-t border-hair pt-3">
      <legend className="sr-only">{`${channel.id} in zone ${zoneName}`}</legend>
      <p className="flex items-baseline gap-2">
        <span aria-hidden="true" className={fan ? "w-4 border-t-2 border-cool" : "w-4 border-t-2 border-heat"} />
        <span className="font-semibold">{fan ? "Cooling" : "Heating"}</span>
        <code className="font-mono text-small text-soft">{channel.id}</code>
      </p>
      {wrong && <p className="border-l-2 border-ink pl-2 text-small font-semibold">{wrong}</p>}
      <div className="grid gap-3 sm:grid-cols-2">
        <SelectField
          label="Rule"
          value={rule.rule}
          error={problemText("Rule", problems.at(`${path}.rule`))}
          onChange={({ target }) => onChange(asRule(rule, target.value as Rule["rule"]))}
        >
          <option value="fixed">fixed duty</option>
          <option value="curve">curve</option>
          <option value="hold">hold the target</option>
        </SelectField>
        {rule.rule === "fixed" && (
          <NumberField
            label="Duty"
            unit="0–1"
            step={0.01}
            value={rule.duty}
            problem={problems.at(`${path}.duty`)}
            onChange={(duty) => onChange({ ...rule, duty: duty as number }, `${path} duty`)}
          />
        )}
        {rule.rule === "hold" && (
          <NumberField
            label="Base duty"
            unit="0–1"
            hint={
              fan
                ? `its gentle baseline; empty: ${Math.max(GENTLE_FAN, leastDuty).toFixed(2)}`
                : "never below it while held; empty: may be off"
            }
            step={0.01}
            value={rule.baseDuty}
            problem={problems.at(`${path}.baseDuty`)}
            onChange={(baseDuty) => onChange(holding(rule.channel, baseDuty), `${path} baseDuty`)}
          />
        )}
        {rule.rule === "curve" && (
          <SelectField
            label="Read over"
            value={rule.over}
            onChange={({ target }) => {
              const over = target.value as CurveOver;
              onChange({
                ...rule,
                over,
                points: overRange(rule.points, usualRange(over, heightsMm, rugs), CURVE_GRIDS[over]),
              });
            }}
          >
            {Object.entries(OVER_NAMES).map(([over, { name, unit }]) => (
              <option key={over} value={over}>{`${name}, ${unit}`}</option>
            ))}
          </SelectField>
        )}
      </div>
      {rule.rule === "hold" && (
        <p className="text-small text-soft">
          {`The duty of each layer is solved from the zone's target with the predicted temperatures: an estimate, to be confirmed by a trial.`}
        </p>
      )}
      {rule.rule === "curve" && (
        <div className="grid gap-x-6 gap-y-3 @2xl:grid-cols-[minmax(0,26rem)_auto]">
          <CurvePlot
            label={`Duty of ${channel.id} over ${OVER_NAMES[rule.over].name}, zone ${zoneName}`}
            points={rule.points}
            grid={CURVE_GRIDS[rule.over]}
            quantity={OVER_NAMES[rule.over]}
            tone={fan ? "cool" : "heat"}
            rug={rugs[rule.over]}
            at={at[rule.over]}
            within={rule.over === "height" ? heightsMm : undefined}
            least={leastDuty}
            most={mostDuty}
            onChange={(points, gesture) => onChange({ ...rule, points }, gesture && `${path} ${gesture}`)}
            onRest={onRest}
          />
          <div>
            {problems.at(`${path}.points`) && (
              <p className="border-l-2 border-ink pl-2 text-small font-semibold">
                {problemText("The curve", problems.at(`${path}.points`))}
              </p>
            )}
            <CurveTable
              points={rule.points}
              grid={CURVE_GRIDS[rule.over]}
              quantity={OVER_NAMES[rule.over]}
              problems={problems}
              path={path}
              onChange={(points, gesture) => onChange({ ...rule, points }, gesture && `${path} ${gesture}`)}
            />
          </div>
        </div>
      )}
    </fieldset>
  );
}

/** The same channel under another kind of rule, beginning from the duty it had. */
export function asRule(rule: Rule, kind: Rule["rule"]): Rule {
  const { channel } = rule;
  if (kind === rule.rule) return rule;
  const duty = usualDuty(rule);
  switch (kind) {
    case "fixed":
      return { channel, rule: "fixed", duty };
    case "curve":
      return { channel, rule: "curve", over: "layer-time", points: [5, 20, 60].map((x) => [x, duty]) };
    case "hold":
      return holding(channel, duty > 0 ? duty : undefined);
  }
}

/** A base duty that is not given is left out of the document. */
function holding(channel: string, baseDuty: number | undefined): Rule {
  return baseDuty === undefined ? { channel, rule: "hold" } : { channel, rule: "hold", baseDuty };
}

/** The duty that a rule gives, or that of the middle of its curve. */
function usualDuty(rule: Rule): number {
  const duty =
    rule.rule === "fixed"
      ? rule.duty
      : rule.rule === "hold"
        ? (rule.baseDuty ?? 0)
        : rule.points.length > 0
          ? curveDuty(rule.points, middleX(rule.points))
          : 0;
  return Number.isFinite(duty) ? Number(duty.toFixed(2)) : 0;
}

function middleX(points: readonly CurvePoint[]): number {
  return (points[0][0] + points[points.length - 1][0]) / 2;
}

/** Where a curve over this quantity is likely to be wanted: where the part's layers lie. */
function usualRange(over: CurveOver, heightsMm: readonly [number, number], rugs: RuleRugs): readonly [number, number] {
  if (over === "height") return heightsMm;
  const values = Array.from(rugs[over] ?? []).filter((value) => value > 0);
  if (values.length === 0) return over === "layer-time" ? [5, 60] : [100, 3000];
  const [least, most] = [values.reduce((a, b) => Math.min(a, b)), values.reduce((a, b) => Math.max(a, b))];
  return most > least * 1.2 ? [least, most] : [least * 0.7, least * 1.5];
}

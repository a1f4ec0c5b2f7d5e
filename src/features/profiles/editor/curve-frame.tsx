import { PLOT } from "#src/features/profiles/editor/curve-view.ts";
import { marksOf, type Scale, shareOf } from "#src/lib/scale.ts";

const { width: WIDTH, height: HEIGHT, left: LEFT, top: TOP, right: RIGHT } = PLOT;
const DUTY: Scale = { kind: "linear", from: 0, to: 1 };

interface Placing {
  scale: Scale;
  xOf(x: number): number;
}

/** The plot's axes with their numbers. */
export function CurveFrame({
  scale,
  quantity,
  xOf,
  yOf,
}: Placing & { quantity: { name: string; unit: string }; yOf(duty: number): number }) {
  return (
    <g fill="var(--soft)">
      {marksOf(DUTY, 4).map(({ value, text }) => (
        <g key={value}>
          <line
            x1={LEFT}
            x2={WIDTH - RIGHT}
            y1={yOf(value)}
            y2={yOf(value)}
            stroke={value === 0 ? "var(--rule)" : "var(--hair)"}
          />
          <text x={LEFT - 6} y={yOf(value) + 4} textAnchor="end">
            {text}
          </text>
        </g>
      ))}
      {marksOf(scale, 6).map(({ value, text }) => (
        <g key={value}>
          <line
            x1={xOf(value)}
            x2={xOf(value)}
            y1={TOP}
            y2={yOf(0)}
            stroke={value === 0 ? "var(--rule)" : "var(--hair)"}
          />
          <text x={xOf(value)} y={HEIGHT - 26} textAnchor="middle">
            {text}
          </text>
        </g>
      ))}
      <text x={(LEFT + WIDTH - RIGHT) / 2} y={HEIGHT - 8} textAnchor="middle" className="font-text">
        {`${quantity.name}, ${quantity.unit}`}
      </text>
    </g>
  );
}

const DOTS_MOST = 200;

/** The part's own layers on the curve: a dot for every one, or for an even choice of them where there are very many. */
export function CurveLayers({
  values,
  scale,
  xOf,
  yAt,
}: Placing & {
  values: ArrayLike<number>;
  /** where the curve lies over a value */
  yAt(value: number): number;
}) {
  const every = Math.max(1, Math.ceil(values.length / DOTS_MOST));
  let path = "";
  for (let i = 0; i < values.length; i += every) {
    const share = shareOf(scale, values[i]);
    if (share >= 0 && share <= 1) path += `M ${xOf(values[i]).toFixed(1)} ${yAt(values[i]).toFixed(1)} h 0 `;
  }
  return (
    <path
      d={path || `M ${LEFT} ${TOP}`}
      stroke="var(--ink)"
      strokeOpacity={0.45}
      strokeWidth={4}
      strokeLinecap="round"
    />
  );
}

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
}: Placing & { quantity: { unit: string }; yOf(duty: number): number }) {
  const marks = marksOf(scale, 6);
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
      {marks.map(({ value, text }, i) => (
        <g key={value}>
          <line
            x1={xOf(value)}
            x2={xOf(value)}
            y1={TOP}
            y2={yOf(0)}
            stroke={value === 0 ? "var(--rule)" : "var(--hair)"}
          />
          <text
            x={i === marks.length - 1 ? Math.min(xOf(value) + 12, WIDTH) : xOf(value)}
            y={HEIGHT - 10}
            textAnchor={i === marks.length - 1 ? "end" : "middle"}
          >
            {i === marks.length - 1 ? `${text} ${quantity.unit}` : text}
          </text>
        </g>
      ))}
    </g>
  );
}

const RUG_MOST = 400;

/** A tick for every layer, or for an even choice of them where there are very many. */
export function CurveRug({ values, scale, xOf, y }: Placing & { values: ArrayLike<number>; y: number }) {
  const every = Math.max(1, Math.ceil(values.length / RUG_MOST));
  let path = "";
  for (let i = 0; i < values.length; i += every) {
    const share = shareOf(scale, values[i]);
    if (share >= 0 && share <= 1) path += `M ${xOf(values[i]).toFixed(1)} ${y} v 5 `;
  }
  return <path d={path || `M ${LEFT} ${y}`} stroke="var(--ink)" strokeOpacity={0.35} />;
}

import type { Points } from "#src/features/documents/leaf-text.ts";
import { fixedText } from "#src/lib/number-text.ts";

const [WIDTH, HEIGHT] = [320, 110];
const INSET = { left: 34, right: 30, top: 8, bottom: 20 };

/** Two curves over each other: the one before broken, the one after whole. The table beside has their numbers. */
export function CurvePair({ before, after }: { before: Points; after: Points }) {
  const all = [...before, ...after];
  const [low, high] = [Math.min(...all.map(([x]) => x)), Math.max(...all.map(([x]) => x))];
  const most = Math.max(...all.map(([, y]) => y), 0.01);
  const [x0, x1] = [INSET.left, WIDTH - INSET.right];
  const [y0, y1] = [HEIGHT - INSET.bottom, INSET.top];
  const at = ([x, y]: readonly [number, number]): string =>
    `${(high === low ? (x0 + x1) / 2 : x0 + ((x - low) / (high - low)) * (x1 - x0)).toFixed(1)} ${(y0 + (y / most) * (y1 - y0)).toFixed(1)}`;
  // Held flat outside their points.
  const lineOf = (points: Points): string => {
    const [first, last] = [points[0], points[points.length - 1]];
    return `M${[[low, first[1]] as const, ...points, [high, last[1]] as const].map(at).join("L")}`;
  };
  if (before.length === 0 || after.length === 0) return null;
  return (
    <svg
      role="img"
      aria-label="Both curves over each other: before as a broken line, after as a whole one"
      width={WIDTH}
      height={HEIGHT}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      fill="none"
      className="max-w-full"
    >
      <path d={`M${x0} ${y1}V${y0}H${x1}`} stroke="var(--rule)" />
      <g className="font-mono" fontSize="11" fill="var(--soft)">
        <text x={x0 - 4} y={y1 + 8} textAnchor="end">
          {fixedText(most, 2)}
        </text>
        <text x={x0 - 4} y={y0} textAnchor="end">
          0
        </text>
        <text x={x0} y={HEIGHT - 5}>
          {low}
        </text>
        <text x={x1} y={HEIGHT - 5} textAnchor="end">
          {high}
        </text>
      </g>
      <path d={lineOf(before)} stroke="var(--soft)" strokeWidth="1.5" strokeDasharray="5 3" />
      <path d={lineOf(after)} stroke="var(--ink)" strokeWidth="2" />
    </svg>
  );
}

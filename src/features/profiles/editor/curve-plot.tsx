import { type KeyboardEvent, type PointerEvent, useRef } from "react";
import type { CurvePoint } from "#shared/formats/profile.ts";
import { type CurveGrid, movedPoint, pointAdded, pointRemoved } from "#src/features/profiles/editor/curve-edits.ts";
import { marksOf, type Scale, shareOf, valueAt } from "#src/lib/scale.ts";

export interface CurvePlotProps {
  label: string;
  points: readonly CurvePoint[];
  grid: CurveGrid;
  /** what x is, with its unit */
  quantity: { name: string; unit: string };
  tone: "cool" | "heat";
  /** where the part's layers lie: a rug under the plot */
  rug?: ArrayLike<number>;
  /** where the pinned layer lies */
  at?: number;
  /** highest duty that machine and profile let through */
  most?: number;
  onChange(points: CurvePoint[], gesture?: string): void;
  onRest(): void;
}

const [WIDTH, HEIGHT, LEFT, BOTTOM, TOP, RIGHT] = [380, 176, 34, 28, 10, 12];
const DUTY: Scale = { kind: "linear", from: 0, to: 1 };

/** A curve on a small plot: drag its points, double-click to add one, Delete takes one away. */
export function CurvePlot(props: CurvePlotProps) {
  const { label, points, grid, quantity, tone, rug, at, most = 1, onChange, onRest } = props;
  const plot = useRef<SVGSVGElement>(null);
  const dragged = useRef(-1);
  // While a point is dragged the scale stands still: else it would run away under the hand.
  const held = useRef<Scale | undefined>(undefined);
  const scale = held.current ?? quantityScale(points, rug);
  const xOf = (x: number) => LEFT + shareOf(scale, x) * (WIDTH - LEFT - RIGHT);
  const yOf = (duty: number) => HEIGHT - BOTTOM - duty * (HEIGHT - BOTTOM - TOP);
  const pointAt = (event: { clientX: number; clientY: number }): CurvePoint => {
    const box = plot.current?.getBoundingClientRect();
    if (!box || box.width === 0) return [0, 0];
    const [px, py] = [
      ((event.clientX - box.left) * WIDTH) / box.width,
      ((event.clientY - box.top) * HEIGHT) / box.height,
    ];
    return [valueAt(scale, (px - LEFT) / (WIDTH - LEFT - RIGHT)), (HEIGHT - BOTTOM - py) / (HEIGHT - BOTTOM - TOP)];
  };
  const end = () => {
    dragged.current = -1;
    held.current = undefined;
    onRest();
  };
  const handle = (i: number) => ({
    onPointerDown: (event: PointerEvent<SVGElement>) => {
      event.currentTarget.setPointerCapture?.(event.pointerId);
      dragged.current = i;
      held.current = scale;
      onRest();
    },
    onPointerMove: (event: PointerEvent<SVGElement>) => {
      if (dragged.current === i) onChange(movedPoint(points, i, pointAt(event), grid), `point ${i} drag`);
    },
    onPointerUp: end,
    onPointerCancel: end,
    onKeyDown: (event: KeyboardEvent) => {
      if (event.key === "Delete" || event.key === "Backspace") {
        event.preventDefault();
        return onChange(pointRemoved(points, i));
      }
      const moved = steppedPoint(points[i], event.key, event.shiftKey ? 10 : 1, stepX(scale, grid), grid.duty);
      if (!moved) return;
      event.preventDefault();
      onChange(movedPoint(points, i, moved, grid), `point ${i} keys`);
    },
    onBlur: onRest,
  });
  const colour = `var(--${tone})`;
  const path = curvePath(points, scale, xOf, yOf);
  return (
    // biome-ignore lint/a11y/useSemanticElements: a drawing with handles is no set of form fields
    <svg
      ref={plot}
      role="group"
      aria-label={label}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      className="w-full max-w-lg touch-pan-y bg-sheet font-mono text-[11px] select-none"
      onDoubleClick={(event) => onChange(pointAdded(points, pointAt(event), grid))}
    >
      <Frame scale={scale} quantity={quantity} xOf={xOf} yOf={yOf} />
      {rug && <Rug values={rug} scale={scale} xOf={xOf} y={yOf(0)} />}
      {most < 1 && (
        <g>
          <line
            x1={LEFT}
            x2={WIDTH - RIGHT}
            y1={yOf(most)}
            y2={yOf(most)}
            stroke="var(--ink)"
            strokeDasharray="6 2 1 2"
          />
          <text x={WIDTH - RIGHT} y={yOf(most) - 4} textAnchor="end" fill="var(--ink)">{`at most ${most}`}</text>
        </g>
      )}
      {at !== undefined && shareOf(scale, at) >= 0 && shareOf(scale, at) <= 1 && (
        <line x1={xOf(at)} x2={xOf(at)} y1={TOP} y2={yOf(0)} stroke="var(--ink)" strokeDasharray="2 2" />
      )}
      <path d={`${path} L ${WIDTH - RIGHT} ${yOf(0)} L ${LEFT} ${yOf(0)} Z`} fill={colour} opacity={0.13} />
      <path d={path} fill="none" stroke={colour} strokeWidth={1.5} />
      {points.map((point, i) => {
        const [x, duty] = point;
        if (!Number.isFinite(x) || !Number.isFinite(duty)) return null;
        return (
          <g
            // biome-ignore lint/suspicious/noArrayIndexKey: a point is its place in the curve
            key={i}
            role="slider"
            tabIndex={0}
            aria-label={`Point ${i + 1} of ${points.length}`}
            aria-valuemin={0}
            aria-valuemax={1}
            aria-valuenow={duty}
            aria-valuetext={`${quantity.name} ${x} ${quantity.unit}, duty ${duty}`}
            className="cursor-move touch-none"
            {...handle(i)}
          >
            <circle cx={xOf(x)} cy={yOf(duty)} r={14} fill="transparent" />
            <rect
              x={xOf(x) - 4}
              y={yOf(duty) - 4}
              width={8}
              height={8}
              fill="var(--sheet)"
              stroke={colour}
              strokeWidth={2}
            />
          </g>
        );
      })}
    </svg>
  );
}

/** The next place of a point for an arrow key. */
export function steppedPoint(
  [x, duty]: CurvePoint,
  key: string,
  times: number,
  stepX: number,
  stepDuty: number,
): CurvePoint | undefined {
  switch (key) {
    case "ArrowLeft":
      return [x - times * stepX, duty];
    case "ArrowRight":
      return [x + times * stepX, duty];
    case "ArrowUp":
      return [x, duty + times * stepDuty];
    case "ArrowDown":
      return [x, duty - times * stepDuty];
    default:
      return undefined;
  }
}

/** One press moves a point by about a two-hundredth of what is shown. */
function stepX(scale: Scale, grid: CurveGrid): number {
  return Math.max(grid.x, Math.round((scale.to - scale.from) / 200 / grid.x) * grid.x);
}

/** Room for the points and for most of the layers, but not for one layer that is very long. */
export function quantityScale(points: readonly CurvePoint[], rug?: ArrayLike<number>): Scale {
  const xs = points.map(([x]) => x).filter(Number.isFinite);
  const last = Math.max(...xs, 0) || 1;
  let most = 0;
  for (let i = 0; rug && i < rug.length; i++) most = Math.max(most, rug[i]);
  return { kind: "linear", from: 0, to: Math.max(last * 1.15, Math.min(most * 1.05, last * 2)) };
}

/** Flat to the first point and after the last one, as the plan reads it. */
function curvePath(
  points: readonly CurvePoint[],
  scale: Scale,
  xOf: (x: number) => number,
  yOf: (duty: number) => number,
): string {
  const usable = points.filter(([x, duty]) => Number.isFinite(x) && Number.isFinite(duty));
  if (usable.length === 0) return `M ${xOf(scale.from)} ${yOf(0)}`;
  const ends: CurvePoint[] = [[scale.from, usable[0][1]], ...usable, [scale.to, usable[usable.length - 1][1]]];
  return ends.map(([x, duty], i) => `${i === 0 ? "M" : "L"} ${xOf(x).toFixed(1)} ${yOf(duty).toFixed(1)}`).join(" ");
}

interface Placing {
  scale: Scale;
  xOf(x: number): number;
}

function Frame({
  scale,
  quantity,
  xOf,
  yOf,
}: Placing & { quantity: CurvePlotProps["quantity"]; yOf(duty: number): number }) {
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
function Rug({ values, scale, xOf, y }: Placing & { values: ArrayLike<number>; y: number }) {
  const every = Math.max(1, Math.ceil(values.length / RUG_MOST));
  let path = "";
  for (let i = 0; i < values.length; i += every) {
    const share = shareOf(scale, values[i]);
    if (share >= 0 && share <= 1) path += `M ${xOf(values[i]).toFixed(1)} ${y} v 5 `;
  }
  return <path d={path || `M ${LEFT} ${y}`} stroke="var(--ink)" strokeOpacity={0.35} />;
}

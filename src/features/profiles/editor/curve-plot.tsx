import { type KeyboardEvent, type PointerEvent, useRef } from "react";
import type { CurvePoint } from "#shared/formats/profile.ts";
import {
  type CurveGrid,
  curveDuty,
  movedPoint,
  pointAdded,
  pointRemoved,
} from "#src/features/profiles/editor/curve-edits.ts";
import { CurveFrame, CurveLayers } from "#src/features/profiles/editor/curve-frame.tsx";
import { curvePath, PLOT, quantityScale, steppedPoint, stepX } from "#src/features/profiles/editor/curve-view.ts";
import { type Scale, shareOf, valueAt } from "#src/lib/scale.ts";

const { width: WIDTH, height: HEIGHT, left: LEFT, bottom: BOTTOM, top: TOP, right: RIGHT } = PLOT;

export interface CurvePlotProps {
  label: string;
  points: readonly CurvePoint[];
  grid: CurveGrid;
  /** what x is, with its unit */
  quantity: { name: string; unit: string };
  tone: "cool" | "heat";
  /** where the part's layers lie: dots on the curve */
  rug?: ArrayLike<number>;
  /** ends of what the curve is read over, where they are known */
  within?: readonly [number, number];
  /** where the pinned layer lies */
  at?: number;
  /** lowest duty but 0, and highest, that machine and profile let through */
  least?: number;
  most?: number;
  onChange(points: CurvePoint[], gesture?: string): void;
  onRest(): void;
}

/** A curve on a small plot: drag its points, double-click to add one, Delete takes one away. */
export function CurvePlot(props: CurvePlotProps) {
  const { label, points, grid, quantity, tone, rug, within, at, least = 0, most = 1, onChange, onRest } = props;
  const plot = useRef<SVGSVGElement>(null);
  const dragged = useRef(-1);
  // While a point is dragged the scale stands still: else it would run away under the hand.
  const held = useRef<Scale | undefined>(undefined);
  const scale = held.current ?? quantityScale(points, rug, within);
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
  const usable = points.filter(([x, duty]) => Number.isFinite(x) && Number.isFinite(duty));
  const path = curvePath(points, scale, xOf, yOf);
  return (
    // biome-ignore lint/a11y/useSemanticElements: a drawing with handles is no set of form fields
    <svg
      ref={plot}
      role="group"
      aria-label={label}
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      className="w-full max-w-[26rem] touch-pan-y bg-sheet font-mono text-[11px] select-none"
      onDoubleClick={(event) => onChange(pointAdded(points, pointAt(event), grid))}
    >
      <CurveFrame scale={scale} quantity={quantity} xOf={xOf} yOf={yOf} />
      {most < 1 && <Limit text={`at most ${most}`} y={yOf(most)} />}
      {least > 0 && <Limit text={`at least ${least}, or off`} y={yOf(least)} below />}
      {at !== undefined && shareOf(scale, at) >= 0 && shareOf(scale, at) <= 1 && (
        <line x1={xOf(at)} x2={xOf(at)} y1={TOP} y2={yOf(0)} stroke="var(--ink)" strokeDasharray="2 2" />
      )}
      <path d={`${path} L ${WIDTH - RIGHT} ${yOf(0)} L ${LEFT} ${yOf(0)} Z`} fill={colour} opacity={0.13} />
      <path d={path} fill="none" stroke={colour} strokeWidth={1.5} />
      {rug && usable.length > 0 && (
        <CurveLayers values={rug} scale={scale} xOf={xOf} yAt={(value) => yOf(curveDuty(usable, value))} />
      )}
      {at !== undefined && usable.length > 0 && shareOf(scale, at) >= 0 && shareOf(scale, at) <= 1 && (
        <circle cx={xOf(at)} cy={yOf(curveDuty(usable, at))} r={5} fill="none" stroke="var(--ink)" strokeWidth={2} />
      )}
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

/** A duty that machine or profile does not let through. */
function Limit({ text, y, below = false }: { text: string; y: number; below?: boolean }) {
  return (
    <g>
      <line x1={LEFT} x2={WIDTH - RIGHT} y1={y} y2={y} stroke="var(--ink)" strokeDasharray="6 2 1 2" />
      <text x={WIDTH - RIGHT} y={below ? y + 12 : y - 4} textAnchor="end" fill="var(--ink)">
        {text}
      </text>
    </g>
  );
}

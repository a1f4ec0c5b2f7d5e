import { useId } from "react";
import { areaWithin, type Grid, isoLine, type Point } from "#src/features/prediction/contour.ts";
import { fixedText } from "#src/lib/number-text.ts";
import { decimalsOf, marksOf, multiples, niceStep } from "#src/lib/scale.ts";

export interface LeverPictureProps {
  /** interlayer temperature, °C, over fan duty (x) and lamp duty (y) */
  grid: Grid;
  fan: string;
  lamp: string;
  tgC: number;
  /** amorphous wants at most this, °C */
  amorphousBelowC: number;
  /** semi-crystalline wants at least this, °C; left out where nothing crystallises */
  crystallineAboveC?: number;
  /** duties that are planned for the layer; left out where there is no plan */
  planned?: Point;
  label: string;
}

const [WIDTH, HEIGHT] = [420, 330];
const BOX = { left: 52, right: WIDTH - 44, top: 26, bottom: HEIGHT - 44 };

/** The two levers as a picture: windows of the states in the material's fills, lines of equal temperature, the plan. */
export function LeverPicture(props: LeverPictureProps) {
  const { grid, fan, lamp, tgC, amorphousBelowC, crystallineAboveC, planned, label } = props;
  const id = useId();
  const to = placer(grid);
  const path = (polygons: readonly Point[][]) =>
    polygons.map((corners) => `M${corners.map((corner) => to(corner).map(short).join(" ")).join("L")}Z`).join("");
  const lines = levelsOf(grid).map((level) => ({ level, pieces: isoLine(grid, level) }));
  const labels = edgeLabels(grid, [{ level: tgC, pieces: isoLine(grid, tgC), name: "Tg" }, ...lines], to);
  return (
    <svg
      viewBox={`0 0 ${WIDTH} ${HEIGHT}`}
      className="w-full max-w-xl font-mono text-[11px]"
      role="img"
      aria-label={label}
    >
      <Patterns id={id} />
      <rect
        x={BOX.left}
        y={BOX.top}
        width={BOX.right - BOX.left}
        height={BOX.bottom - BOX.top}
        fill="var(--sheet)"
        stroke="var(--rule)"
      />
      <path d={path(areaWithin(grid, Number.NEGATIVE_INFINITY, amorphousBelowC))} fill={`url(#${id}amorphous)`} />
      {crystallineAboveC !== undefined && (
        <path d={path(areaWithin(grid, crystallineAboveC, Number.POSITIVE_INFINITY))} fill={`url(#${id}bone)`} />
      )}
      {lines.map(({ level, pieces }) => (
        <path key={level} d={strokes(pieces, to)} stroke="var(--soft)" strokeWidth="0.75" fill="none" />
      ))}
      <path d={strokes(isoLine(grid, tgC), to)} stroke="var(--ink)" strokeWidth="2" fill="none" />
      {[amorphousBelowC, crystallineAboveC].map(
        (edge) =>
          edge !== undefined && (
            <path
              key={edge}
              d={strokes(isoLine(grid, edge), to)}
              stroke="var(--ink)"
              strokeWidth="1"
              strokeDasharray="5 3"
              fill="none"
            />
          ),
      )}
      {labels.map(({ text, x, y, anchor }) => (
        <text key={text} x={x} y={y} textAnchor={anchor} dominantBaseline="middle" fill="var(--ink)">
          {text}
        </text>
      ))}
      <Axes grid={grid} fan={fan} lamp={lamp} to={to} />
      {planned && <PlannedMark at={to(planned)} />}
    </svg>
  );
}

type Place = (point: Point) => [x: number, y: number];

function placer({ x, y }: Grid): Place {
  const [x0, x1, y0, y1] = [x[0], x[x.length - 1], y[0], y[y.length - 1]];
  return ([px, py]) => [
    BOX.left + ((px - x0) / (x1 - x0)) * (BOX.right - BOX.left),
    BOX.bottom - ((py - y0) / (y1 - y0)) * (BOX.bottom - BOX.top),
  ];
}

const short = (at: number): string => at.toFixed(1);

function strokes(pieces: readonly [Point, Point][], to: Place): string {
  return pieces.map(([a, b]) => `M${to(a).map(short).join(" ")}L${to(b).map(short).join(" ")}`).join("");
}

function levelsOf({ values }: Grid): number[] {
  const all = Array.from(values).filter(Number.isFinite);
  const [least, most] = [Math.min(...all), Math.max(...all)];
  return all.length === 0 ? [] : multiples(least, most, niceStep(most - least, 8));
}

interface EdgeLabel {
  text: string;
  x: number;
  y: number;
  anchor: "start" | "middle";
}

/** A line is named where it leaves the picture at the right, or else at the top; where names would meet, the later is left out. */
function edgeLabels(
  { x, y }: Grid,
  lines: readonly { level: number; pieces: readonly [Point, Point][]; name?: string }[],
  to: Place,
): EdgeLabel[] {
  const [right, top] = [x[x.length - 1], y[y.length - 1]];
  const placed: EdgeLabel[] = [];
  for (const { level, pieces, name } of lines) {
    const ends = pieces.flat();
    const atRight = ends.find((end) => end[0] === right);
    const atTop = ends.find((end) => end[1] === top);
    const end = atRight ?? atTop;
    if (!end) continue;
    const [px, py] = to(end);
    const text = `${name ? `${name} ` : ""}${fixedText(level, decimalsOf(level % 1 === 0 ? 1 : 0.1))}`;
    const label: EdgeLabel = atRight
      ? { text, x: BOX.right + 4, y: py, anchor: "start" }
      : { text, x: px, y: BOX.top - 9, anchor: "middle" };
    const free = placed.every(
      (other) =>
        Math.abs(other.y - label.y) > 12 || Math.abs(other.x - label.x) > 4 + 3.6 * (other.text.length + text.length),
    );
    if (free) placed.push(label);
  }
  return placed;
}

function Axes({ grid: { x, y }, fan, lamp, to }: { grid: Grid; fan: string; lamp: string; to: Place }) {
  const scale = (along: readonly number[]) =>
    marksOf({ kind: "linear", from: along[0], to: along[along.length - 1] }, 5);
  return (
    <g fill="var(--soft)">
      {scale(x).map(({ value, text }) => {
        const [px] = to([value, y[0]]);
        return (
          <g key={text}>
            <line x1={px} x2={px} y1={BOX.bottom} y2={BOX.bottom + 4} stroke="var(--rule)" />
            <text x={px} y={BOX.bottom + 14} textAnchor="middle" dominantBaseline="middle">
              {text}
            </text>
          </g>
        );
      })}
      {scale(y).map(({ value, text }) => {
        const [, py] = to([x[0], value]);
        return (
          <g key={text}>
            <line x1={BOX.left - 4} x2={BOX.left} y1={py} y2={py} stroke="var(--rule)" />
            <text x={BOX.left - 8} y={py} textAnchor="end" dominantBaseline="middle">
              {text}
            </text>
          </g>
        );
      })}
      <text x={(BOX.left + BOX.right) / 2} y={HEIGHT - 10} textAnchor="middle" fill="var(--cool-ink)">
        {`fan ${fan}, duty 0–1`}
      </text>
      <text
        transform={`translate(12 ${(BOX.top + BOX.bottom) / 2}) rotate(-90)`}
        textAnchor="middle"
        fill="var(--heat-ink)"
      >
        {`heater ${lamp}, duty 0–1`}
      </text>
    </g>
  );
}

function PlannedMark({ at: [x, y] }: { at: [x: number, y: number] }) {
  return (
    <g stroke="var(--ink)" fill="none">
      <line x1={BOX.left} x2={x - 6} y1={y} y2={y} strokeDasharray="1.5 2.5" />
      <line x1={x} x2={x} y1={y + 6} y2={BOX.bottom} strokeDasharray="1.5 2.5" />
      <rect x={x - 5} y={y - 5} width="10" height="10" fill="var(--sheet)" strokeWidth="2" />
      <rect x={x - 1.5} y={y - 1.5} width="3" height="3" fill="var(--ink)" stroke="none" />
    </g>
  );
}

/** The fills that stand for the states everywhere: stipple on amber, lamellae on bone. */
function Patterns({ id }: { id: string }) {
  return (
    <defs>
      <pattern id={`${id}amorphous`} width="8" height="8" patternUnits="userSpaceOnUse">
        <rect width="8" height="8" fill="var(--amber)" opacity="0.4" />
        <rect x="1" y="1" width="1" height="1" fill="var(--amber-ink)" />
        <rect x="5" y="5" width="1" height="1" fill="var(--amber-ink)" />
      </pattern>
      <pattern id={`${id}bone`} width="8" height="8" patternUnits="userSpaceOnUse">
        <rect width="8" height="8" fill="var(--bone)" opacity="0.7" />
        <rect y="1" width="8" height="1" fill="var(--bone-edge)" opacity="0.55" />
        <rect y="5" width="8" height="1" fill="var(--bone-edge)" opacity="0.55" />
      </pattern>
    </defs>
  );
}

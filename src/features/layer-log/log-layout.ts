/** Columns of the log from left to right, in px of its box. */
export interface LogLayout {
  width: number;
  axis: Column;
  silhouette: Column;
  tracks: Column[];
  marks: Column;
  aside?: Column;
}

export interface Column {
  x: number;
  width: number;
}

const AXIS_PX = 98;
const MARKS_PX = 18;
const TRACK_LEAST_PX = 63;
const GAP_PX = 10;

/** Shares the width out: the axis and the marks have theirs, silhouette and tracks what is left. */
export function logLayout(width: number, trackCount: number, asideWidth = 0): LogLayout {
  const asidePx = asideWidth > 0 ? asideWidth + GAP_PX : 0;
  const rest = width - AXIS_PX - MARKS_PX - asidePx;
  const silhouettePx = Math.min(Math.max(rest / (trackCount + 1), TRACK_LEAST_PX), 190);
  const each = trackCount === 0 ? 0 : Math.max(TRACK_LEAST_PX, (rest - silhouettePx) / trackCount - GAP_PX);
  const silhouette = { x: AXIS_PX, width: Math.round(silhouettePx) };
  let x = silhouette.x + silhouette.width;
  const tracks: Column[] = [];
  for (let i = 0; i < trackCount; i++) {
    // Whole pixels, so that every hairline is sharp.
    const [from, to] = [Math.round(x + GAP_PX), Math.round(x + GAP_PX + each)];
    tracks.push({ x: from, width: to - from });
    x += GAP_PX + each;
  }
  const marks = { x: Math.round(x), width: MARKS_PX };
  const aside = asideWidth > 0 ? { x: marks.x + MARKS_PX + GAP_PX, width: asideWidth } : undefined;
  const end = aside ? aside.x + aside.width : marks.x + marks.width;
  return { width: Math.max(width, end), axis: { x: 0, width: AXIS_PX }, silhouette, tracks, marks, aside };
}

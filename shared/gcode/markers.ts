/**
 * What a sliced file says of itself in comments, recognised by shape. Markers name and count layers and show where to
 * write; geometry decides. A new shape is a new row here, or a template that a team adds.
 */
export interface CommentFact {
  says: "layer" | "height" | "feature";
  /** layer number as written */
  number?: number;
  /** top of the layer, mm */
  topMm?: number;
  /** thickness of the layer, mm */
  heightMm?: number;
  /** for a feature: whether it draws the part's outline */
  outline?: boolean;
}

export interface CommentShape {
  pattern: RegExp;
  read: (groups: (string | undefined)[]) => CommentFact;
}

const NUMBER = "([-+]?\\d+)";
const LENGTH = "([-+]?(?:\\d+\\.?\\d*|\\.\\d+))";
const shape = (source: string, read: CommentShape["read"]): CommentShape => ({
  pattern: new RegExp(`^${source}`, "i"),
  read,
});
const optional = (text: string | undefined): number | undefined => (text === undefined ? undefined : Number(text));

const OUTLINE =
  /outer[ _-]?(wall|perimeter)|(wall|perimeter)[ _-]?outer|external[ _-]?perimeter|^(outline|perimeter|skin line)\b/i;

export const COMMENT_SHAPES: readonly CommentShape[] = [
  // number and height on one line: `layer 12, z = 2.4`, `stratum 12 top 2.400`
  shape(
    `(?:layer|stratum)\\s*[:#]?\\s*${NUMBER}[\\s,;:]+(?:z|top|height)\\s*[=:]?\\s*${LENGTH}(?:\\s*mm)?$`,
    ([n, top]) => ({
      says: "layer",
      number: optional(n),
      topMm: optional(top),
    }),
  ),
  // number after a keyword: `LAYER:0`, `layer 3`, `layer #3`, `layer 3/120`
  shape(`(?:layer|stratum)\\s*[:#=]?\\s*${NUMBER}(?:\\s*(?:/|of)\\s*\\d+)?$`, ([n]) => ({
    says: "layer",
    number: optional(n),
  })),
  // a change keyword, its height in a later comment
  shape("(?:layer_change|change_layer|layer change)$", () => ({ says: "layer" })),
  // a begin keyword with the height
  shape(`begin_layer(?:_object)?\\s+z\\s*=\\s*${LENGTH}`, ([top]) => ({ says: "layer", topMm: optional(top) })),
  // heights that follow a change keyword
  shape(`(?:z|z_height)\\s*[:=]\\s*${LENGTH}$`, ([top]) => ({ says: "height", topMm: optional(top) })),
  shape(`(?:height|layer_height)\\s*[:=]\\s*${LENGTH}$`, ([height]) => ({
    says: "height",
    heightMm: optional(height),
  })),
  // features
  shape("(?:type|feature)\\s*:\\s*(.+)$", ([name]) => ({ says: "feature", outline: OUTLINE.test(name!.trim()) })),
  shape("'([^']+) path'", ([name]) => ({ says: "feature", outline: OUTLINE.test(name!.trim()) })),
];

/**
 * A team's own marker, written as literal text with `{number}`, `{height}` and `{any}` in it. Literal text is matched
 * as such; a placeholder takes all it can and gives nothing back, `{any}` up to a blank or to what stands behind it: no
 * template can make a slow pattern.
 *
 * @param template the comment without its delimiters, e.g. `slab {number} up to {height} mm`
 */
export function markerShape(template: string): CommentShape {
  const keys: string[] = [];
  const parts = bytesAsText(template.trim()).split(/((?:\{any\})+|\{number\}|\{height\})/);
  const source = parts
    .map((part, k) => {
      if (k % 2 === 0) return literal(part).replace(/\s+/g, "\\s+");
      const behind = parts[k + 1] ? literal(parts[k + 1][0]) : k + 2 < parts.length ? "\\d.+-" : "";
      if (part.startsWith("{any}")) return `[^\\s${behind}]*`;
      keys.push(part);
      return `(?=${part === "{number}" ? NUMBER : LENGTH})(?:\\${keys.length})`;
    })
    .join("");
  return shape(`${source}$`, (groups) => ({
    says: "layer",
    number: optional(groups[keys.indexOf("{number}")]),
    topMm: optional(groups[keys.indexOf("{height}")]),
  }));
}

const literal = (text: string): string => text.replace(/[.*+?^${}()|[\]\\-]/g, "\\$&");

/** Comments are looked at byte by byte, so a template is matched as its UTF-8 bytes. */
const bytesAsText = (text: string): string =>
  encodeURIComponent(text.replace(/\p{Cs}/gu, "\ufffd")).replace(/%(..)/g, (_, hex) =>
    String.fromCharCode(Number.parseInt(hex, 16)),
  );

/** Longest comment that is looked at; a marker is short. */
const LONGEST = 120;

/** Reads facts out of comments, given as byte ranges; nearly all comments are dismissed by their first letter. */
export class CommentReader {
  private readonly shapes: readonly CommentShape[];
  private readonly firstBytes = new Uint8Array(256);

  constructor(own: readonly CommentShape[] = []) {
    this.shapes = [...own, ...COMMENT_SHAPES];
    for (const letter of "lszcbhtf'") this.allow(letter);
    if (own.length > 0) this.firstBytes.fill(1);
  }

  private allow(letter: string): void {
    this.firstBytes[letter.charCodeAt(0)] = 1;
    this.firstBytes[letter.toUpperCase().charCodeAt(0)] = 1;
  }

  read(buf: Uint8Array, start: number, end: number): CommentFact | undefined {
    let from = start;
    let to = end;
    while (from < to && buf[from] <= 32) from++;
    while (to > from && buf[to - 1] <= 32) to--;
    if (from === to || to - from > LONGEST || this.firstBytes[buf[from]] === 0) return undefined;
    const text = String.fromCharCode(...buf.subarray(from, to));
    for (const { pattern, read } of this.shapes) {
      const match = pattern.exec(text);
      if (match) return read(match.slice(1));
    }
    return undefined;
  }
}

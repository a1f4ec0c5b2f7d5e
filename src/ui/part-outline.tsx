import { STATE_FILLS } from "#src/lib/state-fill.ts";

interface Props {
  outline: { widthMm: number; heightMm: number; bands: readonly (readonly [number, number] | null)[] } | undefined;
  /** what each band is to become; left out: only the part's form is shown */
  targets?: readonly (keyof typeof STATE_FILLS)[];
}

const [MOST_WIDE, MOST_HIGH] = [44, 36];

/** A part from the side, as small as it can be recognised; bands in the look of what they are to become. */
export function PartOutline({ outline, targets }: Props) {
  if (!outline || outline.widthMm <= 0 || outline.heightMm <= 0) {
    return <span aria-hidden className="block" style={{ width: MOST_WIDE }} />;
  }
  const { widthMm, heightMm, bands } = outline;
  const scale = Math.min(MOST_WIDE / widthMm, MOST_HIGH / heightMm);
  // A flat plate still has to be seen.
  const [width, height] = [Math.max(6, widthMm * scale), Math.max(4, heightMm * scale)];
  return (
    <span aria-hidden className="grid place-items-center" style={{ width: MOST_WIDE }}>
      <span className="flex flex-col-reverse" style={{ width, height }}>
        {bands.map((band, b) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: the bands of an outline never move
          <span key={b} className="relative grow">
            {band && (
              <span
                className="absolute inset-y-0 border-x border-bone-edge bg-rule"
                style={{
                  left: `${100 * band[0]}%`,
                  right: `${100 * (1 - band[1])}%`,
                  ...(targets?.[b] && STATE_FILLS[targets[b]]),
                }}
              />
            )}
          </span>
        ))}
      </span>
    </span>
  );
}

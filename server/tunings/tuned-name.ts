/** Longest slug of a profile's name, in characters: file managers and printers' panels cut long names off. */
const SLUG_LENGTH = 48;

/**
 * The name a tuned file is downloaded under. It names the profile and its version, so that two tunings of one toolpath
 * are told apart: `bracket.gcode` -> `bracket.seal-ring-v2.tuned.gcode`. A tuned file that is tuned again names only the
 * profile applied last.
 */
export function tunedName(original: string, profile: { name: string; version: number }): string {
  const [, stem, extension = ".gcode"] = /^(.+?)(\.[A-Za-z0-9]{1,8})?$/.exec(original) ?? [original, original];
  const plain = stem.replace(/(\.[a-z0-9-]+-v\d+)?\.tuned$/, "");
  return `${plain}.${slug(profile.name)}-v${profile.version}.tuned${extension}`;
}

/** `Seal ring, stiff base` -> `seal-ring-stiff-base`; too long a name ends with a whole word where it can. */
function slug(name: string): string {
  const whole = name
    .normalize("NFKD")
    .replace(/\p{M}/gu, "")
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-|-$/g, "");
  if (whole === "") return "profile";
  if (whole.length <= SLUG_LENGTH) return whole;
  const cut = whole.slice(0, SLUG_LENGTH + 1);
  return cut.slice(0, Math.max(cut.lastIndexOf("-"), SLUG_LENGTH / 2)).replace(/-$/, "");
}

/** `bracket.gcode` -> `bracket.tuned.gcode`; a file tuned again keeps one `tuned`. */
export function tunedName(original: string): string {
  const [, stem, extension = ".gcode"] = /^(.+?)(\.[A-Za-z0-9]{1,8})?$/.exec(original) ?? [original, original];
  return `${stem.replace(/\.tuned$/, "")}.tuned${extension}`;
}

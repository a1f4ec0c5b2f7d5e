/**
 * A path inside a document as people write it: `zones[1].cooling.points[0]`. Keys that are not plain words, which only
 * a faulty document has, stand quoted in brackets so that they cannot be taken for something else.
 */
export function pathText(path: readonly PropertyKey[]): string {
  let text = "";
  for (const key of path) {
    if (typeof key === "number") text += `[${key}]`;
    else if (/^[A-Za-z_][\w-]{0,79}$/.test(String(key))) text += text === "" ? String(key) : `.${String(key)}`;
    else text += `[${JSON.stringify(String(key).slice(0, 80))}]`;
  }
  return text;
}

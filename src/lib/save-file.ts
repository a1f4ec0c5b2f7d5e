/** Hands a text to the browser as a file to keep. */
export function saveFile(name: string, text: string, type = "application/json"): void {
  const url = URL.createObjectURL(new Blob([text], { type }));
  fetchFile(url, name);
  // The click is handled after this turn.
  setTimeout(() => URL.revokeObjectURL(url), 1_000);
}

/** As if a link to the file had been followed. */
export function fetchFile(url: string, name: string): void {
  const link = document.createElement("a");
  link.href = url;
  link.download = name;
  link.click();
}

/** "Seal ring, stiff base" -> "seal-ring-stiff-base.json" */
export function documentFileName(name: string): string {
  const plain = name
    .toLowerCase()
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-|-$/g, "");
  return `${plain === "" ? "document" : plain}.json`;
}

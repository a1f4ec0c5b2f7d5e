/**
 * Checksum of a numbered line: all bytes before the `*`, number and spaces included, combined by exclusive or. It does
 * not see transposed bytes; the line number beside it catches lost lines.
 *
 * @param line bytes, or text of ASCII characters, up to but without the `*`
 * @param start first byte of the line within `line`
 * @param end byte after the last one
 * @returns 0-255, written in decimal after the `*`
 * @throws RangeError for text beyond ASCII: its bytes depend on an encoding
 */
export function hostChecksum(line: Uint8Array | string, start = 0, end = line.length): number {
  let sum = 0;
  for (let i = start; i < end; i++) {
    const byte = typeof line === "string" ? line.charCodeAt(i) : line[i];
    if (byte > 0x7f && typeof line === "string") throw new RangeError("the checksum of text is defined for ASCII only");
    sum ^= byte;
  }
  return sum;
}

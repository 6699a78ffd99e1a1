/** Bytes of the largest file that is read. No text that kvane reads comes near it. */
export const largestFile = 256 * 1024 * 1024;

/**
 * All bytes of a stream. Where there are more than the largest file has, somewhat more than that, and the rest is not
 * asked for: a device may have no end.
 */
export async function boundedBytes(stream: AsyncIterable<Uint8Array>): Promise<Uint8Array> {
  const parts: Uint8Array[] = [];
  let length = 0;
  for await (const part of stream) {
    parts.push(part);
    length += part.length;
    if (length > largestFile) break;
  }
  return Buffer.concat(parts);
}

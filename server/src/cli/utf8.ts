/** Bytes as text, or the place of the first byte that is no UTF-8: in bytes, and in UTF-16 units of the text before it. */
export type Decoded = { readonly text: string } | { readonly badByte: number; readonly offset: number };

/** Decodes strictly; a byte-order mark stays in the text. */
export function decodeUtf8(bytes: Uint8Array): Decoded {
  const text = decoded(bytes, false);
  if (text !== null) return { text };
  let [good, bad] = [0, bytes.length + 1];
  while (bad - good > 1) {
    const middle = Math.floor((good + bad) / 2);
    if (decoded(bytes.subarray(0, middle), true) === null) bad = middle;
    else good = middle;
  }
  // The longest good prefix may end inside a sequence that is broken off there: its whole signs end where the fault begins.
  const before = decoded(bytes.subarray(0, Math.min(good, bytes.length)), true) ?? '';
  return { badByte: Buffer.byteLength(before, 'utf8'), offset: before.length };
}

/** `unfinished`: the last sign may be cut off. Null where the bytes are no UTF-8. */
function decoded(bytes: Uint8Array, unfinished: boolean): string | null {
  try {
    return new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes, { stream: unfinished });
  } catch {
    return null;
  }
}

/** How a file's text is encoded; a file with a zero byte that is no UTF-16 is no text. */
export type TextEncodingName = "utf-8" | "utf-16le" | "utf-16be" | "windows-1252" | "none";

/** UTF-16 without its mark shows in the zero bytes of plain letters, all in odd or all in even places. */
function unmarkedUtf16(head: Uint8Array): "utf-16le" | "utf-16be" | null {
  const places = [0, 0];
  head.forEach((byte, place) => {
    if (byte === 0) places[place % 2] = (places[place % 2] ?? 0) + 1;
  });
  const [even = 0, odd = 0] = places;
  const most = head.length * 0.3;
  if (odd > most && even < head.length * 0.02) return "utf-16le";
  return even > most && odd < head.length * 0.02 ? "utf-16be" : null;
}

/**
 * Finds a text's encoding while it passes by in pieces.
 *
 * @returns `add` takes the next piece; `result` says, once all have passed: UTF-8 when every byte fits it, UTF-16 by its
 *   mark or its zero bytes, "none" for anything else with zero bytes, else Windows-1252
 */
export function encodingFinder(): { add: (piece: Uint8Array) => void; result: () => TextEncodingName } {
  const utf8 = new TextDecoder("utf-8", { fatal: true });
  let [isUtf8, hasZero, marked, unmarked]: [boolean, boolean, TextEncodingName | null, TextEncodingName | null] = [
    true,
    false,
    null,
    null,
  ];
  let isFirst = true;
  const decode = (piece: Uint8Array | undefined) => {
    if (!isUtf8) return;
    try {
      utf8.decode(piece, { stream: piece !== undefined });
    } catch {
      isUtf8 = false;
    }
  };
  return {
    add(piece) {
      if (isFirst && piece.length > 0) {
        isFirst = false;
        if (piece[0] === 0xff && piece[1] === 0xfe) marked = "utf-16le";
        else if (piece[0] === 0xfe && piece[1] === 0xff) marked = "utf-16be";
        else unmarked = unmarkedUtf16(piece.subarray(0, 4096));
      }
      hasZero ||= piece.includes(0);
      decode(piece);
    },
    result() {
      decode(undefined);
      if (marked !== null) return marked;
      if (unmarked !== null) return unmarked;
      if (hasZero) return "none";
      return isUtf8 ? "utf-8" : "windows-1252";
    },
  };
}

/** Decoded at a time: the parser makes all rows of a piece at once, and only so many are to be in memory. */
const decodedBytes = 64 * 1024;

/** The pieces as text; a mark at the start is dropped. @throws RangeError for the encoding "none" */
export async function* decodedPieces(pieces: AsyncIterable<Uint8Array>, encoding: TextEncodingName) {
  if (encoding === "none") throw new RangeError("bytes that are no text cannot be decoded");
  const decoder = new TextDecoder(encoding);
  for await (const piece of pieces) {
    for (let start = 0; start < piece.length; start += decodedBytes) {
      yield decoder.decode(piece.subarray(start, start + decodedBytes), { stream: true });
    }
  }
  yield decoder.decode();
}

/** A piece of a form: the beginning of a part, some of what it holds, or its end. */
export type FormPiece =
  { type: "part"; name: string; fileName: string | null } | { type: "data"; bytes: Uint8Array } | { type: "end" };

/** Thrown when what arrives is no whole form. */
export class BrokenForm extends Error {}

const mostHeadBytes = 8_192;
const lineEnd = [13, 10];

/** Where `wanted` begins in `bytes`, or -1. */
function placeOf(bytes: Uint8Array, wanted: Uint8Array, from = 0): number {
  const [first] = wanted;
  if (first === undefined) return -1;
  for (let place = bytes.indexOf(first, from); place !== -1; place = bytes.indexOf(first, place + 1)) {
    if (place + wanted.length > bytes.length) return -1;
    if (wanted.every((byte, offset) => bytes[place + offset] === byte)) return place;
  }
  return -1;
}

function joined(one: Uint8Array, other: Uint8Array): Uint8Array {
  if (one.length === 0) return other;
  const both = new Uint8Array(one.length + other.length);
  both.set(one);
  both.set(other, one.length);
  return both;
}

/** The names in a part's head. Browsers write a quotation mark in a name as %22. */
function readHead(bytes: Uint8Array): FormPiece & { type: "part" } {
  const lines = new TextDecoder().decode(bytes).split("\r\n");
  const disposition = lines.find((text) => /^content-disposition:/i.test(text)) ?? "";
  const parameters = new Map(
    [...disposition.matchAll(/;\s*(name|filename)=(?:"([^"]*)"|([^;]*))/gi)].map(([, key = "", quoted, bare]) => [
      key.toLowerCase(),
      (quoted ?? bare ?? "").replaceAll("%22", '"'),
    ]),
  );
  const name = parameters.get("name");
  if (name === undefined) throw new BrokenForm("a part has no name");
  return { type: "part", name, fileName: parameters.get("filename") ?? null };
}

/** The boundary that a form's content type names, or null when it names none. */
export function boundaryOf(contentType: string): string | null {
  const match = /^multipart\/form-data\s*;.*?\bboundary=(?:"([^"]{1,70})"|([^\s;"]{1,70}))/i.exec(contentType);
  return match?.[1] ?? match?.[2] ?? null;
}

/**
 * The parts of a form, piece by piece as they arrive: at no time is more in memory than a piece and the line that ends a
 * part.
 *
 * @param pieces - the form's bytes in order
 * @param boundary - the text between its parts, without the hyphens before it
 * @throws BrokenForm when it ends before its end, a part has no name, or a head is longer than 8 kB
 *
 * Source: RFC 7578 and RFC 2046, section 5.1.1.
 */
export async function* formPieces(pieces: AsyncIterable<Uint8Array>, boundary: string): AsyncGenerator<FormPiece> {
  const delimiter = new Uint8Array([...lineEnd, ...new TextEncoder().encode(`--${boundary}`)]);
  const headEnd = new Uint8Array([...lineEnd, ...lineEnd]);
  // The first delimiter may stand at the very beginning; the line end before it is then thought of.
  let waiting: Uint8Array = new Uint8Array(lineEnd);
  let state: "before" | "delimited" | "head" | "data" | "over" = "before";
  for await (const piece of pieces) {
    if (state === "over") continue;
    waiting = joined(waiting, piece);
    let isEnough = true;
    while (isEnough) {
      isEnough = false;
      if (state === "before" || state === "data") {
        const place = placeOf(waiting, delimiter);
        const end = place === -1 ? Math.max(0, waiting.length - delimiter.length + 1) : place;
        if (state === "data" && end > 0) yield { type: "data", bytes: waiting.slice(0, end) };
        waiting = waiting.slice(place === -1 ? end : place + delimiter.length);
        if (place === -1) continue;
        if (state === "data") yield { type: "end" };
        state = "delimited";
      }
      if (state === "delimited" && waiting.length >= 2) {
        const [one, two] = waiting;
        if (one === 45 && two === 45) {
          state = "over";
          break;
        }
        // Blanks may stand between the boundary and the end of its line.
        const place = placeOf(waiting, new Uint8Array(lineEnd));
        if (place > 100 || (place === -1 && waiting.length > 100)) throw new BrokenForm("a boundary's line has no end");
        if (place === -1) continue;
        // Kept, so that a head without any line is found to be one.
        waiting = waiting.slice(place);
        state = "head";
      }
      if (state === "head") {
        const place = placeOf(waiting, headEnd);
        if (place === -1 ? waiting.length > mostHeadBytes : place > mostHeadBytes) {
          throw new BrokenForm("a part's head is too long");
        }
        if (place === -1) continue;
        yield readHead(waiting.slice(0, place));
        waiting = waiting.slice(place + headEnd.length);
        state = "data";
        isEnough = true;
      }
    }
  }
  if (state !== "over") throw new BrokenForm("the form ends before its end");
}

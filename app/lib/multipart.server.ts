import { createHash } from "node:crypto";
import { open } from "node:fs/promises";
import { boundaryOf, BrokenForm, formPieces } from "./form-parts.ts";
import { encodingFinder, type TextEncodingName } from "./text-encoding.server.ts";

/** A file that has arrived, lying at the path that was given for it. */
export type ReceivedFile = {
  fileName: string;
  byteCount: number;
  sha256: string;
  encoding: TextEncodingName;
  /** Line ends, as an estimate of its rows. */
  lineCount: number;
  /** Its first bytes. */
  opening: Uint8Array;
};

export type ReceivedForm =
  | { ok: true; fields: Map<string, string>; file: ReceivedFile | null }
  | { ok: false; reason: "too-large" | "not-whole" | "not-a-form" | "disk-full" };

const most = { fields: 20, fieldBytes: 10_000 };

class TooLarge extends Error {}

/** Notes of a file what has to be known of it, while it passes by. */
function noteTaker(mostBytes: number) {
  const hash = createHash("sha256");
  const encoding = encodingFinder();
  const noted = { byteCount: 0, lineCount: 0, opening: new Uint8Array() };
  return {
    add(bytes: Uint8Array) {
      if (noted.opening.length < 8) noted.opening = Uint8Array.from([...noted.opening, ...bytes.subarray(0, 8)]);
      noted.byteCount += bytes.length;
      if (noted.byteCount > mostBytes) throw new TooLarge();
      for (let place = bytes.indexOf(10); place !== -1; place = bytes.indexOf(10, place + 1)) noted.lineCount++;
      hash.update(bytes);
      encoding.add(bytes);
    },
    result: () => ({ ...noted, sha256: hash.digest("hex"), encoding: encoding.result() }),
  };
}

async function* piecesOf(body: ReadableStream<Uint8Array>) {
  const reader = body.getReader();
  try {
    for (let next = await reader.read(); !next.done; next = await reader.read()) yield next.value;
  } finally {
    // What was not read is not waited for.
    await reader.cancel().catch(() => {});
  }
}

type Pieces = ReturnType<typeof formPieces>;

async function readField(pieces: Pieces): Promise<string> {
  const decoder = new TextDecoder();
  let [text, byteCount] = ["", 0];
  for (let next = await pieces.next(); next.done !== true && next.value.type !== "end"; next = await pieces.next()) {
    if (next.value.type !== "data") continue;
    byteCount += next.value.bytes.length;
    if (byteCount > most.fieldBytes) throw new BrokenForm("a field is too long");
    text += decoder.decode(next.value.bytes, { stream: true });
  }
  return text + decoder.decode();
}

async function writeFile(pieces: Pieces, path: string, mostBytes: number) {
  const notes = noteTaker(mostBytes);
  const file = await open(path, "wx", 0o600);
  try {
    for (let next = await pieces.next(); next.done !== true && next.value.type !== "end"; next = await pieces.next()) {
      if (next.value.type !== "data") continue;
      notes.add(next.value.bytes);
      await file.writeFile(next.value.bytes);
    }
  } finally {
    await file.close();
  }
  return notes.result();
}

async function readForm(pieces: Pieces, path: string, mostBytes: number) {
  const fields = new Map<string, string>();
  let file: ReceivedFile | null = null;
  let partCount = 0;
  for (let next = await pieces.next(); next.done !== true; next = await pieces.next()) {
    if (next.value.type !== "part") continue;
    const { name, fileName } = next.value;
    partCount++;
    if (partCount > most.fields || (fileName !== null && file !== null)) throw new BrokenForm("too many parts");
    // Browsers send an empty part without a name when no file is chosen.
    if (fileName === null || fileName === "") fields.set(name, await readField(pieces));
    else file = { fileName, ...(await writeFile(pieces, path, mostBytes)) };
  }
  return { ok: true, fields, file } as const;
}

/**
 * A form with one file, written to `path` as it arrives: however large it is, only a piece of it is in memory.
 *
 * @param request - its body is read
 * @param path - where the file goes
 * @param mostBytes - of the file; more are not written
 * @returns the fields and what was noted of the file (null when none was chosen), or why it could not be taken
 */
export async function receiveForm(request: Request, path: string, mostBytes: number): Promise<ReceivedForm> {
  const boundary = boundaryOf(request.headers.get("content-type") ?? "");
  if (!request.body || boundary === null) return { ok: false, reason: "not-a-form" };
  const pieces = formPieces(piecesOf(request.body), boundary);
  try {
    return await readForm(pieces, path, mostBytes);
  } catch (error) {
    if (error instanceof TooLarge) return { ok: false, reason: "too-large" };
    const isFull = error instanceof Error && "code" in error && error.code === "ENOSPC";
    return { ok: false, reason: isFull ? "disk-full" : "not-whole" };
  } finally {
    await pieces.return(undefined);
  }
}

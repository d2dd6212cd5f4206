import { createHash } from "node:crypto";
import { createWriteStream } from "node:fs";
import { Readable, Transform } from "node:stream";
import { pipeline } from "node:stream/promises";
import busboy from "busboy";
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

/** Notes of a file what has to be known of it, while it passes by. */
function noteTaker() {
  const hash = createHash("sha256");
  const encoding = encodingFinder();
  const noted = { byteCount: 0, lineCount: 0, opening: new Uint8Array() };
  const stream = new Transform({
    transform(piece: Buffer, _encoding, done) {
      if (noted.byteCount === 0) noted.opening = Uint8Array.from(piece.subarray(0, 8));
      noted.byteCount += piece.length;
      for (let place = piece.indexOf(10); place !== -1; place = piece.indexOf(10, place + 1)) noted.lineCount++;
      hash.update(piece);
      encoding.add(piece);
      done(null, piece);
    },
  });
  return { stream, result: () => ({ ...noted, sha256: hash.digest("hex"), encoding: encoding.result() }) };
}

function codeOf(error: unknown) {
  return typeof error === "object" && error !== null && "code" in error ? error.code : null;
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

/**
 * A form with one file, written to `path` as it arrives: however large it is, only a piece of it is in memory.
 *
 * @param request - its body is read
 * @param path - where the file goes
 * @param mostBytes - of the file; more are not written
 * @returns the fields and what was noted of the file (null when none was chosen), or why it could not be taken
 */
export async function receiveForm(request: Request, path: string, mostBytes: number): Promise<ReceivedForm> {
  const contentType = request.headers.get("content-type") ?? "";
  if (!request.body || !/^multipart\/form-data\b/i.test(contentType)) return { ok: false, reason: "not-a-form" };
  let parser: busboy.Busboy;
  try {
    const limits = { files: 1, fileSize: mostBytes, fields: 20, fieldSize: 10_000, parts: 30 };
    parser = busboy({ headers: { "content-type": contentType }, limits, defParamCharset: "utf8" });
  } catch {
    return { ok: false, reason: "not-a-form" };
  }
  const fields = new Map<string, string>();
  let file: ReceivedFile | null = null;
  let writing = Promise.resolve();
  let isTooLarge = false;
  for (const limit of ["filesLimit", "fieldsLimit", "partsLimit"] as const) {
    parser.on(limit, () => parser.destroy(new Error(limit)));
  }
  parser.on("field", (name, value) => fields.set(name, value));
  parser.on("file", (_name, stream, { filename }) => {
    // Browsers send an empty part without a name when no file is chosen.
    if (!filename) return stream.resume();
    const notes = noteTaker();
    stream.on("limit", () => {
      isTooLarge = true;
      parser.destroy(new Error("too large"));
    });
    writing = pipeline(stream, notes.stream, createWriteStream(path, { flags: "wx", mode: 0o600 })).then(() => {
      file = { fileName: filename, ...notes.result() };
    });
    writing.catch((error: unknown) => parser.destroy(error instanceof Error ? error : new Error("write")));
    return stream;
  });
  try {
    await pipeline(Readable.from(piecesOf(request.body)), parser);
    await writing;
  } catch (error) {
    await writing.catch(() => {});
    if (isTooLarge) return { ok: false, reason: "too-large" };
    return { ok: false, reason: codeOf(error) === "ENOSPC" ? "disk-full" : "not-whole" };
  }
  return { ok: true, fields, file };
}

import { inflateSync } from "node:zlib";

/** What a test needs of a PDF as Chromium prints it: how many pages, and the words on them. */
export type PdfText = { pageCount: number; words: string };

type PdfObject = { head: string; stream: Buffer | null };

function objectsOf(bytes: Buffer): Map<number, PdfObject> {
  const text = bytes.toString("latin1");
  const objects = new Map<number, PdfObject>();
  for (const match of text.matchAll(/(\d+) 0 obj\s/g)) {
    const from = match.index + match[0].length;
    const body = text.slice(from, text.indexOf("endobj", from));
    const [head = "", rest] = body.split(/stream\r?\n/);
    const length = Number(/\/Length (\d+)/.exec(head)?.[1] ?? 0);
    const start = rest === undefined ? -1 : from + body.indexOf(rest);
    const raw = start < 0 ? null : bytes.subarray(start, start + length);
    objects.set(Number(match[1]), { head, stream: raw && head.includes("/FlateDecode") ? inflateSync(raw) : raw });
  }
  return objects;
}

/** Which letters the codes of one font stand for. */
function lettersOf(font: PdfObject, objects: ReadonlyMap<number, PdfObject>): Map<number, string> {
  const letters = new Map<number, string>();
  const table = objects.get(Number(/\/ToUnicode (\d+) 0 R/.exec(font.head)?.[1]))?.stream?.toString("latin1") ?? "";
  const letter = (hex: string) => Buffer.from(hex, "hex").swap16().toString("utf16le");
  for (const [, block = ""] of table.matchAll(/beginbfchar(.*?)endbfchar/gs)) {
    for (const [, code = "", to = ""] of block.matchAll(/<(\w+)> <(\w+)>/g))
      letters.set(parseInt(code, 16), letter(to));
  }
  for (const [, block = ""] of table.matchAll(/beginbfrange(.*?)endbfrange/gs)) {
    for (const [, first = "", last = "", to = ""] of block.matchAll(/<(\w+)> <(\w+)> <(\w+)>/g)) {
      const base = parseInt(to, 16);
      const start = parseInt(first, 16);
      for (let code = start; code <= parseInt(last, 16); code += 1) {
        letters.set(code, String.fromCharCode(base + code - start));
      }
    }
  }
  return letters;
}

/**
 * The text of a PDF in the order in which it was drawn, without blanks: where a printer sets a blank is its own affair.
 *
 * @param bytes - a PDF whose fonts are named after their objects, as Skia writes it
 */
export function pdfText(bytes: Buffer): PdfText {
  const objects = objectsOf(bytes);
  const fonts = new Map<string, Map<number, string>>();
  for (const [number, object] of objects) {
    if (object.head.includes("/Type /Font\n") || /\/Subtype \/Type[03]/.test(object.head)) {
      fonts.set(`F${number}`, lettersOf(object, objects));
    }
  }
  let words = "";
  for (const { head, stream } of objects.values()) {
    const content = stream?.toString("latin1") ?? "";
    if (head.includes("/Type") || !content.includes(" Tf")) continue;
    let letters = new Map<number, string>();
    for (const [, font, hex] of content.matchAll(/\/(F\d+) [\d.]+ Tf|<([0-9A-Fa-f]+)>/g)) {
      if (font !== undefined) letters = fonts.get(font) ?? new Map<number, string>();
      for (const [code] of (hex ?? "").matchAll(/.{4}/g)) words += letters.get(parseInt(code, 16)) ?? "";
    }
  }
  const pageCount = [...objects.values()].filter(({ head }) => /\/Type \/Page\b(?!s)/.test(head)).length;
  return { pageCount, words: words.replace(/\s+/g, "") };
}

import fc from "fast-check";
import { expect, test } from "vitest";
import { boundaryOf, BrokenForm, formPieces } from "#app/lib/form-parts.ts";

async function* cut(bytes: Uint8Array, sizes: readonly number[]) {
  let start = 0;
  for (let turn = 0; start < bytes.length; turn++) {
    const size = sizes[turn % sizes.length] ?? 1;
    yield bytes.subarray(start, start + size);
    start += size;
  }
}

async function read(body: string | Uint8Array, sizes: readonly number[] = [7]) {
  const parts: { name: string; fileName: string | null; bytes: number[]; isEnded: boolean }[] = [];
  for await (const piece of formPieces(cut(Buffer.from(body), sizes), "b")) {
    const last = parts.at(-1);
    if (piece.type === "part") parts.push({ name: piece.name, fileName: piece.fileName, bytes: [], isEnded: false });
    else if (piece.type === "data") last?.bytes.push(...piece.bytes);
    else if (last) last.isEnded = true;
  }
  return parts;
}

function form(parts: readonly { name: string; fileName?: string; content: Uint8Array | string }[]) {
  return Buffer.concat([
    ...parts.flatMap(({ name, fileName, content }) => [
      Buffer.from(
        `--b\r\nContent-Disposition: form-data; name="${name}"${fileName === undefined ? "" : `; filename="${fileName}"`}\r\n\r\n`,
      ),
      Buffer.from(content),
      Buffer.from("\r\n"),
    ]),
    Buffer.from("--b--\r\n"),
  ]);
}

test("a form is the same however it is cut into pieces", async () => {
  await fc.assert(
    fc.asyncProperty(
      fc.array(fc.uint8Array({ maxLength: 60 }), { minLength: 1, maxLength: 4 }),
      fc.array(fc.integer({ min: 1, max: 40 }), { minLength: 1, maxLength: 6 }),
      async (contents, sizes) => {
        fc.pre(contents.every((content) => !Buffer.from(content).includes("\r\n--b")));
        const parts = contents.map((content, place) => ({ name: `n${place}`, content }));
        const found = await read(form(parts), sizes);
        expect(found.map(({ name, bytes, isEnded }) => ({ name, bytes, isEnded }))).toEqual(
          parts.map(({ name, content }) => ({ name, bytes: [...content], isEnded: true })),
        );
      },
    ),
    { numRuns: 300, seed: 7 },
  );
});

test("what only looks like a boundary belongs to the part", async () => {
  const content = "a\r\n--c\r\n-b\r\n--\r\r\n\n--b\r";
  const [part] = await read(form([{ name: "file", fileName: "a.csv", content }]), [1]);
  expect(Buffer.from(part?.bytes ?? []).toString()).toBe(content);
});

test("names are read as browsers write them", async () => {
  const [part] = await read(form([{ name: "f", fileName: "hill %22long%22; name=é.csv", content: "" }]));
  expect(part).toEqual({ name: "f", fileName: 'hill "long"; name=é.csv', bytes: [], isEnded: true });
});

test.each([
  ["nothing", ""],
  ["no beginning", "abc"],
  ["no end", '--b\r\nContent-Disposition: form-data; name="a"\r\n\r\nabc'],
  ["a part without a name", "--b\r\nContent-Type: text/plain\r\n\r\nabc\r\n--b--"],
  ["a head without an end", `--b\r\nX: ${"x".repeat(9000)}`],
  ["a boundary's line without an end", `--b${" ".repeat(200)}`],
])("%s is no whole form", async (_what, body) => {
  await expect(read(body)).rejects.toThrow(BrokenForm);
});

test("the boundary is found in the content type, quoted or not", () => {
  expect(boundaryOf("multipart/form-data; boundary=abc")).toBe("abc");
  expect(boundaryOf('Multipart/Form-Data; charset=utf-8; boundary="a b"')).toBe("a b");
  expect(boundaryOf("multipart/form-data")).toBeNull();
  expect(boundaryOf("application/json; boundary=abc")).toBeNull();
});

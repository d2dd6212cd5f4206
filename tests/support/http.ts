import { Agent, type IncomingHttpHeaders, request } from "node:http";

/** What came back. `body` holds text; `bytes` the same as it came. */
export type Answer = { status: number; headers: IncomingHttpHeaders; body: string; bytes: Buffer };

export type Asked = {
  method?: string;
  headers?: Record<string, string>;
  cookie?: string | undefined;
  token?: string | undefined;
  /** Sent as a browser on our own pages sends a form. */
  form?: Record<string, string> | readonly (readonly [string, string])[];
  /** Sent as it is; with it the caller names the type and where it came from. */
  body?: string | Buffer;
  upload?: { kind?: string; fileName: string; content: string | Uint8Array };
};

const agent = new Agent({ keepAlive: true, maxSockets: 16 });

function multipart({ kind, fileName, content }: NonNullable<Asked["upload"]>) {
  const boundary = "----a-form-of-the-tests";
  const kindPart =
    kind === undefined ? "" : `--${boundary}\r\nContent-Disposition: form-data; name="kind"\r\n\r\n${kind}\r\n`;
  const filePart = `--${boundary}\r\nContent-Disposition: form-data; name="file"; filename="${fileName}"\r\nContent-Type: text/csv\r\n\r\n`;
  return {
    type: `multipart/form-data; boundary=${boundary}`,
    body: Buffer.concat([
      Buffer.from(kindPart + filePart),
      Buffer.from(content),
      Buffer.from(`\r\n--${boundary}--\r\n`),
    ]),
  };
}

function isPairs(form: NonNullable<Asked["form"]>): form is readonly (readonly [string, string])[] {
  return Array.isArray(form);
}

function formOf(asked: Asked): { type: string; body: Buffer } | null {
  if (asked.upload) return multipart(asked.upload);
  if (!asked.form) return null;
  const pairs = isPairs(asked.form) ? asked.form : Object.entries(asked.form);
  return {
    type: "application/x-www-form-urlencoded;charset=UTF-8",
    body: Buffer.from(new URLSearchParams(pairs.map(([name, value]) => [name, value])).toString()),
  };
}

/**
 * One request exactly as described: no header is added but those that the form, the cookie and the token stand for.
 *
 * @param origin - of the server, which is also the Origin that a form names
 * @param path - with its query, sent as it is written
 */
export function askAt(origin: string, path: string, asked: Asked = {}): Promise<Answer> {
  const { hostname, port } = new URL(origin);
  const form = formOf(asked);
  const body = form?.body ?? asked.body;
  const headers: Record<string, string> = {
    ...(form ? { origin, "content-type": form.type } : {}),
    ...(asked.cookie === undefined ? {} : { cookie: asked.cookie }),
    ...(asked.token === undefined ? {} : { authorization: `Bearer ${asked.token}` }),
    ...(body === undefined ? {} : { "content-length": String(Buffer.byteLength(body)) }),
    ...asked.headers,
  };
  const method = asked.method ?? (form ? "POST" : "GET");
  return new Promise((resolve, reject) => {
    const sent = request({ hostname, port, path, method, headers, agent }, (response) => {
      const pieces: Buffer[] = [];
      response.on("data", (piece: Buffer) => pieces.push(piece));
      response.on("error", reject);
      response.on("end", () => {
        const bytes = Buffer.concat(pieces);
        resolve({ status: response.statusCode ?? 0, headers: response.headers, body: bytes.toString("utf8"), bytes });
      });
    });
    sent.on("error", reject).end(body);
  });
}

/** The Cookie header of a browser that holds this session's secret. */
export function cookieOf(secret: string): string {
  return `sid=${encodeURIComponent(Buffer.from(JSON.stringify(secret)).toString("base64"))}`;
}

/** Run `work` over all items, at most `width` at a time; results in the items' order. */
export async function inParallel<Item, Result>(
  items: readonly Item[],
  width: number,
  work: (item: Item) => Promise<Result>,
): Promise<Result[]> {
  const results = new Map<number, Result>();
  let next = 0;
  const lane = async () => {
    for (let place = next++; place < items.length; place = next++) {
      const item = items[place];
      if (item !== undefined) results.set(place, await work(item));
    }
  };
  await Promise.all(Array.from({ length: width }, lane));
  return [...results].sort(([a], [b]) => a - b).map(([, result]) => result);
}

import { type Answer, type Asked, askAt } from "./http.ts";

export type Seen = { url: URL; answer: Answer };

/**
 * As much of a browser as signing in takes: it keeps cookies, by host as browsers do, and follows redirects.
 *
 * `goTo` and `send` end at the first answer that redirects nowhere, or before an address that `stopBefore` names: then
 * that address is the result's, and the answer the one that led there.
 */
export class Browser {
  readonly cookies = new Map<string, string>();

  async goTo(address: string, stopBefore: (url: URL) => boolean = () => false): Promise<Seen> {
    return this.#follow(new URL(address), {}, stopBefore);
  }

  async send(address: string, form: Record<string, string>, stopBefore = (_url: URL) => false): Promise<Seen> {
    return this.#follow(new URL(address), { form }, stopBefore);
  }

  async #follow(first: URL, asked: Asked, stopBefore: (url: URL) => boolean): Promise<Seen> {
    let url = first;
    let answer = await this.#ask(url, asked);
    for (let turn = 0; turn < 20; turn++) {
      const { location } = answer.headers;
      if (location === undefined) return { url, answer };
      url = new URL(location, url);
      if (stopBefore(url)) return { url, answer };
      answer = await this.#ask(url, {});
    }
    throw new Error(`More than twenty redirects, the last to ${url.href}`);
  }

  async #ask(url: URL, asked: Asked): Promise<Answer> {
    const cookie = [...this.cookies].map(([name, value]) => `${name}=${value}`).join("; ");
    const answer = await askAt(url.origin, url.pathname + url.search, {
      ...asked,
      ...(cookie === "" ? {} : { cookie }),
    });
    for (const line of answer.headers["set-cookie"] ?? []) this.#keep(line);
    return answer;
  }

  #keep(line: string) {
    const [pair = "", ...attributes] = line.split(";").map((part) => part.trim());
    const [name = "", value = ""] = [pair.slice(0, pair.indexOf("=")), pair.slice(pair.indexOf("=") + 1)];
    const expires = attributes.find((attribute) => /^expires=/i.test(attribute))?.slice("expires=".length);
    const isOver = attributes.some((attribute) => /^max-age=0$/i.test(attribute));
    if (isOver || (expires !== undefined && Date.parse(expires) < Date.now())) this.cookies.delete(name);
    else this.cookies.set(name, value);
  }
}

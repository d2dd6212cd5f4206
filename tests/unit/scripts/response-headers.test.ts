import { expect, test } from "vitest";
import { defaultHeaders, headersFor } from "#scripts/response-headers.js";

const headers = defaultHeaders(new URL("https://network.example"));

test("the service worker may fetch from its own site and do nothing else", () => {
  const own = headersFor(headers, "/sw.js");
  expect(own["Content-Security-Policy"]).toBe("default-src 'none'; connect-src 'self'; frame-ancestors 'none'");
  expect({ ...own, "Content-Security-Policy": "" }).toEqual({ ...headers, "Content-Security-Policy": "" });
});

test.each(["/", "/assets/sw.js", "/sw.js/", "/SW.JS", "/sw.js.map"])(
  "%s has the policy of any other answer",
  (path) => {
    expect(headersFor(headers, path)).toBe(headers);
  },
);

test("an https address is to be asked for by https alone, a plain one is not", () => {
  expect(headers["Strict-Transport-Security"]).toBe("max-age=31536000; includeSubDomains");
  expect(defaultHeaders(new URL("http://127.0.0.1:4310"))).not.toHaveProperty("Strict-Transport-Security");
});

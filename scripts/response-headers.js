/**
 * The headers that every answer carries unless it sets its own: pages, files, errors, refusals.
 *
 * @param {URL} origin the public address; HSTS is sent only when it is https
 * @returns {Record<string, string>}
 */
export function defaultHeaders(origin) {
  return {
    "X-Content-Type-Options": "nosniff",
    "Referrer-Policy": "same-origin",
    "X-Frame-Options": "DENY",
    "Cross-Origin-Opener-Policy": "same-origin",
    "Cross-Origin-Resource-Policy": "same-origin",
    "Content-Security-Policy": "default-src 'none'; frame-ancestors 'none'",
    "Permissions-Policy": "camera=(), geolocation=(), microphone=(), payment=(), usb=()",
    "Cache-Control": "private, no-store",
    ...(origin.protocol === "https:" ? { "Strict-Transport-Security": "max-age=31536000; includeSubDomains" } : {}),
  };
}

/**
 * The default headers of one address: a service worker has a policy of its own, and fetches for the pages of this site.
 *
 * @param {Record<string, string>} headers the defaults
 * @param {string} path without its query
 * @returns {Record<string, string>}
 */
export function headersFor(headers, path) {
  if (path !== "/sw.js") return headers;
  return {
    ...headers,
    "Content-Security-Policy": "default-src 'none'; connect-src 'self'; frame-ancestors 'none'",
  };
}

/**
 * Fill in the default headers at the last moment, when it is known which ones the answer has set itself. Setting them
 * earlier would send some twice, since the framework adds headers instead of replacing them.
 *
 * @param {import("node:http").ServerResponse} response
 * @param {Record<string, string>} headers
 */
export function fillInHeaders(response, headers) {
  const writeHead = response.writeHead.bind(response);
  response.writeHead = (...given) => {
    for (const [name, value] of Object.entries(headers)) {
      if (!response.hasHeader(name)) response.setHeader(name, value);
    }
    return writeHead(...given);
  };
}

/**
 * The whole answer to a request that Node could not read: its parser gives a bare socket, no response to fill in.
 *
 * @param {string | undefined} code of the parser's error
 * @param {Record<string, string>} headers
 * @returns {string}
 */
export function unreadableRequestAnswer(code, headers) {
  const status =
    code === "HPE_HEADER_OVERFLOW"
      ? "431 Request Header Fields Too Large"
      : code === "ERR_HTTP_REQUEST_TIMEOUT"
        ? "408 Request Timeout"
        : "400 Bad Request";
  const lines = Object.entries({ ...headers, Connection: "close", "Content-Length": "0" });
  return `HTTP/1.1 ${status}\r\n${lines.map(([name, value]) => `${name}: ${value}\r\n`).join("")}\r\n`;
}

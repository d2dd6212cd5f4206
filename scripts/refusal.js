const methods = ["GET", "HEAD", "POST", "PUT", "PATCH", "DELETE"];
const bodyLimitBytes = 6_000_000;

/**
 * Why a request is turned away before the application sees it, or null when it is let through.
 *
 * @param {{ method: string, url: string, headers: import("node:http").IncomingHttpHeaders }} request
 * @param {string} host the only Host that is served; health checks may come under any
 * @returns {{ status: number, sentence: string, headers?: Record<string, string> } | null}
 */
export function refusalOf({ method, url, headers }, host) {
  if (!methods.includes(method)) {
    return { status: 405, sentence: "This method is not served.", headers: { Allow: methods.join(", ") } };
  }
  const path = decodedPath(url);
  if (path === null) return { status: 400, sentence: "This address is malformed." };
  if (headers.host !== host && path !== "/healthz")
    return { status: 421, sentence: "This address is not served here." };
  // A body in chunks says its length only once it is there. Browsers never send one, so none need be read.
  if (headers["transfer-encoding"] !== undefined) {
    return { status: 411, sentence: "Send the length of what you send.", headers: { Connection: "close" } };
  }
  if (Number(headers["content-length"] ?? 0) > bodyLimitBytes) {
    return { status: 413, sentence: "This is more than 6 MB. Send a smaller file.", headers: { Connection: "close" } };
  }
  return null;
}

/** @param {string} url @returns {string | null} */
function decodedPath(url) {
  if (!url.startsWith("/")) return null;
  try {
    return decodeURIComponent(url.split("?")[0] ?? "");
  } catch {
    return null;
  }
}

const methods = ["GET", "HEAD", "POST", "PUT", "PATCH", "DELETE"];
const bodyLimitBytes = 6_000_000;
/** Files of storm logs: 50 MB and what a form puts around it. */
const uploadLimitBytes = 53_000_000;

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
  const isUpload = isUploadOfFile({ method, url });
  if (Number(headers["content-length"] ?? 0) > (isUpload ? uploadLimitBytes : bodyLimitBytes)) {
    // The connection stays: closed in the middle of the sending, it would be all that a browser tells of the answer. What
    // still comes is thrown away, for as long as the server's time for one request.
    return { status: 413, sentence: `This is more than ${isUpload ? "50" : "6"} MB. Send a smaller file.` };
  }
  return null;
}

/**
 * Whether a file is being sent: the one request that may be large, and may take minutes over a poor line.
 *
 * @param {{ method: string, url: string }} request
 * @returns {boolean}
 */
export function isUploadOfFile({ method, url }) {
  return method === "POST" && /^\/uploads(?:\.data)?\/?(?:$|\?)/.test(url);
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

/** A file to keep, never shown in the page. `fileName` may hold letters, figures, points and dashes. */
export function downloadResponse(file: { fileName: string; contentType: string; body: string }): Response {
  return new Response(file.body, {
    headers: {
      "Content-Type": file.contentType,
      "Content-Disposition": `attachment; filename="${file.fileName.replace(/[^\w.-]/g, "-")}"`,
    },
  });
}

/** A CSV file to keep. */
export function csvResponse(fileName: string, body: string): Response {
  return downloadResponse({ fileName, contentType: "text/csv; charset=utf-8", body });
}

/** A file's name for the header of a download: in ASCII, and as it is for those who can read that. */
function disposition(fileName: string) {
  const plain = fileName.replace(/[^\w.-]/g, "-");
  return `attachment; filename="${plain}"; filename*=UTF-8''${encodeURIComponent(fileName).replace(/['()*]/g, "-")}`;
}

/**
 * A file of any size to keep, sent as it is made.
 *
 * @param file.pieces - text or bytes in order; closed when the reader goes away
 */
export function streamedResponse(file: {
  fileName: string;
  contentType: string;
  pieces: AsyncGenerator<string | Uint8Array>;
}): Response {
  const encoder = new TextEncoder();
  const body = new ReadableStream<Uint8Array>({
    async pull(controller) {
      const next = await file.pieces.next();
      if (next.done === true) controller.close();
      else
        controller.enqueue(typeof next.value === "string" ? encoder.encode(next.value) : Uint8Array.from(next.value));
    },
    async cancel() {
      await file.pieces.return(undefined);
    },
  });
  return new Response(body, {
    headers: { "Content-Type": file.contentType, "Content-Disposition": disposition(file.fileName) },
  });
}

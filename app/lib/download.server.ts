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

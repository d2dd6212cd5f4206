/**
 * The body as text, or null when it is longer than may be; the rest is then not read.
 *
 * @param mostBytes - of the body, after decompression
 * @param signal - ends a body that hangs
 * @throws the signal's reason once it is aborted
 */
export async function boundedText(response: Response, mostBytes: number, signal: AbortSignal): Promise<string | null> {
  if (!response.body) return "";
  const reader = response.body.getReader();
  const decoder = new TextDecoder();
  // Not waited for: a stream with a second reader ends its cancelling only when that one ends too.
  const stop = () => void reader.cancel().catch(() => undefined);
  signal.addEventListener("abort", stop);
  try {
    let text = "";
    let byteCount = 0;
    for (;;) {
      const { done, value } = await reader.read();
      signal.throwIfAborted();
      if (done) return text + decoder.decode();
      byteCount += value.byteLength;
      if (byteCount > mostBytes) {
        stop();
        return null;
      }
      text += decoder.decode(value, { stream: true });
    }
  } finally {
    signal.removeEventListener("abort", stop);
  }
}

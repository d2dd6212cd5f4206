import { createRequire } from "node:module";
import { Worker } from "node:worker_threads";
import { z } from "zod";
import { assertLength, FileError, sheetLimits, type SheetRow } from "./file-error.ts";
import workerSource from "./workbook-worker.js?raw";

/** What a workbook may be once unpacked, and what reading it may take. */
const limits = {
  entries: 200,
  unpackedBytes: 100 * 1024 * 1024,
  ratio: 100,
  columns: sheetLimits.columns,
  cellCharacters: sheetLimits.cellCharacters,
};
const heapMb = 384;
/** For a batch of a thousand rows, not for the whole sheet. */
const patienceMs = 30_000;

const Message = z.union([
  z.object({ names: z.array(z.string()) }),
  z.object({
    rows: z.array(z.tuple([z.number(), z.array(z.union([z.string(), z.number()])), z.array(z.number())])),
  }),
  z.object({ end: z.literal(true) }),
  z.object({ refusal: z.object({ code: z.string(), message: z.string() }) }),
]);
type Message = z.infer<typeof Message>;

const tooLarge = new FileError(
  "too-large",
  "This workbook is too large to be read. Save the one sheet you need as CSV and upload that.",
);

/** The thread's messages one after the other, each asked for when the one before has been dealt with. */
async function* messagesOf(worker: Worker): AsyncGenerator<Message> {
  const waiting: Message[] = [];
  let failure: unknown = null;
  let isOver = false;
  let wake = () => {};
  worker.on("message", (message: unknown) => {
    waiting.push(Message.parse(message));
    wake();
  });
  worker.on("error", (error) => {
    failure = "code" in error && error.code === "ERR_WORKER_OUT_OF_MEMORY" ? tooLarge : error;
    wake();
  });
  worker.on("exit", () => {
    isOver = true;
    wake();
  });
  for (;;) {
    const message = waiting.shift();
    if (message) {
      yield message;
      worker.postMessage("next");
      continue;
    }
    if (failure !== null) throw failure;
    if (isOver) return;
    const patience = setTimeout(() => {
      failure = tooLarge;
      wake();
    }, patienceMs);
    await new Promise<void>((resolve) => (wake = resolve));
    clearTimeout(patience);
  }
}

async function* read(path: string, sheetName: string | null, isNamesOnly: boolean): AsyncGenerator<Message> {
  const require = createRequire(import.meta.url);
  const modules = { exceljs: require.resolve("exceljs"), yauzl: require.resolve("yauzl") };
  const worker = new Worker(workerSource, {
    eval: true,
    workerData: { path, sheetName, isNamesOnly, modules, limits },
    resourceLimits: { maxOldGenerationSizeMb: heapMb },
    env: {},
    stdout: true,
    stderr: true,
  });
  try {
    for await (const message of messagesOf(worker)) {
      if ("refusal" in message) throw new FileError(message.refusal.code, message.refusal.message);
      yield message;
      if ("end" in message) return;
    }
  } finally {
    await worker.terminate();
  }
}

/**
 * The names of a workbook's visible sheets, in its order.
 *
 * @param path - of the file; nothing of it is run, and links out of it are not followed
 * @throws FileError when it is no workbook, or one that is not opened: macros, a password, a bomb
 */
export async function sheetNames(path: string): Promise<string[]> {
  for await (const message of read(path, null, true)) if ("names" in message) return message.names;
  return [];
}

/**
 * The rows of one sheet, read in a thread with a heap of its own.
 *
 * @param path - of the file
 * @param sheetName - which sheet; the first visible one when null or no longer there
 * @returns batches of rows that are not blank; days as YYYY-MM-DD, with HH:MM when there is a time, formulas by their
 *   last result
 * @throws FileError as sheetNames, and when the sheet is too long, too wide or damaged
 */
export async function* workbookRows(path: string, sheetName: string | null): AsyncGenerator<SheetRow[]> {
  let rowCount = 0;
  for await (const message of read(path, sheetName, false)) {
    if (!("rows" in message)) continue;
    rowCount += message.rows.length;
    assertLength(rowCount);
    yield message.rows.map(([row, cells, formulaColumns]) =>
      formulaColumns.length > 0 ? { row, cells, formulaColumns } : { row, cells },
    );
  }
}

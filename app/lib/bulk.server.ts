import type { Transaction } from "sequelize";

type Cell = string | number | Buffer | Date | null;
type BatchConnection = { batch: (sql: string, rows: Cell[][]) => Promise<unknown> };

function canBatch(connection: unknown): connection is BatchConnection {
  return (
    typeof connection === "object" &&
    connection !== null &&
    "batch" in connection &&
    typeof connection.batch === "function"
  );
}

/** Carries the database's error the way models do, so that whoever asks for its code finds it. */
class BulkError extends Error {
  readonly original: unknown;

  constructor(original: unknown) {
    super("Rows could not be inserted in bulk.", { cause: original });
    this.original = original;
  }
}

/** Rows sent to the database at a time. */
export const bulkRows = 1000;

/**
 * Insert many rows in a transaction, by the connector's own bulk protocol: some ten times as fast as through models.
 *
 * @param sql - an INSERT with one question mark for each cell
 * @param rows - cells in the order of the question marks; none is fine
 * @param transaction - whose connection is used
 */
export async function insertRows(sql: string, rows: Cell[][], transaction: Transaction): Promise<void> {
  const connection: unknown = Reflect.get(transaction, "connection");
  if (!canBatch(connection)) throw new Error("This transaction has no connection that can take rows in bulk.");
  for (let start = 0; start < rows.length; start += bulkRows) {
    try {
      await connection.batch(sql, rows.slice(start, start + bulkRows));
    } catch (error) {
      throw new BulkError(error);
    }
  }
}

import { generateRegion } from "./generate.js";

// A table comes after those its rows point to.
const tablesInOrder = [
  "town",
  "user_account",
  "material",
  "truck",
  "season",
  "season_figure",
  "calibration",
  "calibration_count",
  "calibration_catch",
  "calibration_verification",
  "calibration_liquid",
  "truck_material",
  "truck_work",
  "job",
];

/**
 * Put the demo region into an empty, migrated database: everything in one transaction, or nothing.
 *
 * @param {object} options
 * @param {import("mariadb").Connection} options.connection - may insert into every table
 * @param {string} options.issuer - identity provider the demo people sign in with
 * @param {Date} options.now - when the editions of the past seasons fall due to be published
 * @returns {Promise<Record<string, number>>} rows put in, by table
 * @throws {Error} when the database already holds a town
 */
export async function loadDemo({ connection, issuer, now }) {
  const region = generateRegion();
  const instant = now.toISOString().replace("T", " ").replace("Z", "");
  const rowsByTable = {
    ...region,
    town: parentsFirst(region.town),
    user_account: region.user_account.map((row) => ({ ...row, issuer })),
    job: region.job.map((row) => ({ ...row, run_after: instant, created_at: instant })),
  };

  await connection.beginTransaction();
  try {
    const [{ townCount }] = await connection.query("SELECT COUNT(*) AS townCount FROM town");
    if (Number(townCount) > 0) throw new Error("The demo region is only loaded into a database without towns.");
    const rowCounts = {};
    for (const table of tablesInOrder) {
      await insertRows(connection, table, rowsByTable[table]);
      rowCounts[table] = rowsByTable[table].length;
    }
    await connection.commit();
    return rowCounts;
  } catch (error) {
    await connection.rollback();
    throw error;
  }
}

/** A town that reports through another points to it, so the other has to stand first. */
function parentsFirst(towns) {
  return [
    ...towns.filter((town) => town.reports_through_town_id === null),
    ...towns.filter((town) => town.reports_through_town_id !== null),
  ];
}

async function insertRows(connection, table, rows) {
  const columns = Object.keys(rows[0]);
  const names = columns.map((column) => `\`${column}\``).join(", ");
  const marks = columns.map(() => "?").join(", ");
  await connection.batch(
    `INSERT INTO \`${table}\` (${names}) VALUES (${marks})`,
    rows.map((row) => columns.map((column) => row[column])),
  );
}

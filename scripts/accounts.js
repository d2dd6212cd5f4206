import { administer } from "./mariadb.js";

/** Tables whose rows are written once: the application may add to them and read them, nothing else. */
const writeOnceTables = [
  "audit_entry",
  "edition",
  "edition_cell",
  "edition_row",
  "edition_member",
  "edition_place",
  "figure_version",
  "figure_note",
];
const readOnlyTables = ["schema_migration"];

/**
 * Create the database and its two accounts, give them their present passwords, and remove accounts that nobody needs.
 *
 * @param {object} given
 * @param {string} given.socket
 * @param {string} given.database letters, digits and underscores
 * @param {string} given.migratorPassword
 * @param {string} given.appPassword
 */
export function prepareDatabase({ socket, database, migratorPassword, appPassword }) {
  assertPlainName(database);
  const superfluous = administer(
    socket,
    "SELECT User, Host FROM mysql.global_priv WHERE User = '' OR (User = 'root' AND Host <> 'localhost')",
  );
  administer(
    socket,
    [
      ...superfluous.map(([user, host]) => `DROP USER IF EXISTS '${user}'@'${host}'`),
      `CREATE DATABASE IF NOT EXISTS ${database} CHARACTER SET utf8mb4 COLLATE utf8mb4_unicode_ci`,
      "CREATE USER IF NOT EXISTS 'migrator'@'127.0.0.1'",
      `ALTER USER 'migrator'@'127.0.0.1' IDENTIFIED BY '${plain(migratorPassword)}'`,
      // In a grant an underscore stands for any character unless it is escaped.
      `GRANT ALL PRIVILEGES ON \`${database.replaceAll("_", "\\_")}\`.* TO 'migrator'@'127.0.0.1'`,
      "CREATE USER IF NOT EXISTS 'app'@'127.0.0.1'",
      `ALTER USER 'app'@'127.0.0.1' IDENTIFIED BY '${plain(appPassword)}'`,
    ].join(";\n"),
  );
}

/**
 * Bring the application's rights on every table of the database to what they should be.
 *
 * @param {{ socket: string, database: string }} given
 */
export function applyGrants({ socket, database }) {
  assertPlainName(database);
  const tables = administer(
    socket,
    `SELECT TABLE_NAME FROM information_schema.TABLES WHERE TABLE_SCHEMA = '${database}'`,
  );
  const held = administer(
    socket,
    `SELECT TABLE_NAME, PRIVILEGE_TYPE FROM information_schema.TABLE_PRIVILEGES
     WHERE TABLE_SCHEMA = '${database}' AND GRANTEE = '''app''@''127.0.0.1'''`,
  );
  const statements = grantStatements({
    database,
    tables: tables.map(([table]) => table ?? ""),
    held: held.map(([table, right]) => ({ table: table ?? "", right: right ?? "" })),
  });
  if (statements.length > 0) administer(socket, statements.join(";\n"));
}

/**
 * The statements that lead from the rights held to the rights wanted; none when they are the same.
 *
 * @param {object} given
 * @param {string} given.database
 * @param {readonly string[]} given.tables all tables there are
 * @param {readonly { table: string, right: string }[]} given.held what the application's account may do now
 * @returns {string[]}
 * @example grantStatements({ database: "d", tables: ["town"], held: [] })[0]
 *   // "GRANT SELECT, INSERT, UPDATE, DELETE ON `d`.`town` TO 'app'@'127.0.0.1'"
 */
export function grantStatements({ database, tables, held }) {
  return tables.flatMap((table) => {
    const wanted = rightsOn(table);
    const present = held.filter((entry) => entry.table === table).map(({ right }) => right);
    const missing = wanted.filter((right) => !present.includes(right));
    const excess = present.filter((right) => !wanted.includes(right));
    return [
      ...(missing.length > 0
        ? [`GRANT ${missing.join(", ")} ON \`${database}\`.\`${table}\` TO 'app'@'127.0.0.1'`]
        : []),
      ...(excess.length > 0
        ? [`REVOKE ${excess.join(", ")} ON \`${database}\`.\`${table}\` FROM 'app'@'127.0.0.1'`]
        : []),
    ];
  });
}

/** @param {string} table */
function rightsOn(table) {
  if (readOnlyTables.includes(table)) return ["SELECT"];
  return writeOnceTables.includes(table) ? ["SELECT", "INSERT"] : ["SELECT", "INSERT", "UPDATE", "DELETE"];
}

/** @param {string} name */
function assertPlainName(name) {
  if (!/^[a-z0-9_]{1,60}$/.test(name))
    throw new RangeError("a database's name has letters, digits and underscores only");
}

/** @param {string} password base64url, so that it needs no quoting @returns {string} */
function plain(password) {
  if (!/^[\w-]{16,}$/.test(password))
    throw new RangeError("a database password is base64url and has 16 characters or more");
  return password;
}

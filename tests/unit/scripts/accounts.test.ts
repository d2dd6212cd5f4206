import { expect, test } from "vitest";
import { grantStatements } from "#scripts/accounts.js";

const to = "'app'@'127.0.0.1'";

test("the application may change a town, only add to the audit trail, and only read what has been migrated", () => {
  expect(grantStatements({ database: "d", tables: ["town", "audit_entry", "schema_migration"], held: [] })).toEqual([
    `GRANT SELECT, INSERT, UPDATE, DELETE ON \`d\`.\`town\` TO ${to}`,
    `GRANT SELECT, INSERT ON \`d\`.\`audit_entry\` TO ${to}`,
    `GRANT SELECT ON \`d\`.\`schema_migration\` TO ${to}`,
  ]);
});

test.each(["audit_entry", "edition", "edition_cell", "edition_row", "edition_member", "edition_place"])(
  "%s cannot be changed or emptied",
  (table) => {
    const [statement] = grantStatements({ database: "d", tables: [table], held: [] });
    expect(statement).toMatch(/^GRANT SELECT, INSERT ON /);
  },
);

test("rights already held are left alone, too many are taken back", () => {
  const held = ["SELECT", "INSERT", "UPDATE"].map((right) => ({ table: "edition", right }));
  expect(grantStatements({ database: "d", tables: ["edition"], held })).toEqual([
    `REVOKE UPDATE ON \`d\`.\`edition\` FROM ${to}`,
  ]);
  expect(grantStatements({ database: "d", tables: ["edition"], held: held.slice(0, 2) })).toEqual([]);
});

import type { Connection } from "mariadb";

/**
 * A network in which nothing has happened yet: one town without a truck, one season asked for, and one person of each
 * role, who can sign in as the demo people do.
 */
export async function newNetwork(connection: Connection, issuer: string): Promise<void> {
  await connection.query(
    "INSERT INTO town (id, name, district, created_at) VALUES (1, 'Quillbrook', 'Upper Tarn', UTC_TIMESTAMP(3))",
  );
  await connection.query("INSERT INTO season (start_year, figures_due_on) VALUES (2025, '2026-08-31')");
  const people = [
    ["ilse.tarrant", "Ilse Tarrant", "coordinator", null],
    ["maren.oake", "Maren Oake", "director", 1],
    ["ruben.vale", "Ruben Vale", "analyst", null],
  ];
  await connection.batch(
    `INSERT INTO user_account (issuer, subject, name, email, role, town_id, is_active, created_at)
     VALUES (?, ?, ?, CONCAT(?, '@tarnvalley.example'), ?, ?, 1, UTC_TIMESTAMP(3))`,
    people.map(([subject, name, role, townId]) => [issuer, subject, name, subject, role, townId]),
  );
}

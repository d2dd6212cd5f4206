/** Trucks come by file, too. */
export async function up({ sql }) {
  await sql(`ALTER TABLE upload DROP CONSTRAINT IF EXISTS upload_kind,
    ADD CONSTRAINT upload_kind CHECK (kind IN ('season-figures','calibrations','trucks'))`);
}

export async function down({ sql }) {
  await sql("DELETE FROM upload WHERE kind = 'trucks'");
  await sql(`ALTER TABLE upload DROP CONSTRAINT IF EXISTS upload_kind,
    ADD CONSTRAINT upload_kind CHECK (kind IN ('season-figures','calibrations'))`);
}

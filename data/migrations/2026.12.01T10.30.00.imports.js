/** Uploads of any size: the file in pieces, its rows staged one by one, and what a town has said about its files. */
export async function up({ sql }) {
  await sql(`CREATE TABLE IF NOT EXISTS upload_chunk (
    upload_id INT UNSIGNED NOT NULL,
    position INT UNSIGNED NOT NULL,
    content MEDIUMBLOB NOT NULL COMMENT 'at most 1 MB of the file, in order',
    PRIMARY KEY (upload_id, position),
    CONSTRAINT upload_chunk_of FOREIGN KEY (upload_id) REFERENCES upload (id) ON DELETE CASCADE
  ) ENGINE=InnoDB`);
  await sql(`ALTER TABLE upload
    DROP CONSTRAINT IF EXISTS upload_kind,
    DROP CONSTRAINT IF EXISTS upload_state,
    MODIFY COLUMN content MEDIUMBLOB NULL,
    ADD COLUMN IF NOT EXISTS format VARCHAR(4) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'csv',
    ADD COLUMN IF NOT EXISTS encoding VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'utf-8',
    ADD COLUMN IF NOT EXISTS matching JSON NULL COMMENT 'the sheet, the row of heads, what each column holds, how figures and days are written',
    ADD COLUMN IF NOT EXISTS run INT UNSIGNED NOT NULL DEFAULT 0 COMMENT 'counts the steps begun; an older one writes nothing more',
    ADD COLUMN IF NOT EXISTS rows_total INT UNSIGNED NULL COMMENT 'an estimate until the file has been read',
    ADD COLUMN IF NOT EXISTS rows_read INT UNSIGNED NOT NULL DEFAULT 0,
    ADD COLUMN IF NOT EXISTS rows_ok INT UNSIGNED NOT NULL DEFAULT 0,
    ADD COLUMN IF NOT EXISTS rows_check INT UNSIGNED NOT NULL DEFAULT 0,
    ADD COLUMN IF NOT EXISTS rows_error INT UNSIGNED NOT NULL DEFAULT 0,
    ADD COLUMN IF NOT EXISTS rows_left_out INT UNSIGNED NOT NULL DEFAULT 0,
    ADD COLUMN IF NOT EXISTS failure VARCHAR(400) NULL COMMENT 'why the file, or the last step, came to nothing',
    ADD COLUMN IF NOT EXISTS period_start DATE NULL,
    ADD COLUMN IF NOT EXISTS period_end DATE NULL,
    ADD COLUMN IF NOT EXISTS is_replacing TINYINT(1) NOT NULL DEFAULT 1 COMMENT 'whether earlier files of the same days give way',
    ADD COLUMN IF NOT EXISTS rows_accepted INT UNSIGNED NULL`);
  await sql("INSERT IGNORE INTO upload_chunk SELECT id, 0, content FROM upload WHERE content IS NOT NULL");
  await sql(
    "UPDATE upload SET rows_read = row_count, rows_ok = row_count, rows_accepted = row_count WHERE state = 'accepted'",
  );
  // What was checked before the rows were staged one by one is checked anew by the worker.
  await sql(`INSERT IGNORE INTO job (kind, payload, dedupe_key, run_after, created_by_id, created_at)
    SELECT 'upload-read', JSON_OBJECT('uploadId', id, 'run', 1), CONCAT('upload:', id, ':1'), UTC_TIMESTAMP(3),
      created_by_id, UTC_TIMESTAMP(3) FROM upload WHERE state = 'checked'`);
  await sql("UPDATE upload SET state = 'received', run = 1 WHERE state = 'checked'");
  await sql(`ALTER TABLE upload
    DROP COLUMN IF EXISTS content,
    DROP COLUMN IF EXISTS staged,
    DROP COLUMN IF EXISTS problems,
    DROP COLUMN IF EXISTS row_count,
    ADD CONSTRAINT upload_kind CHECK (kind IN ('season-figures','calibrations','trucks','storms','stock','weather')),
    ADD CONSTRAINT upload_format CHECK (format IN ('csv','xlsx')),
    ADD CONSTRAINT upload_state CHECK (state IN
      ('received','matching','checking','checked','accepting','accepted','cancelled','failed'))`);
  await sql(`CREATE TABLE IF NOT EXISTS upload_row (
    upload_id INT UNSIGNED NOT NULL,
    sheet_row INT UNSIGNED NOT NULL COMMENT 'as a spreadsheet counts',
    state VARCHAR(8) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    cells MEDIUMTEXT NULL COMMENT 'JSON array, as the file has them; kept of rows that are not ready',
    staged MEDIUMTEXT NULL COMMENT 'JSON, in storage units; none while an error stands',
    PRIMARY KEY (upload_id, sheet_row),
    KEY upload_row_state (upload_id, state, sheet_row),
    CONSTRAINT upload_row_of FOREIGN KEY (upload_id) REFERENCES upload (id) ON DELETE CASCADE,
    CONSTRAINT upload_row_state_known CHECK (state IN ('ok','check','error','left-out'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS upload_problem (
    upload_id INT UNSIGNED NOT NULL,
    sheet_row INT UNSIGNED NOT NULL COMMENT '0 for the file as a whole',
    position INT UNSIGNED NOT NULL,
    field VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT '' COMMENT 'empty for the row as a whole',
    value VARCHAR(40) NULL COMMENT 'what stands there',
    code VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    severity VARCHAR(5) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    message VARCHAR(400) NOT NULL,
    PRIMARY KEY (upload_id, sheet_row, position),
    KEY upload_problem_kind (upload_id, code, field),
    CONSTRAINT upload_problem_of FOREIGN KEY (upload_id) REFERENCES upload (id) ON DELETE CASCADE,
    CONSTRAINT upload_problem_severity CHECK (severity IN ('error','check'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS upload_answer (
    upload_id INT UNSIGNED NOT NULL,
    sheet_row INT UNSIGNED NOT NULL,
    subject VARCHAR(48) CHARACTER SET ascii COLLATE ascii_bin NOT NULL COMMENT 'a field, stands:<code>, or left-out',
    answer VARCHAR(300) NOT NULL DEFAULT '' COMMENT 'what the cell should say',
    PRIMARY KEY (upload_id, sheet_row, subject),
    CONSTRAINT upload_answer_of FOREIGN KEY (upload_id) REFERENCES upload (id) ON DELETE CASCADE
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS upload_replacement (
    upload_id INT UNSIGNED NOT NULL,
    replaced_upload_id INT UNSIGNED NOT NULL,
    row_count INT UNSIGNED NOT NULL,
    PRIMARY KEY (upload_id, replaced_upload_id),
    CONSTRAINT upload_replacement_by FOREIGN KEY (upload_id) REFERENCES upload (id),
    CONSTRAINT upload_replacement_of FOREIGN KEY (replaced_upload_id) REFERENCES upload (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS column_match (
    town_id INT UNSIGNED NOT NULL,
    kind VARCHAR(20) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    head VARCHAR(120) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'small letters, without marks',
    field VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT '' COMMENT 'empty for a column that is not used',
    unit VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NULL,
    PRIMARY KEY (town_id, kind, head),
    CONSTRAINT column_match_town FOREIGN KEY (town_id) REFERENCES town (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS other_name (
    town_id INT UNSIGNED NOT NULL,
    sort VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    name VARCHAR(120) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL COMMENT 'small letters, as a file writes it',
    meaning VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NOT NULL COMMENT 'the id of the truck or material, or the kind',
    upload_id INT UNSIGNED NULL COMMENT 'in which it was settled',
    PRIMARY KEY (town_id, sort, name),
    CONSTRAINT other_name_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT other_name_upload FOREIGN KEY (upload_id) REFERENCES upload (id) ON DELETE SET NULL,
    CONSTRAINT other_name_sort CHECK (sort IN ('truck','material','storm-kind'))
  ) ENGINE=InnoDB`);
  await sql(`ALTER TABLE storm
    ADD COLUMN IF NOT EXISTS upload_row INT UNSIGNED NULL COMMENT 'the row of the file it came from',
    ADD UNIQUE KEY IF NOT EXISTS storm_of_upload_row (upload_id, upload_row)`);
  await sql("ALTER TABLE storm DROP KEY IF EXISTS storm_of_upload");
  await sql(`ALTER TABLE stock_entry
    ADD COLUMN IF NOT EXISTS upload_row INT UNSIGNED NULL COMMENT 'the row of the file it came from',
    ADD UNIQUE KEY IF NOT EXISTS stock_entry_of_upload_row (upload_id, upload_row)`);
}

export async function down({ sql }) {
  await sql("ALTER TABLE storm ADD KEY IF NOT EXISTS storm_of_upload (upload_id)");
  await sql("ALTER TABLE storm DROP KEY IF EXISTS storm_of_upload_row, DROP COLUMN IF EXISTS upload_row");
  await sql("ALTER TABLE stock_entry ADD KEY IF NOT EXISTS stock_entry_upload (upload_id)");
  await sql("ALTER TABLE stock_entry DROP KEY IF EXISTS stock_entry_of_upload_row, DROP COLUMN IF EXISTS upload_row");
  for (const table of [
    "other_name",
    "column_match",
    "upload_replacement",
    "upload_answer",
    "upload_problem",
    "upload_row",
  ]) {
    await sql(`DROP TABLE IF EXISTS ${table}`);
  }
  await sql(`ALTER TABLE upload
    DROP CONSTRAINT IF EXISTS upload_kind,
    DROP CONSTRAINT IF EXISTS upload_state,
    DROP CONSTRAINT IF EXISTS upload_format,
    ADD COLUMN IF NOT EXISTS content MEDIUMBLOB NOT NULL DEFAULT '',
    ADD COLUMN IF NOT EXISTS row_count INT UNSIGNED NOT NULL DEFAULT 0,
    ADD COLUMN IF NOT EXISTS staged JSON NOT NULL DEFAULT '[]',
    ADD COLUMN IF NOT EXISTS problems JSON NOT NULL DEFAULT '[]'`);
  // What the older program does not know it cannot keep: other kinds of file, and files above its limit.
  const lost =
    "SELECT id FROM upload WHERE kind NOT IN ('season-figures','calibrations','trucks') OR byte_count > 5242880";
  for (const table of ["storm", "stock_entry", "season_figure", "calibration"]) {
    await sql(`UPDATE ${table} SET upload_id = NULL WHERE upload_id IN (${lost})`);
  }
  await sql("DELETE FROM upload WHERE kind NOT IN ('season-figures','calibrations','trucks') OR byte_count > 5242880");
  await sql("SET SESSION group_concat_max_len = 16777215");
  await sql(`UPDATE upload u SET row_count = rows_read, content = COALESCE(
    (SELECT GROUP_CONCAT(c.content ORDER BY c.position SEPARATOR '') FROM upload_chunk c WHERE c.upload_id = u.id), '')`);
  await sql("UPDATE upload SET state = 'checked' WHERE state <> 'accepted'");
  await sql("DROP TABLE IF EXISTS upload_chunk");
  await sql(`ALTER TABLE upload
    DROP COLUMN IF EXISTS format,
    DROP COLUMN IF EXISTS encoding,
    DROP COLUMN IF EXISTS matching,
    DROP COLUMN IF EXISTS run,
    DROP COLUMN IF EXISTS rows_total,
    DROP COLUMN IF EXISTS rows_read,
    DROP COLUMN IF EXISTS rows_ok,
    DROP COLUMN IF EXISTS rows_check,
    DROP COLUMN IF EXISTS rows_error,
    DROP COLUMN IF EXISTS rows_left_out,
    DROP COLUMN IF EXISTS failure,
    DROP COLUMN IF EXISTS period_start,
    DROP COLUMN IF EXISTS period_end,
    DROP COLUMN IF EXISTS is_replacing,
    DROP COLUMN IF EXISTS rows_accepted,
    ADD CONSTRAINT upload_kind CHECK (kind IN ('season-figures','calibrations','trucks')),
    ADD CONSTRAINT upload_state CHECK (state IN ('checked','accepted'))`);
}

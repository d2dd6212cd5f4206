/** What a return is besides its amounts: every version that was sent, the coordinator's notes by field, and questions. */
export async function up({ sql }) {
  await sql(`ALTER TABLE storm
    ADD COLUMN IF NOT EXISTS client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NULL
      COMMENT 'named by the page that typed it, so that sending it twice stores it once',
    ADD UNIQUE KEY IF NOT EXISTS storm_client_ref (client_ref)`);
  await sql(`ALTER TABLE season_figure
    ADD COLUMN IF NOT EXISTS lane_miles_treated DOUBLE NULL,
    ADD COLUMN IF NOT EXISTS wetted_salt_lb DOUBLE NULL COMMENT 'salt wetted before or while it was spread',
    ADD COLUMN IF NOT EXISTS stock_used_lb DOUBLE NULL COMMENT 'all solids, by the piles',
    ADD COLUMN IF NOT EXISTS stock_logged_lb DOUBLE NULL COMMENT 'the same solids, by the storm log'`);
  await sql(`CREATE TABLE IF NOT EXISTS figure_version (
    figure_id INT UNSIGNED NOT NULL,
    version INT UNSIGNED NOT NULL,
    content JSON NOT NULL COMMENT 'the amounts as they were sent, in storage units',
    sent_at DATETIME(3) NOT NULL,
    sent_by_id INT UNSIGNED NOT NULL,
    PRIMARY KEY (figure_id, version),
    CONSTRAINT figure_version_of FOREIGN KEY (figure_id) REFERENCES season_figure (id),
    CONSTRAINT figure_version_sender FOREIGN KEY (sent_by_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS figure_note (
    figure_id INT UNSIGNED NOT NULL,
    version INT UNSIGNED NOT NULL COMMENT 'the sent version it is about',
    field VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    note VARCHAR(500) NOT NULL,
    PRIMARY KEY (figure_id, version, field),
    CONSTRAINT figure_note_of FOREIGN KEY (figure_id) REFERENCES season_figure (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS figure_question (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    figure_id INT UNSIGNED NOT NULL,
    version INT UNSIGNED NOT NULL COMMENT 'the sent version it is about',
    question VARCHAR(2000) NOT NULL,
    asked_at DATETIME(3) NOT NULL,
    asked_by_id INT UNSIGNED NOT NULL,
    answer VARCHAR(2000) NULL,
    answered_at DATETIME(3) NULL,
    answered_by_id INT UNSIGNED NULL,
    KEY figure_question_of_figure (figure_id, id),
    CONSTRAINT figure_question_of FOREIGN KEY (figure_id) REFERENCES season_figure (id),
    CONSTRAINT figure_question_asker FOREIGN KEY (asked_by_id) REFERENCES user_account (id),
    CONSTRAINT figure_question_answerer FOREIGN KEY (answered_by_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  for (const table of ["figure_question", "figure_note", "figure_version"]) await sql(`DROP TABLE IF EXISTS ${table}`);
  await sql(`ALTER TABLE season_figure
    DROP COLUMN IF EXISTS lane_miles_treated, DROP COLUMN IF EXISTS wetted_salt_lb,
    DROP COLUMN IF EXISTS stock_used_lb, DROP COLUMN IF EXISTS stock_logged_lb`);
  await sql("ALTER TABLE storm DROP KEY IF EXISTS storm_client_ref, DROP COLUMN IF EXISTS client_ref");
}

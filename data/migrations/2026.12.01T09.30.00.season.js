/** Seasons, what a town sends in for one, and the files it came from. */
export async function up({ sql }) {
  await sql(`CREATE TABLE IF NOT EXISTS season (
    start_year INT UNSIGNED NOT NULL PRIMARY KEY COMMENT '2025 is the winter 2025-26',
    figures_due_on DATE NOT NULL
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS upload (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NOT NULL,
    kind VARCHAR(20) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    file_name VARCHAR(200) NOT NULL,
    byte_count INT UNSIGNED NOT NULL,
    sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    content MEDIUMBLOB NOT NULL,
    row_count INT UNSIGNED NOT NULL,
    staged JSON NOT NULL COMMENT 'the checked rows, in storage units; empty while a problem stands',
    problems JSON NOT NULL,
    state VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    created_by_id INT UNSIGNED NOT NULL,
    created_at DATETIME(3) NOT NULL,
    settled_by_id INT UNSIGNED NULL,
    settled_at DATETIME(3) NULL,
    UNIQUE KEY upload_once (town_id, kind, sha256),
    CONSTRAINT upload_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT upload_creator FOREIGN KEY (created_by_id) REFERENCES user_account (id),
    CONSTRAINT upload_settler FOREIGN KEY (settled_by_id) REFERENCES user_account (id),
    CONSTRAINT upload_kind CHECK (kind IN ('season-figures','calibrations')),
    CONSTRAINT upload_state CHECK (state IN ('checked','accepted'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS season_figure (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NOT NULL,
    season_start_year INT UNSIGNED NOT NULL,
    state VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'draft',
    version INT UNSIGNED NOT NULL DEFAULT 1,
    lane_miles DOUBLE NOT NULL,
    event_count INT UNSIGNED NOT NULL,
    salt_lb DOUBLE NOT NULL,
    mix_lb DOUBLE NOT NULL,
    mix_salt_share DOUBLE NULL COMMENT '0 to 1 by weight; null when no mix was used',
    sand_lb DOUBLE NOT NULL,
    brine_gal DOUBLE NULL,
    material_cost_cents INT UNSIGNED NULL,
    upload_id INT UNSIGNED NULL,
    review_note TEXT NULL,
    created_at DATETIME(3) NOT NULL,
    sent_at DATETIME(3) NULL,
    sent_by_id INT UNSIGNED NULL,
    reviewed_at DATETIME(3) NULL,
    reviewed_by_id INT UNSIGNED NULL,
    UNIQUE KEY season_figure_once (town_id, season_start_year),
    KEY season_figure_state (season_start_year, state),
    CONSTRAINT season_figure_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT season_figure_season FOREIGN KEY (season_start_year) REFERENCES season (start_year),
    CONSTRAINT season_figure_upload FOREIGN KEY (upload_id) REFERENCES upload (id),
    CONSTRAINT season_figure_sender FOREIGN KEY (sent_by_id) REFERENCES user_account (id),
    CONSTRAINT season_figure_reviewer FOREIGN KEY (reviewed_by_id) REFERENCES user_account (id),
    CONSTRAINT season_figure_state_known CHECK (state IN ('draft','sent','returned','accepted')),
    CONSTRAINT season_figure_amounts CHECK (lane_miles > 0 AND salt_lb >= 0 AND mix_lb >= 0 AND sand_lb >= 0
      AND (brine_gal IS NULL OR brine_gal >= 0) AND (mix_salt_share IS NULL OR mix_salt_share BETWEEN 0 AND 1))
  ) ENGINE=InnoDB`);
  await sql(`ALTER TABLE calibration ADD CONSTRAINT calibration_upload
    FOREIGN KEY IF NOT EXISTS (upload_id) REFERENCES upload (id)`);
}

export async function down({ sql }) {
  await sql("ALTER TABLE calibration DROP FOREIGN KEY IF EXISTS calibration_upload");
  for (const table of ["season_figure", "upload", "season"]) await sql(`DROP TABLE IF EXISTS ${table}`);
}

/**
 * Frozen peer figures. The application's database account may insert and read these tables, never change them.
 * edition_cell holds what may be shown, one row per audience; edition_member and edition_place stay on the server:
 * the first to compare the membership of published groups, the second so that a town can see its own place.
 */
export async function up({ sql }) {
  await sql(`CREATE TABLE IF NOT EXISTS edition (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    season_start_year INT UNSIGNED NOT NULL,
    number INT UNSIGNED NOT NULL,
    published_at DATETIME(3) NOT NULL,
    published_by_id INT UNSIGNED NULL,
    engine_version VARCHAR(20) NOT NULL,
    town_count INT UNSIGNED NOT NULL,
    policy JSON NOT NULL,
    input_sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    content_sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    UNIQUE KEY edition_once (season_start_year, number),
    CONSTRAINT edition_season FOREIGN KEY (season_start_year) REFERENCES season (start_year),
    CONSTRAINT edition_publisher FOREIGN KEY (published_by_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS edition_cell (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    edition_id INT UNSIGNED NOT NULL,
    audience VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    indicator VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    group_key VARCHAR(60) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    cell JSON NOT NULL,
    UNIQUE KEY edition_cell_once (edition_id, audience, indicator, group_key),
    CONSTRAINT edition_cell_of FOREIGN KEY (edition_id) REFERENCES edition (id),
    CONSTRAINT edition_cell_audience CHECK (audience IN ('member','wall','download'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS edition_row (
    edition_id INT UNSIGNED NOT NULL,
    position INT UNSIGNED NOT NULL,
    content JSON NOT NULL,
    PRIMARY KEY (edition_id, position),
    CONSTRAINT edition_row_of FOREIGN KEY (edition_id) REFERENCES edition (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS edition_member (
    edition_id INT UNSIGNED NOT NULL,
    indicator VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    group_key VARCHAR(60) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    contributor_ids JSON NOT NULL,
    figures JSON NOT NULL COMMENT 'one a contributor, in the same order',
    is_published TINYINT(1) NOT NULL,
    PRIMARY KEY (edition_id, indicator, group_key),
    CONSTRAINT edition_member_of FOREIGN KEY (edition_id) REFERENCES edition (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS edition_place (
    edition_id INT UNSIGNED NOT NULL,
    town_id INT UNSIGNED NOT NULL,
    indicator VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    own_value DOUBLE NOT NULL,
    places JSON NOT NULL COMMENT 'group key to percentile, in fives; absent where the group is withheld',
    PRIMARY KEY (edition_id, town_id, indicator),
    CONSTRAINT edition_place_of FOREIGN KEY (edition_id) REFERENCES edition (id),
    CONSTRAINT edition_place_town FOREIGN KEY (town_id) REFERENCES town (id)
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  for (const table of ["edition_place", "edition_member", "edition_row", "edition_cell", "edition"]) {
    await sql(`DROP TABLE IF EXISTS ${table}`);
  }
}

/** What a whole calibration holds beyond counts and catches; worksheets in work; work done on trucks; bands in force. */
export async function up({ sql }) {
  await sql(`ALTER TABLE calibration
    ADD COLUMN IF NOT EXISTS method VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'counts',
    ADD COLUMN IF NOT EXISTS gate_scale_mark VARCHAR(20) NULL,
    ADD COLUMN IF NOT EXISTS counts_from_calibration_id INT UNSIGNED NULL COMMENT 'whose counts were used again after a gate change',
    ADD COLUMN IF NOT EXISTS same_day_number INT UNSIGNED NOT NULL DEFAULT 1,
    ADD COLUMN IF NOT EXISTS note VARCHAR(500) NOT NULL DEFAULT ''`);
  // One statement, because the truck's foreign key must never be without an index.
  await sql(`ALTER TABLE calibration DROP INDEX IF EXISTS calibration_once,
    ADD UNIQUE KEY calibration_once (truck_id, material_id, tested_on, gate_opening_in, same_day_number)`);
  await sql(`ALTER TABLE calibration
    MODIFY gate_opening_in DOUBLE NULL COMMENT 'null for liquid alone: tanks have no gate'`);
  await sql(`CREATE TABLE IF NOT EXISTS calibration_timed_catch (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    calibration_id INT UNSIGNED NOT NULL,
    position INT UNSIGNED NOT NULL,
    setting INT UNSIGNED NOT NULL,
    seconds DOUBLE NOT NULL,
    gross_lb DOUBLE NOT NULL,
    tare_lb DOUBLE NOT NULL DEFAULT 0,
    UNIQUE KEY calibration_timed_catch_position (calibration_id, position),
    CONSTRAINT calibration_timed_catch_of FOREIGN KEY (calibration_id) REFERENCES calibration (id),
    CONSTRAINT calibration_timed_catch_positive CHECK (seconds > 0 AND tare_lb >= 0 AND gross_lb > tare_lb)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS calibration_verification (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    calibration_id INT UNSIGNED NOT NULL,
    position INT UNSIGNED NOT NULL,
    speed_mph DOUBLE NOT NULL,
    commanded_lb_per_lane_mile DOUBLE NOT NULL,
    seconds DOUBLE NOT NULL,
    gross_lb DOUBLE NOT NULL,
    tare_lb DOUBLE NOT NULL DEFAULT 0,
    UNIQUE KEY calibration_verification_position (calibration_id, position),
    CONSTRAINT calibration_verification_of FOREIGN KEY (calibration_id) REFERENCES calibration (id),
    CONSTRAINT calibration_verification_positive
      CHECK (speed_mph > 0 AND commanded_lb_per_lane_mile > 0 AND seconds > 0 AND tare_lb >= 0 AND gross_lb > tare_lb)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS calibration_liquid (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    calibration_id INT UNSIGNED NOT NULL,
    position INT UNSIGNED NOT NULL,
    kind VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    gallons DOUBLE NOT NULL,
    seconds DOUBLE NOT NULL,
    speed_mph DOUBLE NULL,
    lanes INT UNSIGNED NULL,
    dry_lb_per_min DOUBLE NULL,
    UNIQUE KEY calibration_liquid_position (calibration_id, position),
    CONSTRAINT calibration_liquid_of FOREIGN KEY (calibration_id) REFERENCES calibration (id),
    CONSTRAINT calibration_liquid_kind CHECK (kind IN ('prewet','direct')),
    CONSTRAINT calibration_liquid_positive CHECK (gallons > 0 AND seconds > 0)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS worksheet (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NOT NULL,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    truck_id INT UNSIGNED NOT NULL,
    material_id INT UNSIGNED NOT NULL,
    version INT UNSIGNED NOT NULL DEFAULT 1,
    content JSON NOT NULL,
    state VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'open',
    calibration_id INT UNSIGNED NULL,
    device VARCHAR(80) NOT NULL DEFAULT '',
    created_by_id INT UNSIGNED NOT NULL,
    updated_by_id INT UNSIGNED NOT NULL,
    created_at DATETIME(3) NOT NULL,
    updated_at DATETIME(3) NOT NULL,
    UNIQUE KEY worksheet_client (town_id, client_ref),
    CONSTRAINT worksheet_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT worksheet_truck FOREIGN KEY (truck_id) REFERENCES truck (id),
    CONSTRAINT worksheet_material FOREIGN KEY (material_id) REFERENCES material (id),
    CONSTRAINT worksheet_calibration FOREIGN KEY (calibration_id) REFERENCES calibration (id),
    CONSTRAINT worksheet_creator FOREIGN KEY (created_by_id) REFERENCES user_account (id),
    CONSTRAINT worksheet_updater FOREIGN KEY (updated_by_id) REFERENCES user_account (id),
    CONSTRAINT worksheet_state CHECK (state IN ('open','finished'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS worksheet_version (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    worksheet_id INT UNSIGNED NOT NULL,
    base_version INT UNSIGNED NOT NULL,
    content JSON NOT NULL,
    device VARCHAR(80) NOT NULL DEFAULT '',
    by_user_id INT UNSIGNED NOT NULL,
    created_at DATETIME(3) NOT NULL,
    settled_at DATETIME(3) NULL,
    KEY worksheet_version_open (worksheet_id, settled_at),
    CONSTRAINT worksheet_version_of FOREIGN KEY (worksheet_id) REFERENCES worksheet (id),
    CONSTRAINT worksheet_version_by FOREIGN KEY (by_user_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB COMMENT='a version that met a newer one: kept until a person has settled it'`);
  await sql(`CREATE TABLE IF NOT EXISTS worksheet_op (
    town_id INT UNSIGNED NOT NULL,
    op_id CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    request_sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    response JSON NOT NULL,
    created_at DATETIME(3) NOT NULL,
    PRIMARY KEY (town_id, op_id),
    CONSTRAINT worksheet_op_town FOREIGN KEY (town_id) REFERENCES town (id)
  ) ENGINE=InnoDB COMMENT='what was answered to a message from a phone, so that a second sending changes nothing'`);
  await sql(`CREATE TABLE IF NOT EXISTS truck_material (
    truck_id INT UNSIGNED NOT NULL,
    material_id INT UNSIGNED NOT NULL,
    since_on DATE NULL COMMENT 'first day of a new material or supplier, when it makes a calibration due',
    PRIMARY KEY (truck_id, material_id),
    CONSTRAINT truck_material_truck FOREIGN KEY (truck_id) REFERENCES truck (id),
    CONSTRAINT truck_material_material FOREIGN KEY (material_id) REFERENCES material (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS truck_work (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    town_id INT UNSIGNED NOT NULL,
    truck_id INT UNSIGNED NOT NULL,
    done_on DATE NOT NULL,
    part VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    note VARCHAR(300) NOT NULL DEFAULT '',
    created_by_id INT UNSIGNED NULL,
    created_at DATETIME(3) NOT NULL,
    KEY truck_work_of_truck (truck_id, done_on),
    CONSTRAINT truck_work_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT truck_work_truck FOREIGN KEY (truck_id) REFERENCES truck (id),
    CONSTRAINT truck_work_creator FOREIGN KEY (created_by_id) REFERENCES user_account (id),
    CONSTRAINT truck_work_part CHECK (part IN ('gate','hydraulics','feed','controller'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS band (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NULL COMMENT 'null is the network\\'s own',
    material_kind VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    low_lb_per_lane_mile DOUBLE NOT NULL,
    high_lb_per_lane_mile DOUBLE NOT NULL,
    UNIQUE KEY band_once (town_id, material_kind),
    CONSTRAINT band_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT band_order CHECK (low_lb_per_lane_mile > 0 AND high_lb_per_lane_mile > low_lb_per_lane_mile)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS network_setting (
    name VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
    value DOUBLE NOT NULL
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  for (const table of [
    "network_setting",
    "band",
    "truck_work",
    "truck_material",
    "worksheet_op",
    "worksheet_version",
    "worksheet",
    "calibration_liquid",
    "calibration_verification",
    "calibration_timed_catch",
  ]) {
    await sql(`DROP TABLE IF EXISTS ${table}`);
  }
  for (const table of ["calibration_catch", "calibration_count"]) {
    await sql(`DELETE c FROM ${table} c JOIN calibration k ON k.id = c.calibration_id
      WHERE k.same_day_number > 1 OR k.gate_opening_in IS NULL`);
  }
  await sql("DELETE FROM calibration WHERE same_day_number > 1 OR gate_opening_in IS NULL");
  await sql("ALTER TABLE calibration MODIFY gate_opening_in DOUBLE NOT NULL");
  await sql(`ALTER TABLE calibration DROP INDEX IF EXISTS calibration_once,
    ADD UNIQUE KEY calibration_once (truck_id, material_id, tested_on, gate_opening_in)`);
  await sql(`ALTER TABLE calibration DROP COLUMN IF EXISTS method, DROP COLUMN IF EXISTS gate_scale_mark,
    DROP COLUMN IF EXISTS counts_from_calibration_id, DROP COLUMN IF EXISTS same_day_number, DROP COLUMN IF EXISTS note`);
}

/** Trucks, materials, and calibrations with their raw readings. Everything else is computed. */
export async function up({ sql }) {
  await sql(`CREATE TABLE IF NOT EXISTS material (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NOT NULL,
    name VARCHAR(60) NOT NULL,
    kind VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    salt_share DOUBLE NOT NULL COMMENT '0 to 1 by weight',
    price_cents_per_ton INT UNSIGNED NULL,
    UNIQUE KEY material_name (town_id, name),
    CONSTRAINT material_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT material_kind CHECK (kind IN ('salt','mix','sand','brine')),
    CONSTRAINT material_salt_share CHECK (salt_share BETWEEN 0 AND 1)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS truck (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NOT NULL,
    unit_number VARCHAR(20) NOT NULL,
    body VARCHAR(60) NOT NULL DEFAULT '',
    spreader_kind VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    control VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    lanes_per_pass INT UNSIGNED NOT NULL DEFAULT 1,
    working_speed_mph DOUBLE NOT NULL,
    working_setting INT UNSIGNED NOT NULL,
    working_rpm INT UNSIGNED NULL,
    gate_max_in DOUBLE NULL,
    capacity_tons DOUBLE NULL,
    is_in_service TINYINT(1) NOT NULL DEFAULT 1,
    created_at DATETIME(3) NOT NULL,
    UNIQUE KEY truck_unit (town_id, unit_number),
    CONSTRAINT truck_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT truck_spreader CHECK (spreader_kind IN ('tailgate-auger','hopper-auger','conveyor','liquid-tanks')),
    CONSTRAINT truck_control CHECK (control IN ('manual','ground-speed')),
    CONSTRAINT truck_lanes CHECK (lanes_per_pass BETWEEN 1 AND 4),
    CONSTRAINT truck_speed CHECK (working_speed_mph > 0)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS calibration (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    town_id INT UNSIGNED NOT NULL,
    truck_id INT UNSIGNED NOT NULL,
    material_id INT UNSIGNED NOT NULL,
    tested_on DATE NOT NULL,
    gate_opening_in DOUBLE NOT NULL,
    state VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'ready',
    upload_id INT UNSIGNED NULL,
    created_by_id INT UNSIGNED NULL,
    created_at DATETIME(3) NOT NULL,
    approved_at DATETIME(3) NULL,
    approved_by_id INT UNSIGNED NULL,
    UNIQUE KEY calibration_once (truck_id, material_id, tested_on, gate_opening_in),
    KEY calibration_of_town (town_id, state, tested_on),
    CONSTRAINT calibration_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT calibration_truck FOREIGN KEY (truck_id) REFERENCES truck (id),
    CONSTRAINT calibration_material FOREIGN KEY (material_id) REFERENCES material (id),
    CONSTRAINT calibration_creator FOREIGN KEY (created_by_id) REFERENCES user_account (id),
    CONSTRAINT calibration_approver FOREIGN KEY (approved_by_id) REFERENCES user_account (id),
    CONSTRAINT calibration_state CHECK (state IN ('ready','approved')),
    CONSTRAINT calibration_gate CHECK (gate_opening_in > 0)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS calibration_count (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    calibration_id INT UNSIGNED NOT NULL,
    setting INT UNSIGNED NOT NULL,
    revolutions DOUBLE NOT NULL,
    seconds DOUBLE NOT NULL,
    rpm INT UNSIGNED NULL,
    UNIQUE KEY calibration_count_setting (calibration_id, setting),
    CONSTRAINT calibration_count_of FOREIGN KEY (calibration_id) REFERENCES calibration (id),
    CONSTRAINT calibration_count_positive CHECK (revolutions > 0 AND seconds > 0)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS calibration_catch (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    calibration_id INT UNSIGNED NOT NULL,
    position INT UNSIGNED NOT NULL,
    revolutions DOUBLE NOT NULL,
    gross_lb DOUBLE NOT NULL,
    tare_lb DOUBLE NOT NULL DEFAULT 0,
    UNIQUE KEY calibration_catch_position (calibration_id, position),
    CONSTRAINT calibration_catch_of FOREIGN KEY (calibration_id) REFERENCES calibration (id),
    CONSTRAINT calibration_catch_positive CHECK (revolutions > 0 AND tare_lb >= 0 AND gross_lb > tare_lb)
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  for (const table of ["calibration_catch", "calibration_count", "calibration", "truck", "material"]) {
    await sql(`DROP TABLE IF EXISTS ${table}`);
  }
}

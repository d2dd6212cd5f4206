/** What a season is made of: roads, storms, stock, prices, weather; and who wants which mail. */
export async function up({ sql }) {
  await sql(`ALTER TABLE season
    ADD COLUMN IF NOT EXISTS opens_on DATE NULL,
    ADD COLUMN IF NOT EXISTS closes_on DATE NULL`);
  await sql(`CREATE TABLE IF NOT EXISTS road_class (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NOT NULL,
    name VARCHAR(40) NOT NULL,
    season_start_year INT UNSIGNED NOT NULL COMMENT 'first season the length holds for',
    lane_miles DOUBLE NOT NULL,
    UNIQUE KEY road_class_once (town_id, name, season_start_year),
    CONSTRAINT road_class_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT road_class_length CHECK (lane_miles >= 0)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS material_price (
    material_id INT UNSIGNED NOT NULL,
    season_start_year INT UNSIGNED NOT NULL,
    cents_per_ton INT UNSIGNED NOT NULL,
    PRIMARY KEY (material_id, season_start_year),
    CONSTRAINT material_price_of FOREIGN KEY (material_id) REFERENCES material (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS storm (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    town_id INT UNSIGNED NOT NULL,
    season_start_year INT UNSIGNED NOT NULL,
    started_at DATETIME NOT NULL COMMENT 'local time of the town',
    ended_at DATETIME NULL COMMENT 'local time of the town',
    kind VARCHAR(20) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    pavement_temp_f DOUBLE NULL,
    passes INT UNSIGNED NULL,
    lane_miles_treated DOUBLE NULL,
    hours DOUBLE NULL,
    truck_id INT UNSIGNED NULL,
    route VARCHAR(60) NOT NULL DEFAULT '',
    note VARCHAR(300) NOT NULL DEFAULT '',
    upload_id INT UNSIGNED NULL,
    version INT UNSIGNED NOT NULL DEFAULT 1,
    created_by_id INT UNSIGNED NULL,
    created_at DATETIME(3) NOT NULL,
    KEY storm_of_season (town_id, season_start_year, started_at, id),
    KEY storm_of_upload (upload_id),
    CONSTRAINT storm_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT storm_season FOREIGN KEY (season_start_year) REFERENCES season (start_year),
    CONSTRAINT storm_truck FOREIGN KEY (truck_id) REFERENCES truck (id),
    CONSTRAINT storm_upload FOREIGN KEY (upload_id) REFERENCES upload (id),
    CONSTRAINT storm_kind CHECK (kind IN ('snow','light-snow','freezing-rain','sleet','frost','blowing-snow','other'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS storm_material (
    storm_id INT UNSIGNED NOT NULL,
    material_id INT UNSIGNED NOT NULL,
    used_lb DOUBLE NULL COMMENT 'solids',
    used_gal DOUBLE NULL COMMENT 'liquids',
    PRIMARY KEY (storm_id, material_id),
    CONSTRAINT storm_material_of FOREIGN KEY (storm_id) REFERENCES storm (id) ON DELETE CASCADE,
    CONSTRAINT storm_material_what FOREIGN KEY (material_id) REFERENCES material (id),
    CONSTRAINT storm_material_amount CHECK ((used_lb IS NULL OR used_lb >= 0) AND (used_gal IS NULL OR used_gal >= 0))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS stock_entry (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    town_id INT UNSIGNED NOT NULL,
    season_start_year INT UNSIGNED NOT NULL,
    material_id INT UNSIGNED NOT NULL,
    kind VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    day DATE NOT NULL,
    quantity_lb DOUBLE NOT NULL,
    typed_quantity DOUBLE NOT NULL COMMENT 'as typed, in typed_unit',
    typed_unit VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    lb_per_cubic_yard DOUBLE NULL COMMENT 'the density used for cubic yards',
    price_cents INT UNSIGNED NULL,
    supplier VARCHAR(80) NOT NULL DEFAULT '',
    upload_id INT UNSIGNED NULL,
    created_by_id INT UNSIGNED NULL,
    created_at DATETIME(3) NOT NULL,
    KEY stock_entry_of_season (town_id, season_start_year, material_id, day),
    CONSTRAINT stock_entry_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT stock_entry_season FOREIGN KEY (season_start_year) REFERENCES season (start_year),
    CONSTRAINT stock_entry_material FOREIGN KEY (material_id) REFERENCES material (id),
    CONSTRAINT stock_entry_upload FOREIGN KEY (upload_id) REFERENCES upload (id),
    CONSTRAINT stock_entry_kind CHECK (kind IN ('opening','delivery','transfer-in','transfer-out','closing')),
    CONSTRAINT stock_entry_unit CHECK (typed_unit IN ('ton','lb','kg','tonne','cubic-yard')),
    CONSTRAINT stock_entry_quantity CHECK (quantity_lb >= 0 AND typed_quantity >= 0)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS station (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    code CHAR(11) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    name VARCHAR(80) NOT NULL
  ) ENGINE=InnoDB`);
  await sql(`ALTER TABLE town
    ADD COLUMN IF NOT EXISTS station_id INT UNSIGNED NULL,
    ADD CONSTRAINT town_station FOREIGN KEY IF NOT EXISTS (station_id) REFERENCES station (id)`);
  await sql(`CREATE TABLE IF NOT EXISTS weather_day (
    station_id INT UNSIGNED NOT NULL,
    day DATE NOT NULL,
    tmax_f DOUBLE NULL,
    tmin_f DOUBLE NULL,
    snowfall_in DOUBLE NULL,
    snow_depth_in DOUBLE NULL,
    precip_in DOUBLE NULL,
    has_trace_snowfall TINYINT(1) NOT NULL DEFAULT 0,
    has_trace_depth TINYINT(1) NOT NULL DEFAULT 0,
    source VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    fetched_at DATETIME(3) NOT NULL,
    PRIMARY KEY (station_id, day),
    CONSTRAINT weather_day_station FOREIGN KEY (station_id) REFERENCES station (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS mail_choice (
    user_id INT UNSIGNED NOT NULL,
    occasion VARCHAR(24) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    is_wanted TINYINT(1) NOT NULL,
    PRIMARY KEY (user_id, occasion),
    CONSTRAINT mail_choice_user FOREIGN KEY (user_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  await sql("ALTER TABLE town DROP FOREIGN KEY IF EXISTS town_station, DROP COLUMN IF EXISTS station_id");
  for (const table of [
    "mail_choice",
    "weather_day",
    "station",
    "stock_entry",
    "storm_material",
    "storm",
    "material_price",
    "road_class",
  ]) {
    await sql(`DROP TABLE IF EXISTS ${table}`);
  }
  await sql("ALTER TABLE season DROP COLUMN IF EXISTS opens_on, DROP COLUMN IF EXISTS closes_on");
}

/** Workshops with their boards; terms accepted and tokens issued for the dataset. */
export async function up({ sql }) {
  await sql(`CREATE TABLE IF NOT EXISTS workshop (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    title VARCHAR(120) NOT NULL,
    held_on DATE NOT NULL,
    edition_id INT UNSIGNED NOT NULL,
    created_by_id INT UNSIGNED NULL,
    created_at DATETIME(3) NOT NULL,
    CONSTRAINT workshop_edition FOREIGN KEY (edition_id) REFERENCES edition (id),
    CONSTRAINT workshop_creator FOREIGN KEY (created_by_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS board (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    workshop_id INT UNSIGNED NOT NULL,
    position INT UNSIGNED NOT NULL,
    indicator VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    group_key VARCHAR(60) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    question VARCHAR(200) NOT NULL,
    UNIQUE KEY board_position (workshop_id, position),
    CONSTRAINT board_workshop FOREIGN KEY (workshop_id) REFERENCES workshop (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS terms_acceptance (
    user_id INT UNSIGNED NOT NULL,
    terms_version VARCHAR(20) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    accepted_at DATETIME(3) NOT NULL,
    PRIMARY KEY (user_id, terms_version),
    CONSTRAINT terms_acceptance_user FOREIGN KEY (user_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS api_token (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    lookup_id CHAR(8) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    secret_sha256 CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    user_id INT UNSIGNED NOT NULL,
    name VARCHAR(80) NOT NULL,
    created_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    last_used_on DATE NULL,
    revoked_at DATETIME(3) NULL,
    CONSTRAINT api_token_user FOREIGN KEY (user_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  for (const table of ["api_token", "terms_acceptance", "board", "workshop"])
    await sql(`DROP TABLE IF EXISTS ${table}`);
}

/** Towns, the people who act for them, and how they come in. */
export async function up({ sql }) {
  await sql(`CREATE TABLE IF NOT EXISTS town (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    name VARCHAR(80) NOT NULL UNIQUE,
    district VARCHAR(40) NOT NULL,
    time_zone VARCHAR(40) NOT NULL DEFAULT 'America/New_York',
    reports_through_town_id INT UNSIGNED NULL COMMENT 'one body that reports for several towns counts once',
    created_at DATETIME(3) NOT NULL,
    CONSTRAINT town_reports_through FOREIGN KEY (reports_through_town_id) REFERENCES town (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS user_account (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    issuer VARCHAR(190) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    subject VARCHAR(190) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    name VARCHAR(120) NOT NULL,
    email VARCHAR(254) NOT NULL,
    role VARCHAR(20) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    town_id INT UNSIGNED NULL,
    is_active TINYINT(1) NOT NULL DEFAULT 1,
    created_at DATETIME(3) NOT NULL,
    UNIQUE KEY user_account_identity (issuer, subject),
    CONSTRAINT user_account_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT user_account_role CHECK (role IN ('recorder','director','coordinator','analyst')),
    CONSTRAINT user_account_town_by_role CHECK ((role IN ('recorder','director')) = (town_id IS NOT NULL))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS invitation (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    token_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    client_ref CHAR(36) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    name VARCHAR(120) NOT NULL,
    email VARCHAR(254) NOT NULL,
    role VARCHAR(20) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    town_id INT UNSIGNED NULL,
    created_by_id INT UNSIGNED NULL,
    created_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    accepted_at DATETIME(3) NULL,
    accepted_by_id INT UNSIGNED NULL,
    CONSTRAINT invitation_town FOREIGN KEY (town_id) REFERENCES town (id),
    CONSTRAINT invitation_creator FOREIGN KEY (created_by_id) REFERENCES user_account (id),
    CONSTRAINT invitation_accepter FOREIGN KEY (accepted_by_id) REFERENCES user_account (id),
    CONSTRAINT invitation_role CHECK (role IN ('recorder','director','coordinator','analyst')),
    CONSTRAINT invitation_town_by_role CHECK ((role IN ('recorder','director')) = (town_id IS NOT NULL))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS sign_in_attempt (
    state_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL PRIMARY KEY,
    return_to VARCHAR(512) NOT NULL,
    invitation_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NULL,
    created_at DATETIME(3) NOT NULL,
    used_at DATETIME(3) NULL,
    KEY sign_in_attempt_age (created_at)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS session (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    token_hash CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    user_id INT UNSIGNED NOT NULL,
    created_at DATETIME(3) NOT NULL,
    last_seen_at DATETIME(3) NOT NULL,
    expires_at DATETIME(3) NOT NULL,
    authenticated_at DATETIME(3) NOT NULL,
    device VARCHAR(200) NOT NULL DEFAULT '',
    CONSTRAINT session_user FOREIGN KEY (user_id) REFERENCES user_account (id)
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  for (const table of ["session", "sign_in_attempt", "invitation", "user_account", "town"]) {
    await sql(`DROP TABLE IF EXISTS ${table}`);
  }
}

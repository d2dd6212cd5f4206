/** What happened, what has to be told by mail, and what has to be computed: written in the transaction that caused it. */
export async function up({ sql }) {
  await sql(`CREATE TABLE IF NOT EXISTS audit_entry (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    created_at DATETIME(3) NOT NULL,
    actor_user_id INT UNSIGNED NULL,
    actor_role VARCHAR(20) NOT NULL,
    town_id INT UNSIGNED NULL,
    action VARCHAR(60) NOT NULL,
    entity VARCHAR(40) NOT NULL,
    entity_id INT UNSIGNED NULL,
    detail JSON NOT NULL,
    request_id VARCHAR(64) NOT NULL DEFAULT '',
    KEY audit_entry_town (town_id, id),
    CONSTRAINT audit_entry_actor FOREIGN KEY (actor_user_id) REFERENCES user_account (id),
    CONSTRAINT audit_entry_of_town FOREIGN KEY (town_id) REFERENCES town (id)
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS outbox_mail (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    message_id VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    dedupe_key VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    to_name VARCHAR(120) NOT NULL,
    to_address VARCHAR(254) NOT NULL,
    subject VARCHAR(200) NOT NULL,
    text MEDIUMTEXT NOT NULL,
    html MEDIUMTEXT NOT NULL,
    state VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'queued',
    attempts INT UNSIGNED NOT NULL DEFAULT 0,
    run_after DATETIME(3) NOT NULL,
    last_error VARCHAR(300) NULL,
    created_at DATETIME(3) NOT NULL,
    sent_at DATETIME(3) NULL,
    KEY outbox_mail_due (state, run_after, id),
    CONSTRAINT outbox_mail_state CHECK (state IN ('queued','sending','sent','uncertain','dead'))
  ) ENGINE=InnoDB`);
  await sql(`CREATE TABLE IF NOT EXISTS job (
    id INT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    kind VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    payload JSON NOT NULL,
    dedupe_key VARCHAR(120) CHARACTER SET ascii COLLATE ascii_bin NOT NULL UNIQUE,
    state VARCHAR(12) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT 'ready',
    run_after DATETIME(3) NOT NULL,
    attempts INT UNSIGNED NOT NULL DEFAULT 0,
    locked_until DATETIME(3) NULL,
    last_error VARCHAR(300) NULL,
    created_by_id INT UNSIGNED NULL,
    created_at DATETIME(3) NOT NULL,
    finished_at DATETIME(3) NULL,
    KEY job_due (state, run_after, id),
    CONSTRAINT job_creator FOREIGN KEY (created_by_id) REFERENCES user_account (id),
    CONSTRAINT job_state CHECK (state IN ('ready','running','done','failed'))
  ) ENGINE=InnoDB`);
}

export async function down({ sql }) {
  await sql("DROP TABLE IF EXISTS job");
  await sql("DROP TABLE IF EXISTS outbox_mail");
  await sql("DROP TABLE IF EXISTS audit_entry");
}

import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query(`CREATE TABLE mails (
    id ${ID} NOT NULL PRIMARY KEY,
    recipient VARCHAR(254) NOT NULL,
    subject VARCHAR(255) NOT NULL,
    text_masked MEDIUMTEXT NOT NULL,
    sealed MEDIUMBLOB NULL,
    state ENUM('queued','sending','sent','dead') NOT NULL,
    attempts SMALLINT UNSIGNED NOT NULL DEFAULT 0,
    queued_at DATETIME(6) NOT NULL,
    next_attempt_at DATETIME(6) NOT NULL,
    leased_until DATETIME(6) NULL,
    sent_at DATETIME(6) NULL,
    possible_duplicate BOOLEAN NOT NULL DEFAULT FALSE,
    last_error VARCHAR(500) NULL,
    KEY mails_due (state, next_attempt_at)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE shares (
    id ${ID} NOT NULL PRIMARY KEY,
    case_id ${ID} NOT NULL,
    token_hash BINARY(32) NOT NULL,
    email VARCHAR(254) NOT NULL,
    created_by ${ID} NOT NULL,
    created_at DATETIME(6) NOT NULL,
    expires_at DATETIME(6) NOT NULL,
    opened_at DATETIME(6) NULL,
    withdrawn_at DATETIME(6) NULL,
    UNIQUE KEY shares_token (token_hash),
    KEY shares_case (case_id),
    CONSTRAINT shares_case FOREIGN KEY (case_id) REFERENCES cases (id),
    CONSTRAINT shares_by FOREIGN KEY (created_by) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE idempotency_keys (
    user_id ${ID} NOT NULL,
    route VARCHAR(200) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    idempotency_key VARCHAR(200) CHARACTER SET utf8mb4 COLLATE utf8mb4_bin NOT NULL,
    request_hash BINARY(32) NOT NULL,
    status SMALLINT UNSIGNED NULL,
    answer MEDIUMTEXT NULL,
    created_at DATETIME(6) NOT NULL,
    PRIMARY KEY (user_id, route, idempotency_key),
    KEY idempotency_keys_age (created_at)
  ) ENGINE=InnoDB`);
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  for (const table of ["idempotency_keys", "shares", "mails"]) await q.dropTable(table);
}

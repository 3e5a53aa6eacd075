import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query(`CREATE TABLE users (
    id ${ID} NOT NULL PRIMARY KEY,
    email VARCHAR(254) NOT NULL,
    name VARCHAR(120) NOT NULL,
    role ENUM('technician','lead','auditor','admin') NOT NULL,
    password_hash VARCHAR(255) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    must_change_password BOOLEAN NOT NULL DEFAULT FALSE,
    disabled_at DATETIME(6) NULL,
    created_at DATETIME(6) NOT NULL,
    UNIQUE KEY users_email (email)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE sessions (
    id ${ID} NOT NULL PRIMARY KEY,
    user_id ${ID} NOT NULL,
    created_at DATETIME(6) NOT NULL,
    last_seen_at DATETIME(6) NOT NULL,
    ended_at DATETIME(6) NULL,
    KEY sessions_user (user_id),
    CONSTRAINT sessions_user FOREIGN KEY (user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  // One row a refused sign-in; counted by account and by address. The account is kept as a digest: people mistype passwords there.
  await q.sequelize.query(`CREATE TABLE sign_in_attempts (
    id BIGINT UNSIGNED NOT NULL AUTO_INCREMENT PRIMARY KEY,
    account BINARY(32) NOT NULL,
    address VARCHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    at DATETIME(6) NOT NULL,
    KEY sign_in_attempts_account (account, at),
    KEY sign_in_attempts_address (address, at)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE bench_tokens (
    id ${ID} NOT NULL PRIMARY KEY,
    user_id ${ID} NOT NULL,
    name VARCHAR(120) NOT NULL,
    token_hash BINARY(32) NOT NULL,
    created_at DATETIME(6) NOT NULL,
    last_used_at DATETIME(6) NULL,
    withdrawn_at DATETIME(6) NULL,
    UNIQUE KEY bench_tokens_hash (token_hash),
    CONSTRAINT bench_tokens_user FOREIGN KEY (user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE policies (
    id TINYINT UNSIGNED NOT NULL PRIMARY KEY,
    policy_reads SMALLINT UNSIGNED NOT NULL,
    seatings SMALLINT UNSIGNED NOT NULL,
    read_backs SMALLINT UNSIGNED NOT NULL,
    read_back_seatings SMALLINT UNSIGNED NOT NULL,
    two_person_rule BOOLEAN NOT NULL,
    second_factor BOOLEAN NOT NULL,
    share_days SMALLINT UNSIGNED NOT NULL,
    erasure_days SMALLINT UNSIGNED NOT NULL,
    CONSTRAINT policies_one CHECK (id = 1),
    CONSTRAINT policies_reads CHECK (policy_reads >= 2 AND seatings >= 1 AND read_backs >= 1 AND read_back_seatings >= 1)
  ) ENGINE=InnoDB`);
  await q.sequelize.query("INSERT INTO policies VALUES (1, 3, 2, 2, 2, TRUE, FALSE, 90, 90)");
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  for (const table of ["policies", "bench_tokens", "sign_in_attempts", "sessions", "users"]) await q.dropTable(table);
}

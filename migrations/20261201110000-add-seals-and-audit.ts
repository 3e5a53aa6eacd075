import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";
const HEX64 = "CHAR(64) CHARACTER SET ascii COLLATE ascii_bin";
const LOG_TABLES = ["custody_entries", "seals"];

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  const run = (sql: string) => q.sequelize.query(sql);
  // `leaves` holds one line a chain in the order of the tree: without them no proof could be made later.
  await run(`CREATE TABLE seals (
    number INT UNSIGNED NOT NULL PRIMARY KEY,
    text VARBINARY(255) NOT NULL,
    sha256 BINARY(32) NOT NULL,
    prev BINARY(32) NOT NULL,
    key_id ${HEX64} NOT NULL,
    signature BINARY(64) NOT NULL,
    cause ENUM('daily','bundle','summary','asked') NOT NULL,
    made_at DATETIME(6) NOT NULL,
    chains INT UNSIGNED NOT NULL,
    leaves LONGBLOB NOT NULL,
    UNIQUE KEY seals_prev (prev)
  ) ENGINE=InnoDB`);
  for (const event of ["UPDATE", "DELETE"]) {
    await run(`CREATE TRIGGER seals_no_${event.toLowerCase()} BEFORE ${event} ON seals
      FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'seals are append-only'`);
  }
  // Versioned tables refuse TRUNCATE even to the server's own root, where a trigger would not be asked.
  await run("ALTER TABLE custody_entries ADD KEY custody_entries_action (action, chain_id, seq)");
  for (const table of LOG_TABLES) await run(`ALTER TABLE ${table} ADD SYSTEM VERSIONING`);
  // A head that somebody turned back still moves forward again: appending goes on, and the entry says by how much.
  await run("DROP TRIGGER custody_heads_forward");
  await run(`CREATE TRIGGER custody_heads_forward BEFORE UPDATE ON custody_heads
    FOR EACH ROW BEGIN
      IF NEW.seq <= OLD.seq OR NEW.chain_id <> OLD.chain_id
        OR NOT EXISTS (SELECT 1 FROM custody_entries WHERE chain_id = NEW.chain_id AND seq = NEW.seq AND hash = NEW.hash) THEN
        SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'a chain head only moves forward, to an entry that is there';
      END IF;
    END`);
  await run(`CREATE TABLE chain_checks (
    chain_id ${ID} NOT NULL PRIMARY KEY,
    checked_at DATETIME(6) NOT NULL,
    entries INT UNSIGNED NOT NULL,
    findings INT UNSIGNED NOT NULL,
    first_finding VARCHAR(500) NULL
  ) ENGINE=InnoDB`);
  await run("ALTER TABLE images ADD COLUMN checked_at DATETIME(6) NULL, ADD KEY images_checked (checked_at)");
  await run("ALTER TABLE users ADD COLUMN ends_at DATETIME(6) NULL, ADD COLUMN limited BOOLEAN NOT NULL DEFAULT FALSE");
  await run(`CREATE TABLE user_cases (
    user_id ${ID} NOT NULL,
    case_id ${ID} NOT NULL,
    PRIMARY KEY (user_id, case_id),
    CONSTRAINT user_cases_user FOREIGN KEY (user_id) REFERENCES users (id),
    CONSTRAINT user_cases_case FOREIGN KEY (case_id) REFERENCES cases (id)
  ) ENGINE=InnoDB`);
  await run(`CREATE TABLE hand_overs (
    id ${ID} NOT NULL PRIMARY KEY,
    drive_id ${ID} NOT NULL,
    item_type ENUM('drive','board','chip') NOT NULL,
    item_id ${ID} NOT NULL,
    from_person VARCHAR(120) NOT NULL,
    from_place VARCHAR(200) NOT NULL,
    to_person VARCHAR(120) NOT NULL,
    to_place VARCHAR(200) NOT NULL,
    to_user_id ${ID} NULL,
    item_condition TEXT NOT NULL,
    seal_number VARCHAR(80) NULL,
    note TEXT NULL,
    given_by ${ID} NOT NULL,
    given_at DATETIME(6) NOT NULL,
    received BOOLEAN NULL,
    confirmed_by ${ID} NULL,
    confirmed_at DATETIME(6) NULL,
    confirmation VARCHAR(500) NULL,
    open TINYINT AS (IF(confirmed_at IS NULL, 1, NULL)) PERSISTENT,
    UNIQUE KEY hand_overs_open (item_id, open),
    KEY hand_overs_drive (drive_id, given_at),
    KEY hand_overs_to (to_user_id, confirmed_at),
    CONSTRAINT hand_overs_drive FOREIGN KEY (drive_id) REFERENCES drives (id),
    CONSTRAINT hand_overs_to FOREIGN KEY (to_user_id) REFERENCES users (id),
    CONSTRAINT hand_overs_by FOREIGN KEY (given_by) REFERENCES users (id),
    CONSTRAINT hand_overs_confirmed FOREIGN KEY (confirmed_by) REFERENCES users (id)
  ) ENGINE=InnoDB`);
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  const run = (sql: string) => q.sequelize.query(sql);
  for (const table of ["hand_overs", "user_cases", "chain_checks"]) await q.dropTable(table);
  await run("ALTER TABLE users DROP COLUMN ends_at, DROP COLUMN limited");
  await run("ALTER TABLE images DROP KEY images_checked, DROP COLUMN checked_at");
  await run("ALTER TABLE custody_entries DROP SYSTEM VERSIONING");
  await run("ALTER TABLE custody_entries DROP KEY custody_entries_action");
  await q.dropTable("seals");
}

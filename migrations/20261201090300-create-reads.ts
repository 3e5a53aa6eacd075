import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  // One row a distinct image: equal bytes share one stored file, each read keeps its own row.
  await q.sequelize.query(`CREATE TABLE images (
    sha256 BINARY(32) NOT NULL PRIMARY KEY,
    size_bytes INT UNSIGNED NOT NULL,
    crc32 INT UNSIGNED NOT NULL,
    facts JSON NOT NULL,
    state ENUM('sound','damaged','missing') NOT NULL DEFAULT 'sound',
    stored_at DATETIME(6) NOT NULL
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE comparisons (
    sha256_a BINARY(32) NOT NULL,
    sha256_b BINARY(32) NOT NULL,
    engine_version VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    result MEDIUMTEXT NOT NULL,
    PRIMARY KEY (sha256_a, sha256_b, engine_version)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE transfers (
    id ${ID} NOT NULL PRIMARY KEY,
    approval_id ${ID} NOT NULL,
    chip_id ${ID} NOT NULL,
    donor_chip_id ${ID} NOT NULL,
    kind ENUM('write','chip-moved') NOT NULL,
    programmer VARCHAR(120) NULL,
    tool_version VARCHAR(120) NULL,
    adapter VARCHAR(120) NULL,
    note TEXT NULL,
    by_user_id ${ID} NOT NULL,
    at DATETIME(6) NOT NULL,
    KEY transfers_donor (donor_chip_id, at),
    CONSTRAINT transfers_chip FOREIGN KEY (chip_id) REFERENCES chips (id),
    CONSTRAINT transfers_donor FOREIGN KEY (donor_chip_id) REFERENCES chips (id),
    CONSTRAINT transfers_by FOREIGN KEY (by_user_id) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`CREATE TABLE \`reads\` (
    id ${ID} NOT NULL PRIMARY KEY,
    chip_id ${ID} NOT NULL,
    stage ENUM('before','donor','after') NOT NULL,
    number SMALLINT UNSIGNED NOT NULL,
    seating SMALLINT UNSIGNED NOT NULL,
    transfer_id ${ID} NULL,
    method ENUM('in-place','lifted','socket') NULL,
    reader VARCHAR(120) NOT NULL,
    tool_version VARCHAR(120) NULL,
    adapter VARCHAR(120) NULL,
    supply_millivolts INT UNSIGNED NULL,
    supply_unknown BOOLEAN NOT NULL DEFAULT FALSE,
    clock_kilohertz INT UNSIGNED NULL,
    controller_held BOOLEAN NULL,
    note TEXT NULL,
    format ENUM('raw','intel-hex','s-record') NOT NULL,
    file_name VARCHAR(1024) NOT NULL,
    modified_at DATETIME(6) NULL,
    taken_at DATETIME(6) NULL,
    stored_at DATETIME(6) NOT NULL,
    operator_id ${ID} NOT NULL,
    sha256 BINARY(32) NOT NULL,
    size_bytes INT UNSIGNED NOT NULL,
    crc32 INT UNSIGNED NOT NULL,
    findings MEDIUMTEXT NOT NULL,
    engine_version VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    counted BOOLEAN NOT NULL DEFAULT TRUE,
    set_aside_reason TEXT NULL,
    set_aside_by ${ID} NULL,
    set_aside_at DATETIME(6) NULL,
    UNIQUE KEY reads_number (chip_id, stage, number),
    KEY reads_digest (sha256),
    KEY reads_crc (crc32),
    CONSTRAINT reads_chip FOREIGN KEY (chip_id) REFERENCES chips (id),
    CONSTRAINT reads_image FOREIGN KEY (sha256) REFERENCES images (sha256),
    CONSTRAINT reads_operator FOREIGN KEY (operator_id) REFERENCES users (id),
    CONSTRAINT reads_transfer FOREIGN KEY (transfer_id) REFERENCES transfers (id),
    CONSTRAINT reads_aside CHECK (counted OR set_aside_reason IS NOT NULL),
    CONSTRAINT reads_after CHECK ((stage = 'after') = (transfer_id IS NOT NULL))
  ) ENGINE=InnoDB`);
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  for (const table of ["reads", "transfers", "comparisons", "images"]) await q.dropTable(table);
}

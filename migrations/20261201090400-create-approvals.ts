import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query(`CREATE TABLE approval_requests (
    id ${ID} NOT NULL PRIMARY KEY,
    chip_id ${ID} NOT NULL,
    asked_by ${ID} NOT NULL,
    asked_at DATETIME(6) NOT NULL,
    message TEXT NULL,
    sent_back_by ${ID} NULL,
    sent_back_at DATETIME(6) NULL,
    sent_back_reason TEXT NULL,
    KEY approval_requests_chip (chip_id, asked_at),
    CONSTRAINT approval_requests_chip FOREIGN KEY (chip_id) REFERENCES chips (id),
    CONSTRAINT approval_requests_by FOREIGN KEY (asked_by) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  // `standing` is 1 or NULL: with it the database itself refuses a second standing approval of one chip.
  await q.sequelize.query(`CREATE TABLE approvals (
    id ${ID} NOT NULL PRIMARY KEY,
    chip_id ${ID} NOT NULL,
    donor_chip_id ${ID} NOT NULL,
    sha256 BINARY(32) NOT NULL,
    approved_by ${ID} NOT NULL,
    given_at DATETIME(6) NOT NULL,
    statement TEXT NOT NULL,
    reasons TEXT NOT NULL,
    looked_at TEXT NOT NULL,
    two_person_rule BOOLEAN NOT NULL,
    revoked_at DATETIME(6) NULL,
    revoked_by ${ID} NULL,
    revoked_cause VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NULL,
    revoked_reason TEXT NULL,
    standing TINYINT AS (IF(revoked_at IS NULL, 1, NULL)) PERSISTENT,
    UNIQUE KEY approvals_standing (chip_id, standing),
    KEY approvals_chip (chip_id, given_at),
    KEY approvals_digest (sha256),
    CONSTRAINT approvals_chip FOREIGN KEY (chip_id) REFERENCES chips (id),
    CONSTRAINT approvals_donor FOREIGN KEY (donor_chip_id) REFERENCES chips (id),
    CONSTRAINT approvals_image FOREIGN KEY (sha256) REFERENCES images (sha256),
    CONSTRAINT approvals_by FOREIGN KEY (approved_by) REFERENCES users (id)
  ) ENGINE=InnoDB`);
  await q.sequelize.query(`ALTER TABLE transfers
    ADD CONSTRAINT transfers_approval FOREIGN KEY (approval_id) REFERENCES approvals (id)`);
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query("ALTER TABLE transfers DROP FOREIGN KEY transfers_approval");
  await q.dropTable("approvals");
  await q.dropTable("approval_requests");
}

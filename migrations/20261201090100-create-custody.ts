import type { QueryInterface } from "sequelize";

const ID = "CHAR(36) CHARACTER SET ascii COLLATE ascii_bin";

export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query(`CREATE TABLE custody_heads (
    chain_id ${ID} NOT NULL PRIMARY KEY,
    seq INT UNSIGNED NOT NULL,
    hash BINARY(32) NOT NULL,
    at CHAR(27) CHARACTER SET ascii COLLATE ascii_bin NOT NULL
  ) ENGINE=InnoDB`);
  // The body is the canonical bytes themselves (CUSTODY.md). No foreign key leads to or from the log: nothing may cascade into it.
  await q.sequelize.query(`CREATE TABLE custody_entries (
    chain_id ${ID} NOT NULL,
    seq INT UNSIGNED NOT NULL,
    body MEDIUMBLOB NOT NULL,
    hash BINARY(32) NOT NULL,
    prev BINARY(32) NOT NULL,
    key_id CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    signature BINARY(64) NOT NULL,
    action VARCHAR(40) CHARACTER SET ascii COLLATE ascii_bin NOT NULL,
    PRIMARY KEY (chain_id, seq),
    UNIQUE KEY custody_entries_prev (chain_id, prev)
  ) ENGINE=InnoDB`);
  for (const event of ["UPDATE", "DELETE"]) {
    await q.sequelize.query(`CREATE TRIGGER custody_entries_no_${event.toLowerCase()} BEFORE ${event} ON custody_entries
      FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'the custody log is append-only'`);
  }
  await q.sequelize.query(`CREATE TRIGGER custody_heads_no_delete BEFORE DELETE ON custody_heads
    FOR EACH ROW SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'a chain keeps its head'`);
  await q.sequelize.query(`CREATE TRIGGER custody_heads_forward BEFORE UPDATE ON custody_heads
    FOR EACH ROW BEGIN
      IF NEW.seq <> OLD.seq + 1 OR NEW.chain_id <> OLD.chain_id THEN
        SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = 'a chain head moves one entry forward at a time';
      END IF;
    END`);
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.dropTable("custody_entries");
  await q.dropTable("custody_heads");
}

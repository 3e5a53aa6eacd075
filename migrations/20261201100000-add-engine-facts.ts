import type { QueryInterface } from "sequelize";

/** What the read-check engine adds: facts by engine version, the text an image came from, derived reads, what a chip answered. */
export async function up({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query("ALTER TABLE images ADD COLUMN engine_version VARCHAR(16) CHARACTER SET ascii COLLATE ascii_bin NOT NULL DEFAULT '1' AFTER facts");
  await q.sequelize.query(`ALTER TABLE \`reads\`
    ADD COLUMN source_sha256 BINARY(32) NULL AFTER format,
    ADD COLUMN source_base BIGINT UNSIGNED NULL AFTER source_sha256,
    ADD COLUMN source_fill TINYINT UNSIGNED NULL AFTER source_base,
    ADD COLUMN derived MEDIUMTEXT NULL AFTER source_fill,
    ADD CONSTRAINT reads_source FOREIGN KEY (source_sha256) REFERENCES images (sha256),
    ADD CONSTRAINT reads_text CHECK ((format = 'raw') = (source_sha256 IS NULL))`);
  await q.sequelize.query(`ALTER TABLE chips
    ADD COLUMN id_bytes CHAR(6) CHARACTER SET ascii COLLATE ascii_bin NULL AFTER holds,
    ADD COLUMN sfdp VARCHAR(4096) CHARACTER SET ascii COLLATE ascii_bin NULL AFTER id_bytes`);
}

export async function down({ context: q }: { context: QueryInterface }): Promise<void> {
  await q.sequelize.query("ALTER TABLE chips DROP COLUMN sfdp, DROP COLUMN id_bytes");
  await q.sequelize.query("ALTER TABLE `reads` DROP CONSTRAINT reads_text, DROP FOREIGN KEY reads_source, DROP COLUMN derived, DROP COLUMN source_fill, DROP COLUMN source_base, DROP COLUMN source_sha256");
  await q.sequelize.query("ALTER TABLE images DROP COLUMN engine_version");
}

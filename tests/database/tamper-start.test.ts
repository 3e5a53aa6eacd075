import { describe, expect, it } from "vitest";
import { checkDatabase } from "@/models/check-database";
import { asAdmin } from "../support/tamper";

const APP = "'twinread_app'@'127.0.0.1'";

/** Each fault is put in by the migrating user, has to stop the start, and is taken out again. */
async function planted(plant: string[], undo: string[]): Promise<string> {
  return asAdmin(async (db) => {
    await db.query("SET system_versioning_alter_history = 1");
    try {
      for (const statement of plant) await db.query(statement);
      return await checkDatabase().then(() => "starts", (error: Error) => error.message);
    } finally {
      for (const statement of undo) await db.query(statement);
    }
  });
}

describe("the app's start", () => {
  it("goes through on the database as npm start makes it", () => expect(checkDatabase()).resolves.toBeUndefined());

  it.each([
    ["a log table without versions", ["ALTER TABLE custody_entries DROP SYSTEM VERSIONING"], ["ALTER TABLE custody_entries ADD SYSTEM VERSIONING"], "the table custody_entries is not system-versioned"],
    ["seals without versions", ["ALTER TABLE seals DROP SYSTEM VERSIONING"], ["ALTER TABLE seals ADD SYSTEM VERSIONING"], "the table seals is not system-versioned"],
    ["a log table that is gone", ["RENAME TABLE seals TO seals_away"], ["RENAME TABLE seals_away TO seals"], /seals/],
    ["a key that cascades from the log", ["ALTER TABLE custody_entries ADD CONSTRAINT planted FOREIGN KEY (chain_id) REFERENCES custody_heads (chain_id) ON DELETE CASCADE"], ["ALTER TABLE custody_entries DROP FOREIGN KEY planted"], "a foreign key cascades to or from custody_entries"],
    ["a key that cascades to a head", ["ALTER TABLE drives ADD CONSTRAINT planted FOREIGN KEY (id) REFERENCES custody_heads (chain_id) ON DELETE CASCADE"], ["ALTER TABLE drives DROP FOREIGN KEY planted"], "a foreign key cascades to or from custody_heads"],
    ["UPDATE on the log", [`GRANT UPDATE ON custody_entries TO ${APP}`], [`REVOKE UPDATE ON custody_entries FROM ${APP}`], "may change the custody log"],
    ["DELETE on the log", [`GRANT DELETE ON custody_entries TO ${APP}`], [`REVOKE DELETE ON custody_entries FROM ${APP}`], "may change the custody log"],
    ["UPDATE on seals", [`GRANT UPDATE ON seals TO ${APP}`], [`REVOKE UPDATE ON seals FROM ${APP}`], "may change the seals"],
    ["DELETE on seals", [`GRANT DELETE ON seals TO ${APP}`], [`REVOKE DELETE ON seals FROM ${APP}`], "may change the seals"],
    ["rights on the whole database", [`GRANT SELECT ON twinread.* TO ${APP}`], [`REVOKE SELECT ON twinread.* FROM ${APP}`], "rights on a whole database"],
    ["a digest compared by a language's rules", ["ALTER TABLE comparisons MODIFY sha256_b CHAR(32) CHARACTER SET latin1 COLLATE latin1_swedish_ci NOT NULL"], ["ALTER TABLE comparisons MODIFY sha256_b BINARY(32) NOT NULL"], "the column comparisons.sha256_b is compared as latin1_swedish_ci"],
    ["a key id whose capitals do not count", ["ALTER TABLE custody_entries MODIFY key_id CHAR(64) CHARACTER SET ascii COLLATE ascii_general_ci NOT NULL"], ["ALTER TABLE custody_entries MODIFY key_id CHAR(64) CHARACTER SET ascii COLLATE ascii_bin NOT NULL"], "the column custody_entries.key_id is compared as ascii_general_ci"],
  ])("is refused over %s", async (_, plant, undo, sentence) => {
    expect(await planted(plant, undo)).toMatch(sentence);
    await checkDatabase();
  });
});

import { createHash, randomUUID, sign } from "node:crypto";
import { parseSeal, sealText } from "@/lib/core/seal";
import { type Operation, ROWS } from "./operations";
import { strangersKey } from "./rewrite";
import type { Scene, Sql } from "./scene";

const digest = (bytes: Uint8Array | string) => createHash("sha256").update(bytes).digest();

async function numberAt(db: Sql, row: (typeof ROWS)[number]): Promise<number> {
  const numbers = (await db.query<{ number: number }[]>("SELECT number FROM seals ORDER BY number")).map((one) => one.number);
  return { first: numbers[0], middle: numbers[Math.floor(numbers.length / 2)], last: numbers[numbers.length - 1] }[row];
}

async function textAt(db: Sql, number: number): Promise<Buffer> {
  const [row] = await db.query<{ text: Buffer }[]>("SELECT text FROM seals WHERE number = ?", [number]);
  return row.text;
}

const SEAL_COLUMNS: Record<string, (text: Buffer) => unknown> = {
  text: (text) => Buffer.from(sealText({ ...parseSeal(text.toString("utf8"))!, root: "ab".repeat(32) })),
  sha256: () => digest("x"), prev: () => digest("x"), key_id: () => "ab".repeat(32), signature: () => Buffer.alloc(64, 7), cause: () => "daily", made_at: () => "2026-01-01 00:00:00.000001",
  chains: () => 1, leaves: () => Buffer.from('{"drive":"a","head":"b","seq":1}\n'), number: () => 4000,
};

function sealOps(): Operation[] {
  return [
    ...Object.entries(SEAL_COLUMNS).flatMap(([column, value]) => ROWS.map((row): Operation => ({
      name: `seal: change ${column}`, row,
      async run(db) {
        const number = await numberAt(db, row);
        await db.query(`UPDATE seals SET ${column} = ? WHERE number = ?`, [value(await textAt(db, number)), number]);
      },
    }))),
    ...ROWS.map((row): Operation => ({ name: "seal: delete", row, run: async (db) => void (await db.query("DELETE FROM seals WHERE number = ?", [await numberAt(db, row)])) })),
    { name: "seal: delete all", row: "", run: async (db) => void (await db.query("DELETE FROM seals")) },
    {
      name: "seal: swap two", row: "",
      async run(db) {
        const [one, other] = [await numberAt(db, "first"), await numberAt(db, "last")];
        for (const [from, to] of [[one, 900_000], [other, one], [900_000, other]]) await db.query("UPDATE seals SET number = ? WHERE number = ?", [to, from]);
      },
    },
    {
      name: "seal: insert a forged one", row: "",
      async run(db) {
        const number = await numberAt(db, "last");
        const facts = parseSeal((await textAt(db, number)).toString("utf8"))!;
        const text = Buffer.from(sealText({ ...facts, number: number + 1, root: "cd".repeat(32), prev: digest(await textAt(db, number)).toString("hex") }));
        await db.query(
          "INSERT INTO seals (number, text, sha256, prev, key_id, signature, cause, made_at, chains, leaves) SELECT number + 1, ?, ?, ?, key_id, ?, cause, made_at, chains, leaves FROM seals WHERE number = ?",
          [text, digest(text), digest(await textAt(db, number)), sign(null, text, strangersKey().privateKey), number],
        );
      },
    },
  ];
}

/** A statement on rows that no entry goes with. */
const plain = (name: string, statement: string, values: (scene: Scene) => unknown[]): Operation => ({ name, row: "", run: async (db, scene) => void (await db.query(statement, values(scene))) });

const otherImage = "(SELECT sha256 FROM images WHERE sha256 <> ? LIMIT 1)";
const imageOf = (scene: Scene) => digest(scene.a.image);

function decisionOps(): Operation[] {
  const approval = (name: string, what: string, values: (scene: Scene) => unknown[] = () => []) => plain(`approval: ${name}`, `UPDATE approvals SET ${what} WHERE id = ?`, (scene) => [...values(scene), scene.a.approvalId]);
  const read = (name: string, what: string, values: (scene: Scene) => unknown[] = () => []) => plain(`read: ${name}`, `UPDATE \`reads\` SET ${what} WHERE chip_id = ? AND stage = 'before' AND number = 2`, (scene) => [...values(scene), scene.a.chip.chipId]);
  return [
    approval("revoked without an entry", "revoked_at = UTC_TIMESTAMP(6), revoked_by = approved_by, revoked_cause = 'lead', revoked_reason = 'x'"),
    plain("approval: stands again", "UPDATE approvals SET revoked_at = NULL, revoked_by = NULL, revoked_cause = NULL, revoked_reason = NULL WHERE id = ?", (scene) => [scene.c.approvalId]),
    plain("approval: revoked by another", "UPDATE approvals SET revoked_by = ? WHERE id = ?", (scene) => [scene.admin.id, scene.c.approvalId]),
    approval("given by another", "approved_by = ?", (scene) => [scene.admin.id]), approval("of another image", `sha256 = ${otherImage}`, (scene) => [imageOf(scene)]),
    approval("for another donor", "donor_chip_id = ?", (scene) => [scene.b.chip.donorChipId]), approval("for another chip", "chip_id = ?", (scene) => [scene.b.chip.chipId]),
    approval("another statement", "statement = 'Looked at each byte.'"), approval("two-person rule off", "two_person_rule = 0"),
    plain("approval: delete", "DELETE FROM approvals WHERE id = ?", (scene) => [scene.c.approvalId]),
    {
      name: "approval: given without an entry", row: "",
      run: async (db, scene) => void (await db.query(
        "INSERT INTO approvals (id, chip_id, donor_chip_id, sha256, approved_by, given_at, statement, reasons, looked_at, two_person_rule) VALUES (?, ?, ?, ?, ?, UTC_TIMESTAMP(6), 'Fine.', '{}', '[]', 1)",
        [randomUUID(), scene.b.chip.chipId, scene.b.chip.donorChipId, digest(scene.b.image), scene.b.lead.id],
      )),
    },
    read("taken by another", "operator_id = ?", (scene) => [scene.admin.id]), read("another image", `sha256 = ${otherImage}`, (scene) => [imageOf(scene)]), read("another seating", "seating = 9"),
    read("of another chip", "chip_id = ?", (scene) => [scene.b.chip.donorChipId]), read("set aside without an entry", "counted = 0, set_aside_reason = 'x', set_aside_by = operator_id, set_aside_at = UTC_TIMESTAMP(6)"),
    plain("read: counted again without an entry", "UPDATE `reads` SET counted = 1, set_aside_reason = NULL, set_aside_by = NULL, set_aside_at = NULL WHERE counted = 0", () => []),
    plain("read: set aside by another", "UPDATE `reads` SET set_aside_by = ? WHERE counted = 0", (scene) => [scene.admin.id]),
    plain("read: delete", "DELETE FROM `reads` WHERE chip_id = ? AND stage = 'before' AND number = 2", (scene) => [scene.a.chip.chipId]),
    plain("transfer: by another", "UPDATE transfers SET by_user_id = ? WHERE id = ?", (scene) => [scene.admin.id, scene.a.transferId]),
    plain("transfer: of another approval", "UPDATE transfers SET approval_id = ? WHERE id = ?", (scene) => [scene.c.approvalId, scene.a.transferId]),
    plain("transfer: moved and not written", "UPDATE transfers SET kind = 'chip-moved' WHERE id = ?", (scene) => [scene.a.transferId]),
  ];
}

function otherOps(): Operation[] {
  return [
    plain("account: role changed without an entry", "UPDATE users SET role = 'admin' WHERE id = ?", (scene) => [scene.risen.id]),
    plain("account: role put back without an entry", "UPDATE users SET role = 'technician' WHERE id = ?", (scene) => [scene.risen.id]),
    plain("account: another name", "UPDATE users SET name = 'Nobody' WHERE id = ?", (scene) => [scene.a.lead.id]),
    plain("account: switched off", "UPDATE users SET disabled_at = UTC_TIMESTAMP(6) WHERE id = ?", (scene) => [scene.a.lead.id]),
    {
      name: "account: made without an entry", row: "",
      run: async (db) => void (await db.query("INSERT INTO users (id, email, name, role, password_hash, created_at) VALUES (?, 'x@y.example', 'X', 'lead', 'x', UTC_TIMESTAMP(6))", [randomUUID()])),
    },
    plain("policy: two-person rule off", "UPDATE policies SET two_person_rule = 0", () => []), plain("policy: fewer reads", "UPDATE policies SET policy_reads = 2", () => []),
    plain("image's row: size", "UPDATE images SET size_bytes = size_bytes + 1 WHERE sha256 = ?", (scene) => [imageOf(scene)]), plain("image's row: CRC-32", "UPDATE images SET crc32 = 1 WHERE sha256 = ?", (scene) => [imageOf(scene)]),
    plain("drive: another serial number", "UPDATE drives SET serial = 'SN-OTHER' WHERE id = ?", (scene) => [scene.a.chip.driveId]),
    plain("board: another revision", "UPDATE boards SET revision = 'rev Z' WHERE id = ?", (scene) => [scene.a.chip.originalBoardId]),
    plain("chip: another designator", "UPDATE chips SET designator = 'U99' WHERE id = ?", (scene) => [scene.a.chip.chipId]),
    plain("chip: another size", "UPDATE chips SET size_bytes = 4096 WHERE id = ?", (scene) => [scene.a.chip.chipId]), plain("chip: on another board", "UPDATE chips SET board_id = ?, designator = 'U13' WHERE id = ?", (scene) => [scene.b.chip.originalBoardId, scene.a.chip.chipId]),
    plain("chip: no longer paired", "UPDATE chips SET paired_with_id = NULL WHERE id = ?", (scene) => [scene.a.chip.donorChipId]),
    plain("case: another damage", "UPDATE cases SET damage = 'Something else' WHERE id = ?", (scene) => [scene.a.chip.caseId]),
    plain("account: another e-mail address", "UPDATE users SET email = 'thief@y.example' WHERE id = ?", (scene) => [scene.a.lead.id]),
    plain("account: another password", "UPDATE users SET password_hash = 'x' WHERE id = ?", (scene) => [scene.a.lead.id]),
  ];
}

function aroundOps(): Operation[] {
  const handOver = (name: string, what: string, which: "confirmed" | "open", values: (scene: Scene) => unknown[] = () => []) => plain(`hand-over: ${name}`, `UPDATE hand_overs SET ${what} WHERE id = ?`, (scene) => [...values(scene), scene.handOvers[which]]);
  const photo = (name: string, what: string, values: (scene: Scene) => unknown[] = () => []) => plain(`photo: ${name}`, `UPDATE photos SET ${what} WHERE subject_id = ?`, (scene) => [...values(scene), scene.a.chip.driveId]);
  const link = (name: string, what: string) => plain(`customer's link: ${name}`, `UPDATE shares SET ${what} WHERE case_id = ?`, (scene) => [scene.a.chip.caseId]);
  return [
    handOver("given to another", "to_person = 'Nobody'", "confirmed"), handOver("another seal number", "seal_number = 'S-1'", "confirmed"), handOver("confirmed by another", "confirmed_by = ?", "confirmed", (scene) => [scene.admin.id]),
    handOver("confirmed without an entry", "received = 1, confirmed_by = given_by, confirmed_at = UTC_TIMESTAMP(6)", "open"), handOver("open again", "received = NULL, confirmed_by = NULL, confirmed_at = NULL", "confirmed"),
    plain("hand-over: delete", "DELETE FROM hand_overs WHERE id = ?", (scene) => [scene.handOvers.open]),
    photo("of another drive", "subject_id = ?", (scene) => [scene.b.chip.driveId]), photo("another picture", "sha256 = ?", (scene) => [imageOf(scene)]), photo("another caption", "caption = 'Seal whole'"),
    plain("photo: delete", "DELETE FROM photos WHERE subject_id = ?", (scene) => [scene.a.chip.driveId]),
    link("ends later", "expires_at = expires_at + INTERVAL 1 YEAR"), link("withdrawn without an entry", "withdrawn_at = UTC_TIMESTAMP(6)"),
  ];
}

export const recordOperations = (): Operation[] => [...sealOps(), ...decisionOps(), ...otherOps(), ...aroundOps()];

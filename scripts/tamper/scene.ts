import { readFileSync, writeFileSync } from "node:fs";
import path from "node:path";
import * as mariadb from "mariadb";
import { addPhotos } from "@/lib/commands/add-photos";
import { changeUser } from "@/lib/commands/change-user";
import { confirmHandOver } from "@/lib/commands/confirm-hand-over";
import { correctDrive } from "@/lib/commands/correct-drive";
import { handOverItem } from "@/lib/commands/hand-over-item";
import { makeBundle } from "@/lib/commands/make-bundle";
import { makeSeal } from "@/lib/commands/make-seal";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { sendSummary } from "@/lib/commands/send-summary";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { witnessSeals } from "@/lib/commands/witness-seals";
import { sealMailText } from "@/lib/mail/seal-text";
import { env } from "@/lib/env";
import { CustodyHead } from "@/models";
import { makeWrittenBench } from "@/tests/support/bench-steps";
import { type Bench, freshImage, makeApprovedBench, makeReadyBench, makeUser, readsOf, store } from "@/tests/support/factory";
import { arrivedPhoto } from "@/tests/support/photos";
import { picture } from "@/tests/support/pictures";

/** A workshop with a history, in which each attack of the matrix is tried. */
export interface Scene {
  a: Bench & { approvalId: string; transferId: string };
  b: Bench;
  c: Bench & { approvalId: string };
  /** of drive A: a hand-over that was confirmed, and one that is under way */
  handOvers: { confirmed: string; open: string };
  admin: { id: string };
  /** an account whose role was changed once */
  risen: { id: string };
  /** seq of drive A's last entry, which lies after every seal */
  last: number;
  /** of the workshop's: how many entries, and the seq of the last one */
  workshopLast: number;
  /** copies outside: one from before the dump of "last week", and those from after it */
  old: string[];
  recent: { mail: string; bundle: string; witness: string };
}

export type Sql = Pick<mariadb.Connection, "query">;

const TABLES = [
  "users", "policies", "customers", "cases", "drives", "boards", "chips", "images", "transfers", "reads", "approval_requests", "approvals", "custody_heads", "custody_entries", "seals", "hand_overs", "photos", "shares",
];

/** Columns that can be written: the database makes the others itself. */
async function columnsOf(db: Sql, table: string): Promise<string> {
  const rows = await db.query<{ name: string }[]>("SELECT COLUMN_NAME AS name FROM information_schema.COLUMNS WHERE TABLE_SCHEMA = DATABASE() AND TABLE_NAME = ? AND GENERATION_EXPRESSION IS NULL ORDER BY ORDINAL_POSITION", [table]);
  return rows.map(({ name }) => `\`${name}\``).join(", ");
}

/** A dump of every table that the check looks at, kept under another name. */
export async function dump(db: Sql, name: string): Promise<void> {
  for (const table of TABLES) {
    await db.query(`DROP TABLE IF EXISTS kept_${name}_${table}`);
    await db.query(`CREATE TABLE kept_${name}_${table} AS SELECT ${await columnsOf(db, table)} FROM \`${table}\``);
  }
}

export async function dropDump(db: Sql, name: string): Promise<void> {
  for (const table of TABLES) await db.query(`DROP TABLE IF EXISTS kept_${name}_${table}`);
}

/** Puts tables back to a dump, row by row, so that a transaction can take it back. The triggers must be out of the way. */
export async function putBack(db: Sql, name: string, tables: readonly string[] = TABLES): Promise<void> {
  await db.query("SET foreign_key_checks = 0");
  for (const table of tables) {
    const columns = await columnsOf(db, table);
    await db.query(`DELETE FROM \`${table}\``);
    await db.query(`INSERT INTO \`${table}\` (${columns}) SELECT ${columns} FROM kept_${name}_${table}`);
  }
  await db.query("SET foreign_key_checks = 1");
}

/** Makes everything through the app's own commands. `folder` takes the copies that leave the house. */
export async function makeScene(db: Sql, folder: string): Promise<Scene> {
  const a = await makeWrittenBench();
  for (const seating of [1, 2]) await store(a.technician, a.chip.donorChipId, "after", a.image, seating);
  const b = await makeReadyBench();
  const [admin, auditor, risen] = [await makeUser("admin"), await makeUser("auditor"), await makeUser("technician")];
  await changeUser(admin, risen.id, { role: "lead" });
  const early = await makeSeal(auditor, "asked");
  await dump(db, "week");
  const c = await makeApprovedBench();
  await revokeApproval(c.lead, c.approvalId, { reason: "The drive's label was read wrongly." });
  await correctDrive(a.technician, a.chip.driveId, { changes: { interface: "SATA" }, reason: "It says “café 42” on the label." });
  await store(b.technician, b.chip.chipId, "before", freshImage(), 3);
  const odd = (await readsOf(b.technician, b.chip.chipId, "before")).at(-1)!;
  await setReadAside(b.lead, odd.id, { reason: "The clip slipped." });
  const handOvers = await goesRound(a);
  await addPhotos(a.technician, "drive", a.chip.driveId, [await arrivedPhoto(await picture())]);
  await sendSummary(a.lead, a.chip.caseId);
  await makeSeal(auditor, "asked");
  const bundle = path.join(folder, "case.zip");
  writeFileSync(bundle, await bytesOf(a));
  const newest = await makeSeal(auditor, "asked");
  await witnessSeals();
  const mail = path.join(folder, "seal.eml");
  writeFileSync(mail, `Subject: Seal\n\n${sealMailText({ workshop: "Alder Lane", ...newest })}`);
  const witness = path.join(folder, "witness.jsonl");
  writeFileSync(witness, readFileSync(env().witnessFile));
  const old = path.join(folder, "old-seal.txt");
  writeFileSync(old, early.text);
  // what happens after the last copy left the house
  await correctDrive(a.technician, a.chip.driveId, { changes: { interface: "SAS" }, reason: "Looked again: SAS." });
  await changeUser(admin, risen.id, { name: "Rósa Lind" });
  await dump(db, "now");
  const [last, workshopLast] = await Promise.all([a.chip.driveId, "00000000-0000-0000-0000-000000000000"].map(async (chain) => (await CustodyHead.findByPk(chain))!.seq));
  return { a, b, c, handOvers, admin, risen, last, workshopLast, old: [old], recent: { mail, bundle, witness } };
}

/** Drive A is given from hand to hand, and its board is on its way. */
async function goesRound({ technician, lead, chip }: Bench): Promise<Scene["handOvers"]> {
  const give = (item: { type: "drive" | "board"; id: string }) => handOverItem(technician, chip.driveId, {
    item, from: { person: technician.name, place: "Bench 2" }, to: { person: lead.name, place: "Safe 1", userId: lead.id }, condition: "In its bag, seal unbroken", sealNumber: "S-4411",
  });
  const confirmed = (await give({ type: "drive", id: chip.driveId })).id;
  await confirmHandOver(lead, confirmed, { received: true });
  return { confirmed, open: (await give({ type: "board", id: chip.originalBoardId })).id };
}

export async function bytesOf({ lead, chip }: Bench): Promise<Buffer> {
  const { stream } = await makeBundle(lead, chip.caseId);
  const chunks: Buffer[] = [];
  for await (const chunk of stream) chunks.push(chunk as Buffer);
  return Buffer.concat(chunks);
}

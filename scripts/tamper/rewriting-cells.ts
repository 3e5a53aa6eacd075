import { WORKSHOP_CHAIN } from "@/lib/core/words";
import type { Cell } from "./cells";
import { ROWS, seqOf } from "./operations";
import { chainAnew, changed, cutTail, headAtEnd, keyOfHouse, sealsAnew } from "./rewrite";
import { putBack, type Scene, type Sql } from "./scene";

const WINDOW = "It lies after the newest seal, and no copy of it has left the house.";
const edit = (entry: { actor: { name: string } }) => void (entry.actor.name = "Somebody Else");

async function rewrite(db: Sql, chain: string, seq: number): Promise<void> {
  const [{ body }] = await db.query<{ body: Buffer }[]>("SELECT body FROM custody_entries WHERE chain_id = ? AND seq = ?", [chain, seq]);
  await db.query("UPDATE custody_entries SET body = ? WHERE chain_id = ? AND seq = ?", [changed(body, edit), chain, seq]);
}

/** Root who makes chain and head fit again, but cannot sign; and who cuts the tail and turns the head back. */
function withoutKeys(): Cell[] {
  const cell = (name: string, row: string, run: Cell["run"], more: Partial<Cell> = {}): Cell => ({ attacker: "A4", name, row, run, ...more });
  const anew = ROWS.flatMap((row) => [
    cell("change an entry, chain and head made anew", row, async (db, scene) => {
      await rewrite(db, scene.a.chip.driveId, seqOf(scene, row));
      await chainAnew(db, scene.a.chip.driveId, seqOf(scene, row), null);
    }),
    cell("take an entry out, chain and head made anew", row, async (db, scene) => {
      const [chain, seq] = [scene.a.chip.driveId, seqOf(scene, row)];
      await db.query("DELETE FROM custody_entries WHERE chain_id = ? AND seq = ?", [chain, seq]);
      await db.query("UPDATE custody_entries SET seq = seq - 1 WHERE chain_id = ? AND seq > ? ORDER BY seq", [chain, seq]);
      if (row === "last") return headAtEnd(db, chain);
      await chainAnew(db, chain, seq, null);
    }),
    cell("the same on the workshop's log", row, async (db, scene) => {
      const seq = { first: 1, middle: Math.ceil(scene.workshopLast / 2), last: scene.workshopLast }[row];
      await rewrite(db, WORKSHOP_CHAIN, seq);
      await chainAnew(db, WORKSHOP_CHAIN, seq, null);
    }),
  ]);
  const cut = (name: string, keep: (scene: Scene) => number, more: Partial<Cell> = {}) => cell(`cut the tail, head turned back: ${name}`, "last", async (db, scene) => cutTail(db, scene.a.chip.driveId, keep(scene)), more);
  return [
    ...anew, cut("what came after the newest seal", (scene) => scene.last - 1, { outside: all }),
    cell("cut what came after the newest seal, and put the row back that it had changed", "last", async (db, scene) => {
      await cutTail(db, scene.a.chip.driveId, scene.last - 1);
      await db.query("UPDATE drives SET interface = 'SATA' WHERE id = ?", [scene.a.chip.driveId]);
    }, { unseen: WINDOW, outside: all }), cut("one sealed entry", (scene) => scene.last - 2), cut("half", (scene) => Math.ceil(scene.last / 2)), cut("all but the first", () => 1), cut("all", () => 0),
    cell("cut the tail, and the seals and their entries that saw it", "last", cutWithSeals, { outside: all }),
    cell("the same, no copy given, the data folder's witness file left alone", "last", cutWithSeals),
    cell("the same, without a copy from outside", "last", cutWithSeals, { unseen: "Seals, their entries and the tail are gone together: what is left is an earlier state. Only the witness file or another copy tells.", outside: () => [], noWitness: true }),
    ...ROWS.map((row) => cell("take out the seal and its entry, workshop's log made anew", row, async (db) => {
      const numbers = (await db.query<{ number: number }[]>("SELECT number FROM seals ORDER BY number")).map((one) => one.number);
      const number = { first: numbers[0], middle: numbers[1], last: numbers[numbers.length - 1] }[row];
      await db.query("DELETE FROM seals WHERE number = ?", [number]);
      const entries = await db.query<{ seq: number; body: Buffer }[]>("SELECT seq, body FROM custody_entries WHERE chain_id = ? AND action = 'seal.made'", [WORKSHOP_CHAIN]);
      const { seq } = entries.find(({ body }) => body.includes(`"number":${number},`))!;
      await db.query("DELETE FROM custody_entries WHERE chain_id = ? AND seq = ?", [WORKSHOP_CHAIN, seq]);
      await db.query("UPDATE custody_entries SET seq = seq - 1 WHERE chain_id = ? AND seq > ? ORDER BY seq", [WORKSHOP_CHAIN, seq]);
      await chainAnew(db, WORKSHOP_CHAIN, seq, null);
    })),
  ];
}

const all = ({ recent }: Scene) => [recent.mail, recent.bundle, recent.witness];

/** Everything after the first seal goes, in the drive's log, in the workshop's and in the table: nothing is left that tells. */
async function cutWithSeals(db: Sql): Promise<void> {
  const [{ seq }] = await db.query<{ seq: number }[]>("SELECT MIN(seq) AS seq FROM custody_entries WHERE chain_id = ? AND action = 'seal.made'", [WORKSHOP_CHAIN]);
  const [{ n }] = await db.query<{ n: number }[]>("SELECT MIN(number) AS n FROM seals");
  await db.query("DELETE FROM seals WHERE number > ?", [n]);
  await cutTail(db, WORKSHOP_CHAIN, seq);
  await putBack(db, "week", ["users", "drives", "boards", "chips", "cases", "reads", "approvals", "transfers", "hand_overs", "photos", "shares", "custody_heads", "custody_entries"]);
}

/** Root who has both signing keys: only what has left the house speaks against it. */
function withKeys(): Cell[] {
  const run = (row: (typeof ROWS)[number]) => async (db: Sql, scene: Scene) => {
    await rewrite(db, scene.a.chip.driveId, seqOf(scene, row));
    await chainAnew(db, scene.a.chip.driveId, seqOf(scene, row), keyOfHouse("log"));
    await sealsAnew(db);
  };
  const inside = "With both keys everything inside is made to fit. Only copies that have left the house speak.";
  const copies: [string, (scene: Scene) => string[]][] = [["a seal mailed", ({ recent }) => [recent.mail]], ["a bundle", ({ recent }) => [recent.bundle]], ["a witness file on another disk", ({ recent }) => [recent.witness]], ["an older seal", ({ old }) => old]];
  return [
    ...ROWS.map((row): Cell => ({ attacker: "A7", name: "change an entry, sign chain and seals anew; no copy from outside", row, run: run(row), outside: () => [], noWitness: true, unseen: inside })),
    ...copies.flatMap(([copy, outside]) => ROWS.map((row): Cell => ({
      attacker: "A7", name: `the same; ${copy} outside`, row, run: run(row), outside, noWitness: true, ...(row === "last" ? { unseen: WINDOW } : {}),
    }))),
    ...ROWS.map((row): Cell => ({
      attacker: "A7", name: "change an entry, sign it anew, leave the seals", row,
      async run(db, scene) {
        await rewrite(db, scene.a.chip.driveId, seqOf(scene, row));
        await chainAnew(db, scene.a.chip.driveId, seqOf(scene, row), keyOfHouse("log"));
      },
      ...(row === "last" ? { unseen: WINDOW } : {}),
    })),
  ];
}

export const rewritingCells = (): Cell[] => [...withoutKeys(), ...withKeys()];

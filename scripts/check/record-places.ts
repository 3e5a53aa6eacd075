import type { Transaction } from "sequelize";
import { Board, Chip, Drive } from "@/models";
import type { Logged } from "./logged";
import type { Places } from "./places";
import type { Damage } from "./report";

/** Drives, boards and chips against what was recorded and corrected of them, name by name as the log has it, and pairs against the last pairing. */
export async function checkThings(tx: Transaction, places: Places, logged: Logged): Promise<Damage[]> {
  const found: Damage[] = [];
  const boards = await Board.findAll({ transaction: tx, raw: true });
  const chips = await Chip.findAll({ transaction: tx, raw: true });
  const driveOfBoard = new Map(boards.map((row) => [row.id, row.driveId]));
  const rows: [string, string, string, object][] = [
    ...(await Drive.findAll({ transaction: tx, raw: true })).map((row): [string, string, string, object] => [row.id, row.id, "drive", row]),
    ...boards.map((row): [string, string, string, object] => [row.id, row.driveId, "board", row]),
    ...chips.map((row): [string, string, string, object] => [row.id, driveOfBoard.get(row.boardId) ?? "", "chip", row]),
  ];
  const here = new Set<string>();
  for (const [id, chain, noun, row] of rows) {
    here.add(id);
    const told = logged.things.get(id);
    const say = (sentence: string, expected?: string, is?: string) =>
      found.push({ place: places.chain(chain), seq: told?.seq ?? null, problem: told ? "thing-differs-from-log" : "thing-not-in-log", sentence, chain, sha256: null, reads: [], expected, found: is });
    if (!told) say(`A ${noun} stands in the database that no entry of the log records.`);
    else if (told.chain !== chain) say(`The ${noun} stands under another drive than the log says.`, places.chain(told.chain), places.chain(chain));
    else {
      for (const [name, [expected, is]] of differences(told.facts, row)) say(`The ${noun}'s row says something else than the log.`, `${name} ${JSON.stringify(expected)}`, `${name} ${JSON.stringify(is)}`);
    }
  }
  for (const row of chips) {
    const expected = logged.pairs.get(row.id) ?? null;
    if (expected === row.pairedWithId) continue;
    const chain = driveOfBoard.get(row.boardId) ?? "";
    const name = (id: string | null) => (id === null ? "no chip" : chips.find((chip) => chip.id === id)?.designator ?? id);
    found.push({ place: places.chain(chain), seq: null, problem: "thing-differs-from-log", sentence: `The donor's ${row.designator} is paired otherwise than the log says.`, chain, sha256: null, reads: [], expected: name(expected), found: name(row.pairedWithId) });
  }
  for (const [id, { chain, seq, noun }] of logged.things) {
    if (!here.has(id)) found.push({ place: places.chain(chain), seq, problem: "thing-missing", sentence: `The log records a ${noun}, and it is gone from the database.`, chain, sha256: null, reads: [] });
  }
  return found;
}

/** Only what both know by the same name; what a version before did not write down is not compared. */
function differences(facts: Record<string, unknown>, row: object): [string, [unknown, unknown]][] {
  return Object.entries(facts).flatMap(([name, told]): [string, [unknown, unknown]][] => {
    if (!(name in row)) return [];
    const value = (row as Record<string, unknown>)[name];
    const [expected, is] = [told === "unknown" ? null : told, typeof told === "boolean" ? Boolean(value) : value];
    return expected === is ? [] : [[name, [expected, is]]];
  });
}

import { type ImportAnswer, type ImportLine, MAX_SHELF_FILE_CHANGES, MOST_IMPORT_LINES, shelfNumber } from "@/lib/core/shelf";
import { countOf } from "@/lib/core/quantity";
import { type Actor, WORKSHOP_CHAIN } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { inTransaction, type Transaction } from "@/models";
import { lockChain } from "./append-entry";
import { type PlannedLine, planShelfImport } from "./plan-shelf-import";
import { readShelfCsv } from "./read-shelf-csv";
import { nextShelfNumber, writeShelfBoard } from "./record-shelf-board";
import { writeShelfChange } from "./change-shelf-board";
import { allow } from "./refuse";

export interface ShelfFileInput {
  bytes: Uint8Array;
  /** as it came, for the entries' reason */
  fileName: string;
  /** only say what each line would do */
  tryOnly: boolean;
  reason: string | null;
}

/** Boards of the shelf from a CSV file: tried line by line, then all of it or nothing. */
export async function importShelf(actor: Actor, { bytes, fileName, tryOnly, reason }: ShelfFileInput): Promise<ImportAnswer> {
  allow(actor, "shelf.change");
  const rows = readShelfCsv(bytes);
  return inTransaction(async (tx) => {
    if (!tryOnly) await lockChain(tx, WORKSHOP_CHAIN);
    const plan = await planShelfImport(rows, tx);
    const writes = plan.filter((line) => line.result === "new" || line.result === "changed");
    if (writes.length > MAX_SHELF_FILE_CHANGES) {
      throw new AppError("does-not-fit", `The file would add or change ${countOf(writes.length, "board")}; one file does ${MAX_SHELF_FILE_CHANGES.toLocaleString("en")} at most. Split it, with the header row in each part.`);
    }
    if (tryOnly) return answerOf(plan, false);
    refuseAny(plan);
    await write(tx, actor, writes, fileName, reason);
    return answerOf(plan, true);
  });
}

function refuseAny(plan: readonly PlannedLine[]): void {
  const refused = plan.filter((line) => line.result === "refused");
  if (refused.length === 0) return;
  const [first] = refused;
  throw new AppError("does-not-fit", `${countOf(refused.length, "line")} can't be taken, so nothing was changed. Line ${first.line}: ${first.sentence}`, {
    errors: refused.slice(0, 50).map((line) => ({ path: `line ${line.line}`, message: line.sentence })),
  });
}

async function write(tx: Transaction, actor: Actor, writes: PlannedLine[], fileName: string, reason: string | null): Promise<void> {
  let number = writes.some((line) => line.result === "new") ? await nextShelfNumber(tx) : 0;
  for (const line of writes) {
    if (line.make) {
      const row = await writeShelfBoard(tx, actor, number, line.make, line.kept ?? null);
      number += 1;
      line.number = shelfNumber(row.number);
    } else if (line.change) {
      const { row, wanted, found } = line.change;
      await writeShelfChange(tx, actor, row, wanted, found, reason ?? `From line ${line.line} of ${fileName.slice(0, 120) || "a pasted text"}.`);
    }
  }
}

const ORDER: ImportLine["result"][] = ["refused", "new", "changed", "same"];

function answerOf(plan: readonly PlannedLine[], done: boolean): ImportAnswer {
  const counts = { new: 0, changed: 0, same: 0, refused: 0 };
  for (const { result } of plan) counts[result] += 1;
  const told = plan.filter((line) => line.result !== "same").sort((a, b) => ORDER.indexOf(a.result) - ORDER.indexOf(b.result) || a.line - b.line);
  return { done, counts, lines: told.slice(0, MOST_IMPORT_LINES).map(({ line, result, number, sentence }) => ({ line, result, number, sentence })), left: Math.max(0, told.length - MOST_IMPORT_LINES) };
}

import { randomUUID } from "node:crypto";
import { type DonorFit, donorFit } from "@/lib/core/donor-fit";
import { NO_DONOR_REFUSAL } from "@/lib/core/no-chip";
import { may } from "@/lib/core/policy";
import type { Actor } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import type { BoardInput } from "@/lib/schemas/board";
import { Board, inTransaction, type Transaction } from "@/models";
import { appendEntry, lockChain } from "./append-entry";
import { driveFor, placeOfDrive } from "./place";
import { allow } from "./refuse";
import { requireOpen } from "./require-open";

/** Records a board of a drive. A donor is compared with the original: another board number needs a lead and a reason. */
export async function recordBoard(actor: Actor, driveId: string, input: BoardInput): Promise<{ id: string; fit: DonorFit | null }> {
  allow(actor, "board.record");
  await driveFor(actor, driveId);
  return inTransaction((tx) => writeBoard(tx, actor, driveId, input));
}

/** The same within a change that does more, such as taking a board from the shelf. */
export async function writeBoard(tx: Transaction, actor: Actor, driveId: string, input: BoardInput): Promise<{ id: string; fit: DonorFit | null }> {
  await lockChain(tx, driveId);
  requireOpen((await placeOfDrive(driveId, tx)).case);
  const originals = await Board.findAll({ where: { driveId, role: "original" }, transaction: tx });
  if (input.role === "original" && originals.length > 0) {
    throw new AppError("rule-against", "This drive has its original board already. Correct that one, or record this board as a donor.");
  }
  if (input.role === "donor" && originals.length === 0) {
    throw new AppError("rule-against", "Record the original board first; the donor is compared with it.");
  }
  if (input.role === "donor" && originals[0].dataInController) throw new AppError("rule-against", NO_DONOR_REFUSAL);
  if (input.role === "donor" && input.dataInController) throw onlyOnOriginal();
  const facts = {
    boardNumber: input.boardNumber, revision: input.revision ?? null, controllerMarking: input.controllerMarking ?? null,
    motorDriverMarking: input.motorDriverMarking ?? null, condition: input.condition ?? null, dataInController: input.dataInController ?? false,
  };
  const fit = input.role === "donor" ? donorFit(originals[0], facts) : null;
  if (fit?.verdict === "other-number") checkOtherNumber(actor, input.reason ?? null);
  const board = await Board.create({
    id: randomUUID(), driveId, role: input.role, ...facts, fitReason: input.reason ?? null, createdAt: new Date(),
  }, { transaction: tx });
  await appendEntry(tx, driveId, actor, "board.recorded", { type: "board", id: board.id }, {
    role: input.role, ...facts, fit: fit && { verdict: fit.verdict, differences: fit.differences, reason: input.reason ?? null },
  });
  return { id: board.id, fit };
}

export function onlyOnOriginal(): AppError {
  return new AppError("does-not-fit", "Where the unique data lies is a fact of the original board. Record it there.", { errors: [{ path: "dataInController", message: "Only on the original board." }] });
}

function checkOtherNumber(actor: Actor, reason: string | null): void {
  if (!may(actor, "board.allow-other-number")) {
    throw new AppError("rule-against", "The donor's board number differs from the original's. Take another donor, or ask a lead to record it with a reason.");
  }
  if (!reason) throw new AppError("does-not-fit", "The donor's board number differs from the original's. Give a reason for taking it.", { errors: [{ path: "reason", message: "Give a reason." }] });
}

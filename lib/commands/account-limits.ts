import { endOfDay, lastDayOf } from "@/lib/core/account-end";
import type { Role } from "@/lib/core/words";
import { env } from "@/lib/env";
import { AppError } from "@/lib/errors";
import { limitFaults } from "@/lib/schemas/user";
import { Case, type Transaction, UserCase } from "@/models";

/** What an auditor's account may carry: the only cases it sees, by id, and its last day. Null is no limit. */
export interface AccountLimits {
  cases: string[] | null;
  endsOn: string | null;
}

export const NO_LIMITS: AccountLimits = { cases: null, endsOn: null };

function refuse(path: string, message: string): AppError {
  return new AppError("does-not-fit", message, { errors: [{ path, message }] });
}

/** Refuses limits that this role can't carry, a day that is over (unless it stood there before) and cases that aren't there. */
export async function checkLimits(tx: Transaction, role: Role, limits: AccountLimits, endedBefore: string | null = null): Promise<void> {
  const [fault] = limitFaults({ role, ...limits });
  if (fault) throw refuse(fault.path, fault.message);
  const { endsOn, cases } = limits;
  if (endsOn && endsOn !== endedBefore && endOfDay(endsOn, env().timeZone).getTime() <= Date.now()) {
    throw refuse("endsOn", "This day is over already. Give a later one, or switch the account off to end it now.");
  }
  if (cases && (await Case.count({ where: { id: cases }, transaction: tx })) < new Set(cases).size) {
    throw refuse("cases", "One of these cases isn't on record. Choose from the list.");
  }
}

/** The columns of the account's row. */
export function limitColumns({ cases, endsOn }: AccountLimits): { limited: boolean; endsAt: Date | null } {
  return { limited: cases !== null, endsAt: endsOn ? endOfDay(endsOn, env().timeZone) : null };
}

export async function limitsOf(tx: Transaction, user: { id: string; limited: boolean; endsAt: Date | null }): Promise<AccountLimits> {
  const rows = user.limited ? await UserCase.findAll({ where: { userId: user.id }, transaction: tx }) : null;
  return { cases: rows && rows.map((row) => row.caseId), endsOn: user.endsAt && lastDayOf(user.endsAt, env().timeZone) };
}

export async function keepCaseList(tx: Transaction, userId: string, cases: string[] | null): Promise<void> {
  await UserCase.destroy({ where: { userId }, transaction: tx });
  await UserCase.bulkCreate([...new Set(cases ?? [])].map((caseId) => ({ userId, caseId })), { transaction: tx });
}

/** "26-0003, 26-0007", as the log names a list. */
export async function caseListInWords(tx: Transaction, cases: string[] | null): Promise<string> {
  if (cases === null) return "every case";
  const rows = await Case.findAll({ where: { id: cases }, attributes: ["ref"], order: ["ref"], transaction: tx });
  return rows.map((row) => row.ref).join(", ") || "no case";
}

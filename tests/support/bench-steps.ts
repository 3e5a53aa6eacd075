import { changePolicy } from "@/lib/commands/change-policy";
import { recordTransfer } from "@/lib/commands/record-transfer";
import type { Action } from "@/lib/core/custody-actions";
import { AppError, type ErrorCode } from "@/lib/errors";
import { chipView } from "@/lib/queries/chip-view";
import { currentPolicy } from "@/lib/queries/policy";
import type { PolicyInput } from "@/lib/schemas/policy";
import type { ReadView } from "@/lib/views";
import { type Bench, logOf, makeApprovedBench, makeUser } from "./factory";

/** Steps of the bench that several tests of the rules share, all through the real commands. */

/** The same image with one bit of one byte turned over. */
export function flipped(image: Uint8Array, at = 4711): Buffer {
  const other = Buffer.from(image);
  other[at % other.length] ^= 0x08;
  return other;
}

export async function makeWrittenBench(): Promise<Bench & { approvalId: string; transferId: string }> {
  const bench = await makeApprovedBench();
  const { id } = await recordTransfer(bench.technician, bench.approvalId, { kind: "write", donorChipId: bench.chip.donorChipId });
  return { ...bench, transferId: id };
}

export const view = ({ technician, chip }: Pick<Bench, "technician" | "chip">) => chipView(technician, chip.chipId);

export async function readNamed(bench: Pick<Bench, "technician" | "chip">, stage: ReadView["stage"], number: number): Promise<ReadView> {
  return (await view(bench)).reads.find((r) => r.stage === stage && r.number === number)!;
}

/** The facts of each entry of one kind, in the log's order. */
export async function logged(chain: string, action: Action): Promise<Record<string, unknown>[]> {
  return (await logOf(chain)).filter((entry) => entry.action === action).map((entry) => entry.facts);
}

/** The refusal with its status; a command that went through, or broke otherwise, does not pass. */
export async function refusal(run: Promise<unknown>): Promise<{ code: ErrorCode; status: number; detail: string }> {
  const error = await run.then(() => null, (thrown: unknown) => thrown);
  if (error instanceof AppError) return { code: error.code, status: error.status, detail: error.detail };
  throw error ?? new Error("the command was not refused");
}

/** Runs `work` under another policy, set by an admin, and puts the former one back. */
export async function underPolicy<T>(change: Partial<PolicyInput>, work: () => Promise<T>): Promise<T> {
  const admin = await makeUser("admin");
  const before: PolicyInput = { ...(await currentPolicy()), secondFactor: false };
  await changePolicy(admin, { ...before, ...change });
  try {
    return await work();
  } finally {
    await changePolicy(admin, before);
  }
}

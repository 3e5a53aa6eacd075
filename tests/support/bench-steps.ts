import { randomUUID } from "node:crypto";
import { approveImage } from "@/lib/commands/approve-image";
import { changePolicy } from "@/lib/commands/change-policy";
import { recordTransfer } from "@/lib/commands/record-transfer";
import type { Action } from "@/lib/core/custody-actions";
import type { Actor } from "@/lib/core/words";
import { AppError, type ErrorCode } from "@/lib/errors";
import { chipView } from "@/lib/queries/chip-view";
import { chainEntries } from "@/lib/queries/custody";
import { currentPolicy } from "@/lib/queries/policy";
import type { PolicyInput } from "@/lib/schemas/policy";
import type { ReadView } from "@/lib/views";
import { type MadeChip, makeChip, makeReady, makeUser, sha256, stream } from "./factory";

/** The steps of the bench that most tests of the rules begin with, all through the real commands. */

/** An image that no other test and no earlier run has: equal images on two drives would be a finding. */
export const freshImage = (length = 8192) => stream(`fresh-${randomUUID()}`, length);

/** The same image with one bit of one byte turned over. */
export function flipped(image: Uint8Array, at = 4711): Buffer {
  const other = Buffer.from(image);
  other[at % other.length] ^= 0x08;
  return other;
}

export interface Bench {
  technician: Actor;
  lead: Actor;
  chip: MadeChip;
  image: Buffer;
}

/** A chip whose image waits for approval. */
export async function readyBench(): Promise<Bench> {
  const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
  const chip = await makeChip(technician);
  const image = freshImage();
  await makeReady(technician, chip, image, freshImage());
  return { technician, lead, chip, image };
}

export function approve(lead: Actor, chip: MadeChip, image: Uint8Array, over: { donorChipId?: string; reasons?: Record<string, string> } = {}): Promise<{ id: string }> {
  const input = { sha256: sha256(image), donorChipId: chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [], ...over };
  return approveImage(lead, chip.chipId, input);
}

export async function approvedBench(): Promise<Bench & { approvalId: string }> {
  const bench = await readyBench();
  return { ...bench, approvalId: (await approve(bench.lead, bench.chip, bench.image)).id };
}

export async function writtenBench(): Promise<Bench & { approvalId: string; transferId: string }> {
  const bench = await approvedBench();
  const { id } = await recordTransfer(bench.technician, bench.approvalId, { kind: "write", donorChipId: bench.chip.donorChipId });
  return { ...bench, transferId: id };
}

export const view = ({ technician, chip }: Pick<Bench, "technician" | "chip">) => chipView(technician, chip.chipId);
export const stateOf = async (bench: Pick<Bench, "technician" | "chip">) => (await view(bench)).state.state;

export async function readNamed(bench: Pick<Bench, "technician" | "chip">, stage: ReadView["stage"], number: number): Promise<ReadView> {
  return (await view(bench)).reads.find((r) => r.stage === stage && r.number === number)!;
}

/** What stands behind an approval that fell. */
export async function lastRevocation(bench: Pick<Bench, "technician" | "chip">) {
  const { approval, approvals } = await view(bench);
  return approval ? null : approvals.at(-1)?.revoked ?? null;
}

/** The facts of each entry of one kind, in the log's order. */
export async function logged(chain: string, action: Action): Promise<Record<string, unknown>[]> {
  return (await chainEntries(chain)).filter((e) => e.action === action).map((e) => (JSON.parse(e.body) as { facts: Record<string, unknown> }).facts);
}

/** The refusal that a command answered with; a command that went through, or broke otherwise, does not pass. */
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

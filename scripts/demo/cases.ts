import { createCase } from "@/lib/commands/create-case";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import type { CaseInput } from "@/lib/schemas/case";
import type { DriveInput } from "@/lib/schemas/drive";
import { type BoardFacts, type Boards, boards, FIRMWARE_CHIP, type Pair, pair } from "./bench-work";
import { firmware } from "./images";

/** A day of the workshop's calendar, counted from today. */
export function day(fromToday: number): string {
  return new Intl.DateTimeFormat("sv-SE", { timeZone: env().timeZone }).format(Date.now() + fromToday * 86_400_000);
}

/** The boards that the demo's part numbers carry. */
export const BOARDS: Record<string, BoardFacts> = {
  "PN 4471-0093-B": { boardNumber: "BX 40-3179", revision: "rev C", controllerMarking: "KV-8810", motorDriverMarking: "MD 2206" },
  "PN 2214-0066-A": { boardNumber: "BX 38-1140", revision: "rev A", controllerMarking: "KV-7702", motorDriverMarking: "MD 1903" },
  "PN 5108-0210-C": { boardNumber: "BX 44-0207", revision: "rev B", controllerMarking: "KV-9120", motorDriverMarking: "MD 2301" },
  "PN 3320-0071-A": { boardNumber: "BX 41-2256", revision: "rev D", controllerMarking: "KV-8815", motorDriverMarking: "MD 2206" },
};

export function receiveCase(actor: Actor, name: string, email: string, damage: string, due: number, more: Partial<CaseInput> = {}): Promise<{ id: string; ref: string }> {
  return createCase(actor, { customer: { name, email, ...more.customer }, damage, dueOn: day(due), note: more.note });
}

export function labelled(partNumber: keyof typeof BOARDS, serial: string): DriveInput {
  return { partNumber, serial, interface: "SATA" };
}

/** A case with one drive and one pair of firmware chips, and the image each of them holds. */
export interface OneChip extends Pair {
  caseId: string;
  boards: Boards;
  image: Buffer;
  donorImage: Buffer;
}

export async function oneChip(
  actor: Actor, made: { id: string; ref: string }, partNumber: keyof typeof BOARDS, serial: string,
  { designator = "U3", donor = {}, facts = FIRMWARE_CHIP }: { designator?: string; donor?: Partial<BoardFacts>; facts?: Parameters<typeof pair>[3] } = {},
): Promise<OneChip> {
  const both = await boards(actor, made.id, labelled(partNumber, serial), BOARDS[partNumber], donor);
  const at = await pair(actor, both, `${made.ref}_A_${designator}`, facts);
  const of = (unit: string) => firmware({ kind: partNumber, unit });
  return { ...at, caseId: made.id, boards: both, image: of(serial), donorImage: of(`donor for ${serial}`) };
}

/** The case that the demo's pages show most of. */
export interface ShownCase {
  caseId: string;
  boards: Boards;
  u3: Pair;
  u12: Pair;
}

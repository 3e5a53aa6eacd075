import { heldByWitness, sealDigests, witnessTrouble } from "@/lib/commands/witness-seals";
import { env } from "@/lib/env";
import type { WitnessView } from "@/lib/views";

/** Where the witness file lies, how far it goes and what is wrong with it, for the audit page. */
export async function witnessState(): Promise<WitnessView> {
  const path = env().witnessFile;
  try {
    const [held, seals] = [await heldByWitness(), await sealDigests()];
    const last = held.seals.size > 0 ? Math.max(...held.seals.values()) : null;
    return { path, last, trouble: witnessTrouble() ?? compared(held, seals) };
  } catch (error) {
    return { path, last: null, trouble: `The witness file can't be read: ${(error as Error).message}. See to ${path}.` };
  }
}

function compared(held: Awaited<ReturnType<typeof heldByWitness>>, seals: { number: number; sha256: string }[]): string | null {
  const stored = new Set(seals.map((seal) => seal.sha256));
  const strangers = [...held.seals].filter(([sha256]) => !stored.has(sha256)).map(([, number]) => number).sort((a, b) => a - b);
  if (strangers.length > 0) {
    return `The witness file holds seal ${strangers[0]}${strangers.length > 1 ? ` and ${strangers.length - 1} more` : ""} that the database doesn't have in this form: the database was turned back, replaced or changed. Keep both as they are and have an auditor look.`;
  }
  if (held.unreadable > 0) return `${held.unreadable} ${held.unreadable === 1 ? "line of the witness file is" : "lines of the witness file are"} no seal: a writer was cut off there, or somebody wrote into it. Nothing is taken out.`;
  const missing = seals.filter((seal) => !held.seals.has(seal.sha256));
  return missing.length > 0 ? `Seal ${missing[0].number}${missing.length > 1 ? ` and ${missing.length - 1} more` : ""} is not in the witness file yet. It is added within minutes.` : null;
}

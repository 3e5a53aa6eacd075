import { env } from "@/lib/env";
import { readWitness, witnessMark } from "@/storage";
import { judgeOutsideSeal, type OutsideSeal, outsideSeal, type SealsHere, signatureOf } from "./outside-seal";
import type { Damage, StoreReport } from "./report";

/** A line of a witness file. Hostile input: null for what is none. */
export function witnessLine(line: string): OutsideSeal | null {
  try {
    const { seal, signature } = JSON.parse(line) as { seal?: unknown; signature?: unknown };
    return typeof seal === "string" && typeof signature === "string" ? outsideSeal(seal, signatureOf(signature)) : null;
  } catch {
    return null;
  }
}

export interface WitnessChecked {
  witness: StoreReport["witness"];
  damage: Damage[];
  notes: string[];
  notChecked: string[];
}

/** The data folder's own witness file against the seals of the database. */
export async function checkWitness(here: SealsHere, path = env().witnessFile): Promise<WitnessChecked> {
  const found: WitnessChecked = { witness: null, damage: [], notes: [], notChecked: [] };
  try {
    if ((await witnessMark(path)) === null) {
      if (here.known.size > 0) found.notChecked.push(`whether the witness file holds the same seals: ${path} is not there.`);
      return found;
    }
    const { lines, rest } = await readWitness(path);
    const seals = [...lines, rest].filter((line) => line !== "").map(witnessLine);
    const strangers = seals.filter((seal) => seal === null).length;
    if (strangers > 0) found.notes.push(`${strangers} ${strangers === 1 ? "line" : "lines"} of the witness file ${path} ${strangers === 1 ? "is" : "are"} no seal: a writer was cut off there, or somebody wrote into it.`);
    found.witness = { path, seals: seals.length - strangers };
    const held = new Set<string>();
    for (const seal of seals) {
      if (!seal || held.has(seal.sha256)) continue;
      held.add(seal.sha256);
      found.damage.push(...judgeOutsideSeal(seal, here, path).damage.map((one): Damage => ({ ...one, problem: "witness" })));
    }
    const missing = [...here.known].filter(([, sha256]) => !held.has(sha256)).map(([number]) => number);
    if (missing.length > 0) found.notes.push(`The witness file does not hold seal ${missing[0]}${missing.length > 1 ? ` and ${missing.length - 1} more` : ""}: it is added within minutes, or somebody took it out.`);
  } catch (error) {
    found.notChecked.push(`the witness file ${path}: ${(error as Error).message}.`);
  }
  return found;
}

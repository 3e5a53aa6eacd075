import { allow } from "@/lib/commands/refuse";
import { type Actor, type KeyPurpose, WORKSHOP_CHAIN } from "@/lib/core/words";
import type { KeyRow, PersonView } from "@/lib/views";
import { CustodyEntry } from "@/models";
import { keyring } from "./keyring";

interface Introduction {
  at: string;
  actor: PersonView;
  facts: { keyId: string; purpose: KeyPurpose; reason?: string };
}

/** The keys that the log introduces, the newest first; an entry that the rules refuse is none of them. */
export async function keyList(actor: Actor): Promise<{ keys: KeyRow[] }> {
  allow(actor, "audit.read");
  const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, order: ["seq"] });
  const ring = keyring(rows, null);
  const refused = new Set(ring.problems.map((problem) => problem.seq));
  const inUse = { log: [...ring.keys.keys()].at(-1), seal: [...ring.sealKeys.keys()].at(-1) };
  const keys = rows.filter((row) => !refused.has(row.seq)).map((row): KeyRow => {
    const { at, actor: by, facts } = JSON.parse(row.body.toString("utf8")) as Introduction;
    return { keyId: facts.keyId, purpose: facts.purpose, since: at, introducedBy: by, reason: facts.reason ?? null, current: inUse[facts.purpose] === facts.keyId };
  });
  return { keys: keys.reverse() };
}

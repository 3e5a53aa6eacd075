import { createHash } from "node:crypto";
import { Transaction as Isolation } from "sequelize";
import { type ChainFinding, checkChain, type ChainLine } from "@/lib/core/custody";
import { describe } from "@/lib/core/custody-actions";
import { keyOrder } from "@/lib/core/keyring";
import { type Actor, type Stage, WORKSHOP_CHAIN } from "@/lib/core/words";
import { driveFor } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import type { CustodyCheckView, CustodyEntryView, PersonView } from "@/lib/views";
import { connection, CustodyEntry, CustodyHead, type Transaction } from "@/models";
import { logKey, verifySignature } from "@/storage";
import { keyring } from "./keyring";
import { seenBy } from "./seen-by";

interface Body {
  at: string;
  actor: PersonView;
  action: string;
  subject: { type: string; id: string };
  facts: { read?: { stage: Stage; number: number }; chip?: { designator: string }; donorChip?: { designator: string }; [key: string]: unknown };
}

/** The entries of a chain in order; bodies verbatim. A body that no longer parses is shown as it is. */
export async function chainEntries(chain: string, tx?: Transaction): Promise<CustodyEntryView[]> {
  const rows = await CustodyEntry.findAll({ where: { chainId: chain }, order: ["seq"], transaction: tx });
  return rows.map((row) => {
    const body = row.body.toString("utf8");
    const common = { seq: row.seq, hash: row.hash.toString("hex"), body, signature: row.signature.toString("base64"), keyId: row.keyId };
    try {
      const parsed = JSON.parse(body) as Body;
      return { ...common, at: parsed.at, actor: parsed.actor, action: parsed.action, where: placeOf(parsed), ...describe(parsed.action, parsed.facts) };
    } catch {
      return { ...common, at: "", actor: { id: "", name: "unknown", role: "system" as const }, action: row.action, sentence: "This entry can't be read: its body is damaged.", where: "", kind: "differs" as const };
    }
  });
}

function placeOf({ facts, subject }: Body): string {
  if (facts.chip) {
    const side = facts.read ? (facts.read.stage === "before" ? "Orig" : "Donor") : "";
    return `${side} ${facts.chip.designator}`.trim();
  }
  return subject.type.charAt(0).toUpperCase() + subject.type.slice(1);
}

/** PEM of every key that the log may be signed with, by its id. */
export async function logKeys(tx?: Transaction): Promise<Map<string, string>> {
  const rows = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "key.introduced" }, order: ["seq"], transaction: tx });
  return keyring(rows, logKey().publicKeyPem).keys;
}

/** A row of the log as its check takes it. */
export function chainLine(row: CustodyEntry): ChainLine {
  return {
    body: row.body, hash: row.hash.toString("hex"), signature: row.signature.toString("base64"), keyId: row.keyId,
    beside: { seq: row.seq, prev: row.prev.toString("hex"), action: row.action },
  };
}

/**
 * Checks one chain: links, numbers, hashes, signatures, head. It reports and never repairs. Without `tx` entries and head
 * come from one look at the database: an entry appended in between must not look like a head without its entry.
 */
export async function checkCustody(chain: string, tx?: Transaction): Promise<CustodyCheckView & { findings: ChainFinding[] }> {
  if (!tx) return connection().transaction({ isolationLevel: Isolation.ISOLATION_LEVELS.REPEATABLE_READ }, (look) => checkCustody(chain, look));
  const rows = await CustodyEntry.findAll({ where: { chainId: chain }, order: ["seq"], transaction: tx });
  const head = await CustodyHead.findByPk(chain, { transaction: tx });
  const keys = await logKeys(tx);
  const findings = await checkChain(
    rows.map(chainLine),
    head && { seq: head.seq, hash: head.hash.toString("hex") },
    {
      sha256: (bytes) => createHash("sha256").update(bytes).digest("hex"),
      verify: (keyId, bytes, signature) => {
        const pem = keys.get(keyId);
        return pem !== undefined && verifySignature(pem, bytes, signature);
      },
      knows: (keyId) => keys.has(keyId),
      order: keyOrder({ keys }),
    },
    chain,
  );
  return { ok: findings.length === 0, entries: rows.length, head: { seq: head?.seq ?? 0, hash: head?.hash.toString("hex") ?? "0".repeat(64) }, findings };
}

export async function custodyOfDrive(actor: Actor, driveId: string): Promise<{ entries: CustodyEntryView[] }> {
  allow(actor, "custody.read");
  await driveFor(actor, driveId);
  return { entries: await seenBy(actor, await chainEntries(driveId)) };
}

export async function custodyCheckOfDrive(actor: Actor, driveId: string): Promise<CustodyCheckView> {
  allow(actor, "custody.read");
  await driveFor(actor, driveId);
  return checkCustody(driveId);
}

/** The chain of what belongs to no drive: accounts, policy, keys. */
export async function workshopLog(actor: Actor): Promise<{ entries: CustodyEntryView[] }> {
  allow(actor, "workshop-log.read");
  return { entries: await chainEntries(WORKSHOP_CHAIN) };
}

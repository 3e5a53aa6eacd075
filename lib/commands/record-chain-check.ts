import { QueryTypes } from "sequelize";
import { chainFindingSentence } from "@/lib/core/chain-words";
import type { ChainFinding } from "@/lib/core/custody";
import { seatingLetter, WORKSHOP_CHAIN } from "@/lib/core/words";
import { env } from "@/lib/env";
import { Case, ChainCheck, connection, Drive, inTransaction, type Transaction } from "@/models";
import { queueAlarm } from "./queue-alarm";

const LONGEST = 500;

export interface ChainChecked {
  entries: number;
  findings: readonly Pick<ChainFinding, "seq" | "problem">[];
}

/**
 * Writes down when a chain was last checked as a whole and what was found. The step from clean to not clean is mailed to
 * leads, admins and auditors, once, in the same transaction; that a chain is clean again, or never was, needs no mail.
 */
export async function recordChainCheck(chainId: string, { entries, findings }: ChainChecked): Promise<void> {
  const first = findings[0] ? chainFindingSentence(findings[0]).slice(0, LONGEST) : null;
  await inTransaction(async (tx) => {
    // the row is there before it is locked: two first checks at once must not both tell
    await connection().query("INSERT IGNORE INTO chain_checks (chain_id, checked_at, entries, findings) VALUES (?, UTC_TIMESTAMP(6), 0, 0)", { replacements: [chainId], transaction: tx });
    const [before] = await connection().query<{ findings: number }>("SELECT findings FROM chain_checks WHERE chain_id = ? FOR UPDATE", {
      replacements: [chainId], transaction: tx, type: QueryTypes.SELECT,
    });
    await connection().query(
      "UPDATE chain_checks SET checked_at = UTC_TIMESTAMP(6), entries = ?, findings = ?, first_finding = ? WHERE chain_id = ?",
      { replacements: [entries, findings.length, first, chainId], transaction: tx },
    );
    if (findings.length > 0 && before.findings === 0) await tell(tx, chainId, findings.length, first!);
  }, { receipt: false });
}

/** When it was checked last, and what was found; null when it never was. */
export async function lastChainCheck(chainId: string): Promise<ChainCheck | null> {
  return ChainCheck.findByPk(chainId);
}

async function tell(tx: Transaction, chainId: string, findings: number, first: string): Promise<void> {
  const drive = chainId === WORKSHOP_CHAIN ? null : await Drive.findByPk(chainId, { transaction: tx });
  const found = drive && (await Case.findByPk(drive.caseId, { transaction: tx }));
  const name = chainId === WORKSHOP_CHAIN ? "the workshop" : drive && found ? `case ${found.ref}, Drive ${seatingLetter(drive.position)}` : `no known drive (${chainId})`;
  const page = drive ? [`${env().publicUrl}/drives/${drive.id}/custody`] : [];
  await queueAlarm(tx, {
    roles: ["lead", "admin", "auditor"], caseId: drive?.caseId ?? null, subject: `The custody log of ${name} doesn't check out`,
    text: [
      `Twinread checked the custody log of ${name} and found ${findings === 1 ? "one thing" : `${findings} things`} that should not be there.`, "", `First: ${first}`, "",
      ...(drive ? ["Approvals, hand-outs and transfers of this drive wait until an auditor has recorded an assessment. New entries are still written."] : []),
      "What to do: don't change or restore anything yet. Have an auditor look at the log, compare with a bundle, a seal or a mail that left the house, and record an assessment.", ...page,
    ].join("\n"),
  });
}

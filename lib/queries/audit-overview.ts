import type { AuditOverview, Latest } from "@/lib/core/audit-rows";
import { casesOf } from "@/lib/commands/refuse";
import type { EntryList } from "@/lib/core/audit";
import type { Actor } from "@/lib/core/words";
import { auditInput } from "@/lib/schemas/audit";
import { logsWaiting } from "./audit-assessments";
import { clockNow } from "./audit-clock";
import { chainCounts } from "./audit-drives";
import { auditEntries } from "./audit-entries";
import { imageCounts } from "./audit-images";
import { sealState } from "./audit-seals";
import { auditSessions } from "./audit-sign-ins";

async function latest(actor: Actor, list: EntryList): Promise<Latest> {
  const { items, total } = await auditEntries(actor, list, auditInput.parse({ pageSize: 1 }));
  return { at: items[0]?.at ?? "", sentence: items[0]?.sentence ?? "", total };
}

/** Is anything wrong, and where: one look at each subject of the audit pages. */
export async function auditOverview(actor: Actor): Promise<AuditOverview> {
  const limited = casesOf(actor) !== null;
  return {
    now: new Date().toISOString(), logs: await chainCounts(actor), waiting: await logsWaiting(actor), images: await imageCounts(actor), seals: await sealState(actor), clock: await clockNow(actor),
    handOuts: await latest(actor, "hand-outs"), refusals: await latest(actor, "refusals"), assessments: await latest(actor, "assessments"), clockEntries: await latest(actor, "clock"),
    limits: limited ? null : await latest(actor, "limits"),
    openSessions: limited ? null : (await auditSessions(actor, auditInput.parse({ what: "open", pageSize: 1 }))).total,
  };
}

import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { EntryList } from "@/components/audit/entry-list";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { actionWord, ENTRY_LISTS } from "@/lib/core/audit";
import { orNotFound } from "@/lib/http/page-errors";
import { auditEntries, auditPersons } from "@/lib/queries/audit-entries";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: refusals" };
const STEPS = ENTRY_LISTS["refusals"].map((value) => ({ value, label: actionWord(value) }));

export default async function AuditRefusalsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "time", order: "desc" });
  const list = await orNotFound(() => auditEntries(actor, "refusals", input));
  const who = await auditPersons(actor, "refusals");
  const empty = isFiltered(input)
    ? <Empty title="No entry fits this choice." action={<ButtonLink href="/audit/refusals">Show all</ButtonLink>}>Every word has to stand in the entry, or be its case number.</Empty>
    : <Empty title="No approval was refused, sent back or revoked.">A refusal by a rule is an entry too, with the rule.</Empty>;
  return (
    <AuditPage session={session} current="refusals" title="Refusals" note="Approvals that a rule refused, that a lead sent back, or that fell.">
      <Section title="Entries" note="From the logs of the drives, the newest first.">
        <AuditFilter list="refusals" path="/audit/refusals" input={input} total={list.total} words={{ label: "Words or case" }} what={{ label: "Step", options: STEPS }} who={who} days />
        <EntryList list={list} caption="Refusals" columns={["action", "what", "digest", "reason"]} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} heads={{ what: "Chip", digest: "Image", reason: "Rule or reason" }} />
      </Section>
    </AuditPage>
  );
}

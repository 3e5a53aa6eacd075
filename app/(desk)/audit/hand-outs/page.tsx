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

export const metadata: Metadata = { title: "Audit: hand-outs" };
const STEPS = ENTRY_LISTS["hand-outs"].map((value) => ({ value, label: actionWord(value) }));

export default async function AuditHandOutsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "time", order: "desc" });
  const list = await orNotFound(() => auditEntries(actor, "hand-outs", input));
  const who = await auditPersons(actor, "hand-outs");
  const empty = isFiltered(input)
    ? <Empty title="No entry fits this choice." action={<ButtonLink href="/audit/hand-outs">Show all</ButtonLink>}>Every word has to stand in the entry, or be its case number.</Empty>
    : <Empty title="Nothing has left the house yet.">Each image, bundle and summary that leaves is an entry before its first byte does.</Empty>;
  return (
    <AuditPage session={session} current="hand-outs" title="Hand-outs" note="What left the house, to whom and why: images, case bundles, summaries.">
      <Section title="Entries" note="From the logs of the drives, the newest first.">
        <AuditFilter list="hand-outs" path="/audit/hand-outs" input={input} total={list.total} words={{ label: "Words or case" }} what={{ label: "Step", options: STEPS }} who={who} days />
        <EntryList list={list} caption="Hand-outs" columns={["action", "what", "digest", "to", "reason"]} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

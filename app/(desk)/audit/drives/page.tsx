import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { ChainList } from "@/components/audit/chain-list";
import { CheckAll } from "@/components/audit/check-all";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { auditDrives, chainCounts } from "@/lib/queries/audit-drives";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: logs" };
const STATES = [{ value: "findings", label: "With findings" }, { value: "clean", label: "Clean" }, { value: "unchecked", label: "Never checked" }];

export default async function AuditDrivesPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "findings", order: "desc" });
  const list = await orNotFound(() => auditDrives(actor, input));
  const counts = await chainCounts(actor);
  const empty = isFiltered(input)
    ? <Empty title="No log fits this choice." action={<ButtonLink href="/audit/drives">Show all logs</ButtonLink>}>There {counts.total === 1 ? "is one log" : `are ${counts.total} logs`} in all.</Empty>
    : <Empty title="No log yet.">A log begins when the first drive of a case is recorded.</Empty>;
  return (
    <AuditPage session={session} current="drives" title="Logs" note="One chain for each drive, and one for the workshop. Each is checked as a whole every night, and whenever you ask.">
      <Section title="Check" note="Computes every hash again, checks every signature, compares the head."><CheckAll total={counts.total} /></Section>
      <Section title="All logs" note="Those with findings first.">
        <AuditFilter list="drives" path="/audit/drives" input={input} total={list.total} words={{ label: "Search", placeholder: "Case number, part, serial" }} what={{ label: "Last check", options: STATES }} />
        <ChainList list={list} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

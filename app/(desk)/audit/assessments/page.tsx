import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { EntryList } from "@/components/audit/entry-list";
import { WaitingLogs } from "@/components/audit/waiting-logs";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { FindingLine } from "@/components/ui/finding-line";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { auditAssessments, logsWaiting } from "@/lib/queries/audit-assessments";
import { auditPersons } from "@/lib/queries/audit-entries";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: assessments" };

export default async function AuditAssessmentsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "time", order: "desc" });
  const list = await orNotFound(() => auditAssessments(actor, input));
  const waiting = await logsWaiting(actor);
  const who = await auditPersons(actor, "assessments");
  const empty = isFiltered(input)
    ? <Empty title="No assessment fits this choice." action={<ButtonLink href="/audit/assessments">Show all assessments</ButtonLink>} />
    : <Empty title="No log was assessed yet.">Where a log doesn’t check out, an auditor says what to think of it; work on the drive opens again after that.</Empty>;
  return (
    <AuditPage session={session} current="assessments" title="Assessments" note="What auditors concluded about logs that don’t check out. An assessment covers what lies before it, never itself.">
      <Section strong title="Waiting" note="As of each log’s last check.">
        {waiting.length > 0 ? <WaitingLogs logs={waiting} timeZone={session.timeZone} assesses={may(actor, "assessment.record")} /> : <FindingLine kind="ok">No log waits for an assessment.</FindingLine>}
      </Section>
      <Section title="On record" note="The newest first.">
        <AuditFilter list="assessments" path="/audit/assessments" input={input} total={list.total} words={{ label: "Words or case" }} who={who} days />
        <EntryList list={list} caption="Assessments" columns={["reason", "covered"]} heads={{ reason: "Assessment" }} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { clockMark, clockSentence, lengthText } from "@/components/audit/audit-words";
import { EntryList } from "@/components/audit/entry-list";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Section } from "@/components/ui/section";
import { exactText } from "@/components/ui/times";
import { Verdict } from "@/components/ui/verdict";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { clockNow } from "@/lib/queries/audit-clock";
import { auditEntries } from "@/lib/queries/audit-entries";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: clock" };

export default async function AuditClockPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "time", order: "desc" });
  const list = await orNotFound(() => auditEntries(actor, "clock", input));
  const clock = await clockNow(actor);
  const empty = isFiltered(input)
    ? <Empty title="No entry fits this choice." action={<ButtonLink href="/audit/clock">Show all</ButtonLink>} />
    : <Empty title="No entry was written against the clock.">If the database’s clock goes back, the entry keeps the time of the one before and says by how much.</Empty>;
  return (
    <AuditPage session={session} current="clock" title="Clock" note="Times in the logs are the database’s. The order of truth is the entry’s number, never its time.">
      <Section strong title="Right now" note={exactText(clock.measuredAt, session.timeZone)}>
        <Verdict mark={clockMark(clock)} sentence={clockSentence(clock)} why={`Measured just now, the database against the app: ${lengthText(Math.abs(clock.offsetMs))}${Math.abs(clock.offsetMs) < 0.5 ? "" : clock.offsetMs < 0 ? " behind" : " ahead"}, known to within ${lengthText(Math.max(1, clock.withinMs))}, the way there and back taken off.`} />
      </Section>
      <Section title="Turned back" note="Entries written while the clock, or the log’s head, had been turned back.">
        <AuditFilter list="clock" path="/audit/clock" input={input} total={list.total} words={{ label: "Words or case" }} days />
        <EntryList list={list} caption="Entries written while the clock or the head had been turned back" columns={["what", "clock"]} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

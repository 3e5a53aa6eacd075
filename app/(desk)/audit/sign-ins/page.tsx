import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { SessionList } from "@/components/audit/session-list";
import { SignInLists } from "@/components/audit/sign-in-lists";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { auditSessions } from "@/lib/queries/audit-sign-ins";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: sign-ins" };
const STATES = [{ value: "open", label: "Not ended" }, { value: "ended", label: "Ended" }];

export default async function AuditSignInsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "from", order: "desc" });
  const list = await orNotFound(() => auditSessions(actor, input));
  const empty = isFiltered(input) ? <Empty title="No session fits this choice." action={<ButtonLink href="/audit/sign-ins">Show all sessions</ButtonLink>} /> : <Empty title="Nobody has signed in yet." />;
  return (
    <AuditPage session={session} current="sign-ins" title="Sign-ins" note="Who was signed in, from when to when. Passwords and tokens are kept as hashes and shown to nobody.">
      <Section title="Sessions" note="Opened with a right password, the latest first.">
        <SignInLists current="sessions" />
        <AuditFilter list="sessions" path="/audit/sign-ins" input={input} total={list.total} words={{ label: "Name" }} what={{ label: "State", options: STATES }} days />
        <SessionList list={list} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

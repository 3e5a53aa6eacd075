import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { EntryList } from "@/components/audit/entry-list";
import { SignInLists } from "@/components/audit/sign-in-lists";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { auditEntries } from "@/lib/queries/audit-entries";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: refused sign-ins" };

export default async function AuditLimitsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "time", order: "desc" });
  const list = await orNotFound(() => auditEntries(actor, "limits", input));
  const empty = isFiltered(input) ? <Empty title="No entry fits this choice." action={<ButtonLink href="/audit/sign-ins/limits">Show all</ButtonLink>} /> : <Empty title="No sign-in was ever refused for too many tries.">The first try past a limit is an entry; those after it leave no trace of their own.</Empty>;
  return (
    <AuditPage session={session} current="sign-ins" title="Sign-ins" note="Where somebody tried too many passwords. The account is kept as a digest, because people mistype passwords into that field.">
      <Section title="Refused for too many tries" note="From the workshop's log, the newest first.">
        <SignInLists current="limits" />
        <AuditFilter list="limits" path="/audit/sign-ins/limits" input={input} total={list.total} words={{ label: "Address" }} days />
        <EntryList list={list} caption="Sign-ins refused for too many tries" columns={["what", "digest"]} heads={{ what: "From", digest: "Account, as SHA-256" }} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

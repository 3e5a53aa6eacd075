import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { TokenList } from "@/components/audit/session-list";
import { SignInLists } from "@/components/audit/sign-in-lists";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { auditTokens } from "@/lib/queries/audit-sign-ins";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: bench tokens" };
const STATES = [{ value: "open", label: "In use" }, { value: "withdrawn", label: "Withdrawn" }];

export default async function AuditTokensPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "made", order: "desc" });
  const list = await orNotFound(() => auditTokens(actor, input));
  const empty = isFiltered(input) ? <Empty title="No token fits this choice." action={<ButtonLink href="/audit/sign-ins/tokens">Show all tokens</ButtonLink>} /> : <Empty title="No bench token was made yet.">A technician makes one for a bench station, on the account page.</Empty>;
  return (
    <AuditPage session={session} current="sign-ins" title="Sign-ins" note="Bench stations sign in with tokens: made, last used and withdrawn when.">
      <Section title="Bench tokens" note="By name; the token itself is kept as a hash.">
        <SignInLists current="tokens" />
        <AuditFilter list="tokens" path="/audit/sign-ins/tokens" input={input} total={list.total} words={{ label: "Token or name" }} what={{ label: "State", options: STATES }} days />
        <TokenList list={list} sort={input.sort} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

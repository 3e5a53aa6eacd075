import type { Metadata } from "next";
import { AuditFilter, isFiltered } from "@/components/audit/audit-filter";
import { AuditPage } from "@/components/audit/audit-page";
import { sealsSentence } from "@/components/audit/audit-words";
import { KeyList } from "@/components/audit/key-list";
import { MakeSeal } from "@/components/audit/make-seal";
import { CAUSE } from "@/components/audit/seal-words";
import { SealList } from "@/components/audit/seal-list";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { FindingLine } from "@/components/ui/finding-line";
import { Section } from "@/components/ui/section";
import { exactText } from "@/components/ui/times";
import { Verdict } from "@/components/ui/verdict";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { auditSeals, sealState } from "@/lib/queries/audit-seals";
import { keyList } from "@/lib/queries/keys";
import { witnessState } from "@/lib/queries/witness";
import { auditInputOf } from "@/lib/schemas/audit";

export const metadata: Metadata = { title: "Audit: seals" };
const CAUSES = Object.entries(CAUSE).map(([value, label]) => ({ value, label }));

export default async function AuditSealsPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const input = auditInputOf(await searchParams, { sort: "number", order: "desc" });
  const list = await orNotFound(() => auditSeals(actor, input));
  const state = await sealState(actor);
  const { keys } = await keyList(actor);
  // where the file lies is the workshop's own business
  const witness = actor.cases ? null : await witnessState();
  const { mark, sentence } = sealsSentence(state);
  const empty = isFiltered(input)
    ? <Empty title="No seal fits this choice." action={<ButtonLink href="/audit/seals">Show all seals</ButtonLink>} />
    : <Empty title="No seal was made yet.">One is made every day, before each bundle and summary, and when you ask.</Empty>;
  return (
    <AuditPage session={session} current="seals" title="Seals" note="A seal states where every log stood at a moment. Each names the one before, is signed and leaves the house by mail.">
      <Section strong title="Chain of seals" note={state.newest ? `Newest: ${exactText(state.newest.at, session.timeZone)}` : undefined}>
        <Verdict mark={mark} sentence={sentence} why="Compare the newest number and its SHA-256 with the mail you keep: what was cut or turned back here shows only there." buttons={may(actor, "seal.make") ? <MakeSeal /> : null} />
      </Section>
      <Section title="Keys" note="Compare each fingerprint with a mail or a bundle that you got earlier.">
        <KeyList keys={keys} timeZone={session.timeZone} changes={may(actor, "key.change")} history={!actor.cases} />
      </Section>
      {witness ? (
        <Section title="Witness file" note="A copy of each seal outside the database.">
          <FindingLine kind={witness.trouble ? "caution" : witness.last === null ? "wait" : "ok"}>{witness.trouble ?? (witness.last === null ? "It holds no seal yet." : `It holds every seal up to ${witness.last}.`)}</FindingLine>
          <p className="mt-1 text-t2 text-ink-2 [overflow-wrap:anywhere]"><code>{witness.path}</code></p>
        </Section>
      ) : null}
      <Section title="All seals" note="The newest first.">
        <AuditFilter list="seals" path="/audit/seals" input={input} total={list.total} words={null} what={{ label: "Why", options: CAUSES }} />
        <SealList list={list} order={input.order} timeZone={session.timeZone} empty={empty} />
      </Section>
    </AuditPage>
  );
}

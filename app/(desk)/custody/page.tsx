import type { Metadata } from "next";
import { HeadList } from "@/components/custody/head-list";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { PageTitle, Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { custodyHeads } from "@/lib/queries/custody-heads";
import { listInput } from "@/lib/schemas/case";

export const metadata: Metadata = { title: "Custody log" };

export default async function CustodyPage({ searchParams }: { searchParams: Promise<{ page?: string }> }) {
  const { actor, session } = await signedIn();
  const input = listInput.safeParse({ page: (await searchParams).page });
  const list = await custodyHeads(actor, { page: input.data?.page ?? 1, pageSize: 25 });
  return (
    <DeskShell session={session} current="custody">
      <PageMain>
        <PageTitle note="Every step at the bench is an entry; each carries the hash of the one before and a signature.">Custody log</PageTitle>
        <Section title="Drives" note="One chain for each drive.">
          {list.total > 0 ? <HeadList list={list} timeZone={session.timeZone} /> : <Empty title="No drive yet.">A log begins when the first drive of a case is recorded.</Empty>}
        </Section>
        <Section title="Items" note="Drives, boards and lifted chips, from person to person and place to place.">
          <ButtonLink href="/items">Where things are</ButtonLink>
        </Section>
        {may(actor, "workshop-log.read") ? (
          <Section title="Workshop" note="What belongs to no drive: cases received, accounts, tokens, policy, keys.">
            <ButtonLink href="/custody/workshop">Open the log of the workshop</ButtonLink>
          </Section>
        ) : null}
      </PageMain>
    </DeskShell>
  );
}

import type { Metadata } from "next";
import { Assess } from "@/components/custody/assessment-form";
import { ChainCheck } from "@/components/custody/chain-check";
import { LogTable } from "@/components/custody/log-table";
import { PrintButton } from "@/components/custody/print-button";
import { ViaLegend } from "@/components/custody/via-legend";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle, Section } from "@/components/ui/section";
import { exactText } from "@/components/ui/times";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { orNotFound } from "@/lib/http/page-errors";
import { checkCustody, workshopLog } from "@/lib/queries/custody";

export const metadata: Metadata = { title: "Custody log of the workshop" };

export default async function WorkshopLogPage() {
  const { actor, session } = await signedIn();
  const { entries } = await orNotFound(() => workshopLog(actor));
  const check = await checkCustody(WORKSHOP_CHAIN);
  const against = check.findings.flatMap((f) => (f.seq === null ? [] : [f.seq]));
  return (
    <DeskShell session={session} current="custody">
      <PageMain>
        <Crumbs items={[{ label: "Custody log", href: "/custody" }, { label: "Workshop" }]} />
        <div className="flex flex-wrap items-end justify-between gap-4">
          <PageTitle note="What belongs to no drive: cases received, accounts, tokens, policy, keys.">Custody log of the workshop</PageTitle>
          <div className="no-print pb-5"><PrintButton /></div>
        </div>
        <Section strong title="Chain check" note={exactText(new Date().toISOString(), session.timeZone)}>
          <ChainCheck check={check} subject="workshop" />
          {check.ok ? null : <Assess chainId={WORKSHOP_CHAIN} latest={entries.at(-1)?.action} assesses={may(actor, "assessment.record")} />}
        </Section>
        <Section title="Entries" aside={<ViaLegend />}><LogTable entries={entries} timeZone={session.timeZone} against={against} /></Section>
      </PageMain>
    </DeskShell>
  );
}

import type { Metadata } from "next";
import { CaseList } from "@/components/case/case-list";
import { CaseSearch } from "@/components/case/case-search";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { ButtonLink } from "@/components/ui/button";
import { PageTitle } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { caseList } from "@/lib/queries/cases";
import { dayIn } from "@/lib/queries/workshop-day";
import { caseListInput } from "@/lib/schemas/case";

export const metadata: Metadata = { title: "Cases" };

export default async function CasesPage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  // an address that makes no sense shows the list from its beginning
  const parsed = caseListInput.safeParse({ sort: "received", order: "desc", ...(await searchParams) });
  const input = parsed.success ? parsed.data : caseListInput.parse({ sort: "received", order: "desc" });
  const list = await caseList(actor, input);
  const records = may(actor, "case.create");
  return (
    <DeskShell session={session} current="cases">
      <PageMain className="pb-8">
        <div className="flex flex-wrap items-end justify-between gap-4">
          <PageTitle>Cases</PageTitle>
          {records ? <div className="no-print pb-5"><ButtonLink variant="lead" href="/cases/new">Record a case</ButtonLink></div> : null}
        </div>
        <CaseSearch q={input.q} sort={input.sort} order={input.order} state={input.state} />
        <CaseList list={list} sort={input.sort} order={input.order} q={input.q} state={input.state} timeZone={session.timeZone} today={dayIn(session.timeZone, new Date())} records={records} />
      </PageMain>
    </DeskShell>
  );
}

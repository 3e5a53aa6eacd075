import type { Metadata } from "next";
import { PrintList } from "@/components/print/print-list";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { caseView } from "@/lib/queries/cases";

export const metadata: Metadata = { title: "Print" };

export default async function PrintPage({ params }: { params: Promise<{ id: string }> }) {
  const { actor, session } = await signedIn();
  const { id } = await params;
  const view = await orNotFound(() => caseView(actor, id));
  return (
    <DeskShell session={session} current="cases">
      <PageMain className="pb-8">
        <Crumbs items={[{ label: "Cases", href: "/cases" }, { label: view.ref, href: `/cases/${id}` }, { label: "Print" }]} />
        <PageTitle note="Each thing has its own paper. The square code on it holds the case number and its check character, nothing else.">Print for case {view.ref}</PageTitle>
        <PrintList view={view} />
      </PageMain>
    </DeskShell>
  );
}

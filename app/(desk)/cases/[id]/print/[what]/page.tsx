import type { Metadata } from "next";
import { notFound } from "next/navigation";
import type { ReactNode } from "react";
import { ErasureCertificate } from "@/components/print/erasure-certificate";
import { JobTicket } from "@/components/print/job-ticket";
import { LabelSheet } from "@/components/print/label-sheet";
import { PrintBar } from "@/components/print/print-bar";
import { PRINTED_WORDS, printAddress } from "@/components/print/print-words";
import { ReadSheet } from "@/components/print/read-sheet";
import { ReceiptSheet } from "@/components/print/receipt-sheet";
import { ReturnSlip } from "@/components/print/return-slip";
import { PaperRule } from "@/components/print/sheet";
import { WriteTicket } from "@/components/print/write-ticket";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { ButtonLink } from "@/components/ui/button";
import { Crumbs } from "@/components/ui/crumbs";
import { Empty } from "@/components/ui/empty";
import { Note } from "@/components/ui/note";
import { PaperName as NameOnPaper } from "@/components/ui/paper-name";
import { signedIn } from "@/lib/auth/page";
import { LABEL_SIZES, type PaperName, PAPERS, PRINTED, type Printed, WRITE_TICKET_SIZES } from "@/lib/core/paper";
import type { Actor } from "@/lib/core/words";
import { orNotFound } from "@/lib/http/page-errors";
import { erasureView } from "@/lib/queries/erasure";
import { printCase } from "@/lib/queries/print-case";
import { printLabels } from "@/lib/queries/print-labels";
import { printReadSheets } from "@/lib/queries/print-read-sheets";
import { printWriteTicket, ticketRefusal } from "@/lib/queries/print-write-ticket";
import type { PrintCaseView } from "@/lib/views";

export const metadata: Metadata = { title: "Print" };

interface Asked {
  of?: string;
  size?: string;
}
interface Made {
  paper: PaperName;
  sizes?: readonly PaperName[];
  flows?: boolean;
  sheets: ReactNode[];
  none?: ReactNode;
  caution?: ReactNode;
}

const oneOf = <T extends string>(list: readonly T[], asked?: string): T => list.find((one) => one === asked) ?? list[0];

async function make(actor: Actor, what: Printed, view: PrintCaseView, asked: Asked): Promise<Made> {
  const { workshop, policy, timeZone } = view;
  switch (what) {
    case "labels": {
      const size = oneOf(LABEL_SIZES, asked.size);
      const labels = await printLabels(actor, view.case.id, asked.of);
      return { paper: size, sizes: LABEL_SIZES, sheets: labels.map((label) => <LabelSheet key={label.key} label={label} size={size} />), none: "No drive is recorded yet. Record it on the case’s page; then it gets its label." };
    }
    case "read-sheet": {
      const sheets = await printReadSheets(actor, view.case.id, asked.of);
      return { paper: "a4", sheets: sheets.map((sheet) => <ReadSheet key={sheet.key} sheet={sheet} workshop={workshop} policy={policy} timeZone={timeZone} />), none: "No chip is recorded yet. Record it on its board; then it gets its sheet." };
    }
    case "write-ticket": {
      const size = oneOf(WRITE_TICKET_SIZES, asked.size);
      const refusal = await ticketRefusal(actor, view.case.id, asked.of);
      if (refusal) return { paper: size, sheets: [], none: refusal };
      const ticket = await printWriteTicket(actor, view.case.id, asked.of!);
      const caution = ticket.revoked ? "The approval of this image was revoked. The ticket is marked void: nothing may be written from it." : undefined;
      return { paper: size, sizes: WRITE_TICKET_SIZES, sheets: [<WriteTicket key="ticket" ticket={ticket} size={size} workshop={workshop} timeZone={timeZone} />], caution };
    }
    case "job-ticket":
      return { paper: "a5", flows: true, sheets: [<JobTicket key="ticket" view={view} />] };
    case "return-slip":
      return { paper: "a4", flows: true, sheets: [<ReturnSlip key="slip" view={view} />] };
    case "erasure": {
      const erasure = await erasureView(actor, view.case.id);
      return { paper: "a4", flows: true, sheets: (erasure?.erasures ?? []).map((one) => <ErasureCertificate key={one.id} view={view} erasure={one} />), none: "Nothing of this case was erased yet. A lead or an admin erases the images of a closed case on its page, from its day on or when the customer asks." };
    }
    case "receipt":
      return { paper: "a5", flows: true, sheets: [<ReceiptSheet key="receipt" view={view} />] };
  }
}

export default async function PrintedPage({ params, searchParams }: { params: Promise<{ id: string; what: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const { id, what: asked } = await params;
  const query = await searchParams;
  const text = (value: string | string[] | undefined) => (typeof value === "string" ? value : undefined);
  const what = PRINTED.find((one) => one === asked);
  if (!what) notFound();
  const view = await orNotFound(() => printCase(actor, id));
  const of = text(query.of);
  const made = await orNotFound(() => make(actor, what, view, { of, size: text(query.size) }));
  const { title, note } = PRINTED_WORDS[what];
  const { width, height } = PAPERS[made.paper];
  return (
    <DeskShell session={session} current="cases">
      {made.sheets.length > 0 ? <PaperRule paper={made.paper} flows={made.flows} /> : null}
      <PageMain className="pb-8">
        <div className="no-print">
          <Crumbs items={[{ label: "Cases", href: "/cases" }, { label: view.case.ref, href: `/cases/${id}` }, { label: "Print", href: `/cases/${id}/print` }, { label: title }]} />
          <NameOnPaper what={`${title} of case ${view.case.refChecked}`} />
          <h1 className="pt-4 pb-3 text-t5 font-bold">{title} of case {view.case.ref}</h1>
        </div>
        {made.caution ? <div className="no-print pb-3"><Note kind="block" title={made.caution} /></div> : null}
        {made.sheets.length > 0 ? (
          <>
            <PrintBar hint={`${width} × ${height} mm. ${note}.`} choices={made.sizes?.map((size) => ({ label: PAPERS[size].name, href: printAddress(id, what, of, size), chosen: size === made.paper }))} />
            <div className="sheets" role="group" aria-label="What is printed" tabIndex={0}>{made.sheets}</div>
          </>
        ) : <Empty title="Nothing to print yet." action={<ButtonLink href={what === "write-ticket" && of ? `/chips/${of}` : `/cases/${id}`}>{what === "write-ticket" && of ? "Open the chip" : "Open the case"}</ButtonLink>}>{made.none}</Empty>}
      </PageMain>
    </DeskShell>
  );
}

import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { Photos } from "@/components/photo/photos";
import { printAddress } from "@/components/print/print-words";
import { ReceiptFacts } from "@/components/receive/receipt-facts";
import { ReceiveForm } from "@/components/receive/receive-form";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { ButtonLink, Buttons } from "@/components/ui/button";
import { Crumbs } from "@/components/ui/crumbs";
import { Note } from "@/components/ui/note";
import { PageTitle, Section } from "@/components/ui/section";
import { momentText } from "@/components/ui/times";
import { signedIn } from "@/lib/auth/page";
import { recordDriveAddress } from "@/lib/core/drive-from-request";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { addsPhotos, photosOf } from "@/lib/queries/photos";
import { parcelView, receiptView } from "@/lib/queries/receipts";

export const metadata: Metadata = { title: "Receive" };

export default async function ReceiveCasePage({ params }: { params: Promise<{ id: string }> }) {
  const { actor, session } = await signedIn();
  if (!may(actor, "parcel.receive")) redirect("/bench");
  const { id } = await params;
  const parcel = await orNotFound(() => parcelView(actor, id));
  const receipt = await receiptView(actor, id);
  const { timeZone } = session;
  const photos = receipt ? await photosOf(actor, "case", id) : [];
  return (
    <DeskShell session={session} current="receive">
      <PageMain className="pb-8">
        <Crumbs items={[{ label: "Receive", href: "/receive" }, { label: parcel.caseRef }]} />
        <PageTitle note={`${parcel.customerName}. ${parcel.requestedAt ? `Asked on ${momentText(parcel.requestedAt, timeZone)}.` : "Recorded at the desk."}`}>
          {receipt ? "Parcel received, case " : "Parcel of case "}<span className="font-mono whitespace-nowrap">{parcel.refChecked}</span>
        </PageTitle>
        {receipt ? (
          <>
            <Section title="Next" note="The number first: nothing leaves this table without a label.">
              <Buttons>
                <ButtonLink variant="lead" href={recordDriveAddress(id, parcel.asked)}>Record the drive</ButtonLink>
                <ButtonLink href={printAddress(id, "receipt")}>Print the receipt</ButtonLink>
                <ButtonLink href={printAddress(id, "job-ticket")}>Print the job ticket</ButtonLink>
              </Buttons>
            </Section>
            <Section title="Photos" note="At least four: the label, the board’s top and bottom, the connector.">
              <Photos of={{ type: "case", id }} name={`case ${parcel.caseRef}`} photos={photos} adds={await addsPhotos(actor, "case", id)} timeZone={timeZone} />
            </Section>
            <Section title="As it came"><ReceiptFacts receipt={receipt} timeZone={timeZone} /></Section>
          </>
        ) : parcel.closed ? <Note kind="caution" title={`Case ${parcel.caseRef} is closed.`}>Have a lead reopen it first, or record a new case for what came.</Note> : (
          <>
            <Section title="What happened" note="In the customer’s words."><p className="max-w-[76ch] whitespace-pre-line">{parcel.damage}</p>{parcel.note ? <p className="mt-2 max-w-[76ch] whitespace-pre-line text-ink-2">{parcel.note}</p> : null}</Section>
            <Section title="The parcel" note="Look before you open it; choose only what you have seen."><ReceiveForm parcel={parcel} /></Section>
          </>
        )}
      </PageMain>
    </DeskShell>
  );
}

import type { Metadata } from "next";
import Link from "next/link";
import { redirect } from "next/navigation";
import type { ReactNode } from "react";
import { ScanBox } from "@/components/receive/scan-box";
import { ToReceiveTable } from "@/components/receive/to-receive-table";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { CopyButton } from "@/components/ui/copy-button";
import { Note } from "@/components/ui/note";
import { PageTitle, Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { readCaseRef } from "@/lib/core/case-number";
import { may } from "@/lib/core/policy";
import { mistyped, NOT_A_NUMBER } from "@/lib/core/receipt-words";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { caseByNumber, toReceive } from "@/lib/queries/receipts";

export const metadata: Metadata = { title: "Receive" };

/** What to say about a number; a case that waits for its parcel is opened at once. */
async function answer(actor: Actor, number: string): Promise<ReactNode> {
  const reading = readCaseRef(number);
  if (reading.kind === "no-ref") return <Note kind="caution" role="alert" title={NOT_A_NUMBER} />;
  if (reading.kind === "check-character-differs") return <Note kind="caution" role="alert" title={mistyped(reading.ref)} />;
  const found = await caseByNumber(actor, number);
  if (!found) {
    return (
      <Note kind="caution" role="alert" title={`There is no case ${reading.ref} here.`}>
        Compare the number with the slip. If it is right, the parcel is another workshop’s or the request never arrived: <Link href={`/cases/new?note=${encodeURIComponent(`The slip in the parcel says ${reading.ref}.`)}`}>record a case from the parcel</Link>; the number stays in its note.
      </Note>
    );
  }
  if (found.state === "requested") redirect(`/receive/${found.id}`);
  return found.state === "closed"
    ? <Note kind="caution" role="alert" title={`Case ${found.ref} is closed.`}>Have a lead reopen <Link href={`/cases/${found.id}`}>the case</Link>, or record a new one for what came.</Note>
    : <Note kind="note" role="status" title={`The parcel of case ${found.ref} is here already.`}><Link href={`/cases/${found.id}`}>Open the case</Link> or see <Link href={`/receive/${found.id}`}>its receipt</Link>. What came later goes into a note on the case.</Note>;
}

export default async function ReceivePage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  if (!may(actor, "parcel.receive")) redirect("/bench");
  const { number: asked } = await searchParams;
  const number = typeof asked === "string" ? asked.slice(0, 200) : "";
  const form = `${env().publicUrl}/request`;
  const trouble = number.trim() ? await answer(actor, number) : null;
  return (
    <DeskShell session={session} current="receive">
      <PageMain className="pb-8">
        <PageTitle note="Scan the slip in the parcel, or type its case number.">Receive a parcel</PageTitle>
        <Section title="Number on the slip" note="The part after the dot is a check character: it catches a mistyped number."><ScanBox key={number} number={number} trouble={trouble} /></Section>
        <Section title="Still to come" note="Asked for on the form."><ToReceiveTable rows={await toReceive(actor)} timeZone={session.timeZone} /></Section>
        <Section title="The form" note="Where customers ask for a transfer, without an account."><p className="flex flex-wrap items-center gap-x-2 gap-y-1">Put this address on your web site or into your mails: <Link href="/request" prefetch={false} className="font-mono">{form}</Link><CopyButton text={form} label="Copy the address of the form" done="Copied the address of the form." /></p></Section>
        <Section title="No slip, no number"><p><Link href="/cases/new">Record a case</Link> from what is in the parcel. Look for a name or an address first; a parcel without either is photographed, closed and kept.</p></Section>
      </PageMain>
    </DeskShell>
  );
}

import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { PublicShell } from "@/components/shell/public-shell";
import { PrintButton } from "@/components/summary/print-button";
import { SayOpened } from "@/components/summary/say-opened";
import { SummarySheet } from "@/components/summary/summary-sheet";
import { buttonClass } from "@/components/ui/button";
import { PaperName } from "@/components/ui/paper-name";
import { dayYearText } from "@/components/ui/times";
import { env } from "@/lib/env";
import { summaryByToken } from "@/lib/queries/summary";

// the address itself is the key: no search engine, and no other site learns of it
export const metadata: Metadata = { title: "Verification summary", robots: { index: false, follow: false, nocache: true }, referrer: "no-referrer" };

export default async function SummaryPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const summary = /^[A-Za-z0-9_-]{43}$/.test(token) ? await summaryByToken(token) : null;
  if (!summary) notFound();
  const { demo, timeZone, publicUrl } = env();
  return (
    <PublicShell workshop={summary.workshop} demo={demo} line={`Shown to anyone who holds this link, until ${dayYearText(summary.expiresAt, timeZone)}`}>
      <div role="region" aria-label="Printing" className="no-print mx-auto flex w-[794px] max-w-full flex-wrap items-center justify-between gap-x-4 gap-y-2 py-3.5 text-ink-2 phone:px-4">
        <p>Made to be printed or kept.</p>
        <span className="flex flex-wrap items-center gap-3"><a className={buttonClass({})} href={`/summary/${token}/pdf`} download>Download as PDF</a><PrintButton /></span>
      </div>
      <PaperName what={`Verification summary, case ${summary.caseRef}`} />
      <SummarySheet summary={summary} link={`${publicUrl}/summary/${token}`} timeZone={timeZone} />
      <SayOpened token={token} />
    </PublicShell>
  );
}

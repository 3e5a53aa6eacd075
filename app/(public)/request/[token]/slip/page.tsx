import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { PrintSlip } from "@/components/request/print-slip";
import { Slip } from "@/components/request/slip";
import { PublicShell } from "@/components/shell/public-shell";
import { ButtonLink, Buttons } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { env } from "@/lib/env";
import { requestSlip } from "@/lib/queries/requests";

export const metadata: Metadata = { title: "Slip for the parcel", robots: { index: false, follow: false, nocache: true }, referrer: "no-referrer" };

export default async function SlipPage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const view = await requestSlip(token);
  if (!view) notFound();
  return (
    <PublicShell workshop={view.workshop} demo={env().demo} line="Print this page and put it in the parcel">
      <div role="region" aria-label="Printing" className="no-print mx-auto flex w-[794px] max-w-full flex-wrap items-center justify-between gap-4 py-3.5 text-ink-2 phone:px-4">
        <p>One page. The lower part is the address label.</p>
        <Buttons><ButtonLink href={`/request/${token}`} prefetch={false}><Icon name="prev" />Back to your case</ButtonLink><PrintSlip /></Buttons>
      </div>
      <Slip view={view} />
    </PublicShell>
  );
}

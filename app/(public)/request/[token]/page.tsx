import type { Metadata } from "next";
import { notFound } from "next/navigation";
import { CustomerPage } from "@/components/request/customer-page";
import { PublicShell } from "@/components/shell/public-shell";
import { env } from "@/lib/env";
import { requestPage } from "@/lib/queries/requests";

// the address itself is the key: no search engine, and no other site learns of it
export const metadata: Metadata = { title: "Your case", robots: { index: false, follow: false, nocache: true }, referrer: "no-referrer" };

export default async function CustomerCasePage({ params }: { params: Promise<{ token: string }> }) {
  const { token } = await params;
  const view = await requestPage(token);
  if (!view) notFound();
  const { demo, timeZone } = env();
  return (
    <PublicShell workshop={view.workshop} demo={demo} line="Shown to anyone who holds this link">
      <CustomerPage view={view} token={token} timeZone={timeZone} />
    </PublicShell>
  );
}

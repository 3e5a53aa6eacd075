import type { Metadata } from "next";
import { BenchScreen } from "@/components/bench/bench-screen";
import { FirstSteps } from "@/components/bench/first-steps";
import { ErasuresWaiting } from "@/components/erasure/erasures-waiting";
import { DeskShell } from "@/components/shell/desk-shell";
import { FreshCache } from "@/components/ui/fresh-cache";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { benchRows } from "@/lib/queries/bench";
import { erasuresWaiting } from "@/lib/queries/erasure";
import { openFirstSteps } from "@/lib/queries/first-steps";
import { waitingFor } from "@/lib/queries/items";
import { toReceive } from "@/lib/queries/receipts";

export const metadata: Metadata = { title: "Bench" };

export default async function BenchPage({ searchParams }: { searchParams: Promise<{ who?: string }> }) {
  const { actor, session } = await signedIn();
  const { who } = await searchParams;
  const firstSteps = may(actor, "user.manage") ? <FirstSteps {...await openFirstSteps(actor)} /> : null;
  const erasures = <ErasuresWaiting waiting={await erasuresWaiting(actor)} timeZone={session.timeZone} />;
  return (
    <DeskShell session={session} current="bench">
      <FreshCache><BenchScreen rows={await benchRows(actor)} toReceive={await toReceive(actor)} waiting={(await waitingFor(actor)).items} firstSteps={<>{firstSteps}{erasures}</>} session={session} mine={who === "mine"} now={new Date().toISOString()} /></FreshCache>
    </DeskShell>
  );
}

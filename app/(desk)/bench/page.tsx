import type { Metadata } from "next";
import { BenchScreen } from "@/components/bench/bench-screen";
import { DeskShell } from "@/components/shell/desk-shell";
import { signedIn } from "@/lib/auth/page";
import { benchRows } from "@/lib/queries/bench";
import { waitingFor } from "@/lib/queries/items";
import { toReceive } from "@/lib/queries/receipts";

export const metadata: Metadata = { title: "Bench" };

export default async function BenchPage({ searchParams }: { searchParams: Promise<{ who?: string }> }) {
  const { actor, session } = await signedIn();
  const { who } = await searchParams;
  return (
    <DeskShell session={session} current="bench">
      <BenchScreen rows={await benchRows(actor)} toReceive={await toReceive(actor)} waiting={(await waitingFor(actor)).items} session={session} mine={who === "mine"} now={new Date().toISOString()} />
    </DeskShell>
  );
}

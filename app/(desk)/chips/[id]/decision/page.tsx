import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { DecisionHead } from "@/components/decision/decision-head";
import { DecisionScreen } from "@/components/decision/decision-screen";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { decisionView } from "@/lib/queries/decision";

export const metadata: Metadata = { title: "Decision sheet" };

export default async function DecisionPage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params;
  const { actor, session } = await signedIn();
  const view = await orNotFound(() => decisionView(actor, id));
  // a decision belongs to the original's chip
  if (view.chip.boardRole === "donor") redirect(view.chip.pair ? `/chips/${view.chip.pair.id}/decision` : `/chips/${id}`);
  return (
    <DeskShell session={session} current="bench">
      <PageMain>
        <DecisionHead view={view} timeZone={session.timeZone} />
        <DecisionScreen view={view} session={session} />
      </PageMain>
    </DeskShell>
  );
}

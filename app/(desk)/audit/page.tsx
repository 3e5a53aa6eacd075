import type { Metadata } from "next";
import { AuditPage } from "@/components/audit/audit-page";
import { Overview } from "@/components/audit/overview";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { auditOverview } from "@/lib/queries/audit-overview";

export const metadata: Metadata = { title: "Audit" };

export default async function AuditOverviewPage() {
  const { actor, session } = await signedIn();
  const facts = await orNotFound(() => auditOverview(actor));
  return (
    <AuditPage session={session} current={null} title="Audit" note="Is anything wrong, and where.">
      <Overview facts={facts} timeZone={session.timeZone} />
    </AuditPage>
  );
}

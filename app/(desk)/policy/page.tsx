import type { Metadata } from "next";
import { PolicyForm } from "@/components/policy/policy-form";
import { PolicyTable } from "@/components/policy/policy-table";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { PageTitle } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { policyView } from "@/lib/queries/policy";

export const metadata: Metadata = { title: "Policy" };

export default async function PolicyPage() {
  const { actor, session } = await signedIn();
  const policy = await orNotFound(() => policyView(actor));
  const changes = may(actor, "policy.change");
  return (
    <DeskShell session={session} current="policy">
      <PageMain className="pb-8">
        <PageTitle note={changes ? "The rules that hold for every chip of this workshop." : "The rules that hold for every chip of this workshop. An admin changes them."}>Policy</PageTitle>
        {changes ? <PolicyForm policy={policy} /> : <PolicyTable policy={policy} />}
      </PageMain>
    </DeskShell>
  );
}

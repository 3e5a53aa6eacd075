import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { CaseForm } from "@/components/case/case-form";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle, Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";

export const metadata: Metadata = { title: "Record a case" };

export default async function NewCasePage({ searchParams }: { searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  if (!may(actor, "case.create")) redirect("/cases");
  const { note } = await searchParams;
  return (
    <DeskShell session={session} current="cases">
      <PageMain>
        <Crumbs items={[{ label: "Cases", href: "/cases" }, { label: "Record a case" }]} />
        <PageTitle note="One number from request to return. The drive, its boards and chips come next.">Record a case</PageTitle>
        <Section title="Customer and damage"><CaseForm note={typeof note === "string" ? note.slice(0, 200) : ""} /></Section>
      </PageMain>
    </DeskShell>
  );
}

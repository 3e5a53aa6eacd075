import type { Metadata } from "next";
import { FindCases } from "@/components/find/find-cases";
import { FindFile } from "@/components/find/find-file";
import { FindForm } from "@/components/find/find-form";
import { FindHits } from "@/components/find/find-hits";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Empty } from "@/components/ui/empty";
import { PageTitle, Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { findText } from "@/lib/queries/find";

export const metadata: Metadata = { title: "Find" };

export default async function FindPage({ searchParams }: { searchParams: Promise<{ q?: string | string[] }> }) {
  const { q: asked } = await searchParams;
  const q = (Array.isArray(asked) ? asked[0] : asked ?? "").trim().slice(0, 200);
  const { actor, session } = await signedIn();
  const { cases, hits } = q ? await orNotFound(() => findText(actor, q)) : { cases: [], hits: [] };
  return (
    <DeskShell session={session} current="find">
      <PageMain>
        <PageTitle note="Learn which drive, chip and read something is. Nothing is stored by asking.">Find</PageTitle>
        <FindForm q={q} />
        <div className="pt-6">
          {q && cases.length === 0 && hits.length === 0 ? (
            <Section title="Found"><Empty title={`Nothing is known as “${q}”.`}>Check it against the label. A case number may carry its check character; a digest needs 8 digits or more.</Empty></Section>
          ) : null}
          {hits.length > 0 ? <Section title="Reads" note="Images with this digest, or whose digest begins so."><FindHits hits={hits} caption="Reads with this digest" /></Section> : null}
          {cases.length > 0 ? <Section title="Cases"><FindCases cases={cases} /></Section> : null}
          <Section title="A file" note="For a file found on a bench computer, or one that came back from somebody."><FindFile /></Section>
        </div>
      </PageMain>
    </DeskShell>
  );
}

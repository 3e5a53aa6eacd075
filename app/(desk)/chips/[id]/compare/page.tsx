import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { EncryptionNote } from "@/components/chip/encryption-note";
import { CompareHead } from "@/components/compare/compare-head";
import { CompareScreen } from "@/components/compare/compare-screen";
import { firstReads, parseAddress, stagesToCompare } from "@/components/compare/places";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { ButtonLink } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { Note } from "@/components/ui/note";
import { signedIn } from "@/lib/auth/page";
import { AppError } from "@/lib/errors";
import { orNotFound } from "@/lib/http/page-errors";
import { chipView } from "@/lib/queries/chip-view";
import { comparedReads } from "@/lib/queries/compare";
import { readBackComparison } from "@/lib/queries/read-back-view";
import { comparedInput } from "@/lib/schemas/read";
import type { ComparedReads } from "@/lib/views";

export const metadata: Metadata = { title: "Compare reads" };

type Query = Partial<Record<"reads" | "stage" | "at" | "a" | "b" | "c" | "back", string | string[]>>;
const one = (value: string | string[] | undefined) => (Array.isArray(value) ? value[0] : value);

export default async function ComparePage({ params, searchParams }: { params: Promise<{ id: string }>; searchParams: Promise<Query> }) {
  const [{ id }, query] = [await params, await searchParams];
  const { actor, session } = await signedIn();
  // the form for other reads has no script: its fields become the one that links use; a third that is there already is none
  const [a, b, c] = [one(query.a), one(query.b), one(query.c)];
  if (a && b) redirect(`/chips/${id}/compare?reads=${[a, b, ...(c && c !== a && c !== b && a !== b ? [c] : [])].map(encodeURIComponent).join(",")}&stage=${encodeURIComponent(one(query.stage) ?? "before")}`);
  const chip = await orNotFound(() => chipView(actor, id));
  const own = chip.reads.filter((r) => r.chipId === chip.id);
  const asked = comparedInput.safeParse({ reads: one(query.reads), stage: one(query.stage) });
  const wanted = comparedInput.shape.stage.safeParse(one(query.stage));
  const stage = asked.success ? asked.data.stage : one(query.stage) && wanted.success ? wanted.data : stagesToCompare(own)[0] ?? "before";
  const chosen = asked.success ? asked.data.reads : firstReads(own, stage);
  const back = /^\d{1,5}$/.test(one(query.back) ?? "") ? Number(one(query.back)) : null;
  const againstApproved = back === null ? null : await compare(() => readBackComparison(actor, chip, back));
  const found = againstApproved ?? (chosen ? await compare(() => comparedReads(actor, id, { reads: chosen, stage })) : null);
  const compared = found && "stack" in found ? found : null;
  const at = parseAddress(one(query.at) ?? "");
  return (
    <DeskShell session={session} current="bench">
      <PageMain>
        <CompareHead chip={chip} reads={own} compared={compared} stage={stage} chosen={againstApproved ? null : chosen} />
        <EncryptionNote encryption={chip.drive.encryption} className="mb-4" />
        {compared ? <CompareScreen key={compared.reads.map((r) => r.id).join()} compared={compared} reads={againstApproved ? compared.reads : own} start={at}
          csv={againstApproved || !chosen ? null : `/api/chips/${id}/comparison/differences?reads=${chosen.join(",")}&stage=${stage}`} /> : null}
        {found && "refusal" in found ? <Note kind="block" title="These reads can’t be compared.">{found.refusal}</Note> : null}
        {found ? null : <Empty title="Two reads are needed." action={<ButtonLink href={`/chips/${id}#add`}>Add a read</ButtonLink>}>As soon as {chip.designator} has two reads of one kind they can be compared here.</Empty>}
      </PageMain>
    </DeskShell>
  );
}

/** A damaged stored image is a finding to show, not a broken page. */
async function compare<T extends ComparedReads | null>(run: () => Promise<T>): Promise<T | { refusal: string }> {
  try {
    return await orNotFound(run);
  } catch (error) {
    if (error instanceof AppError && error.code === "rule-against") return { refusal: error.detail };
    throw error;
  }
}

import type { Metadata } from "next";
import { PhotoSheet } from "@/components/photo/photo-sheet";
import { titleOf } from "@/components/photo/photo-words";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { orNotFound } from "@/lib/http/page-errors";
import { photoPage } from "@/lib/queries/photos";

export const metadata: Metadata = { title: "Photo" };

/** One photo, large: a page of its own, so that it has an address and works by keyboard. */
export default async function PhotoPage({ params }: { params: Promise<{ id: string }> }) {
  const { actor, session } = await signedIn();
  const { id } = await params;
  const view = await orNotFound(() => photoPage(actor, id));
  return (
    <DeskShell session={session} current="cases">
      <PageMain>
        <Crumbs items={[...view.crumbs, { label: view.photo.kind === "photo" ? "Photo" : "Document" }]} />
        <PageTitle note={view.place}>{titleOf(view.photo)}</PageTitle>
        <PhotoSheet view={view} timeZone={session.timeZone} />
      </PageMain>
    </DeskShell>
  );
}

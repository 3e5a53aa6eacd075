import type { Metadata } from "next";
import { Photos } from "@/components/photo/photos";
import { SavedContents, ShelfChips, ShelfFacts, ShelfHistory, ShelfStateLine } from "@/components/shelf/board-facts";
import { ChangeBoard } from "@/components/shelf/change-board";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle, Section } from "@/components/ui/section";
import { dayYearText } from "@/components/ui/times";
import { signedIn } from "@/lib/auth/page";
import { boardName } from "@/lib/core/board-name";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { addsPhotos, photosOf } from "@/lib/queries/photos";
import { shelfBoard } from "@/lib/queries/shelf";

export const metadata: Metadata = { title: "Board of the donor shelf" };

export default async function ShelfBoardPage({ params }: { params: Promise<{ id: string }> }) {
  const { actor, session } = await signedIn();
  const { id } = await params;
  const board = await orNotFound(() => shelfBoard(actor, id));
  const [photos, adds] = await Promise.all([photosOf(actor, "shelf-board", id), addsPhotos(actor, "shelf-board", id)]);
  return (
    <DeskShell session={session} current="shelf">
      <PageMain>
        <Crumbs items={[{ label: "Donor shelf", href: "/shelf" }, { label: board.number }]} />
        <PageTitle note={`Recorded on ${dayYearText(board.createdAt, session.timeZone)} by ${board.createdBy}.`}><span className="font-mono">{board.number}</span>, {boardName(board)}</PageTitle>
        <Section title="Where it stands" first>
          <div className="grid gap-4">
            <ShelfStateLine board={board} timeZone={session.timeZone} />
            {may(actor, "shelf.change") && board.state !== "taken" ? <ChangeBoard board={board} /> : null}
          </div>
        </Section>
        <Section title="The board"><ShelfFacts board={board} /></Section>
        <Section title="Its chips"><ShelfChips board={board} /></Section>
        {board.taken ? <Section title="Saved content" note="What the donor’s chips held before they were written. It stays stored and can be found by its digest."><SavedContents saved={board.saved} timeZone={session.timeZone} /></Section> : null}
        <Section id="photos" title="Photos" note="They go along when the board is taken for a drive."><Photos of={{ type: "shelf-board", id }} name={board.number} photos={photos} adds={adds} timeZone={session.timeZone} /></Section>
        <Section title="History" note="From the log of the workshop; nothing is overwritten there."><ShelfHistory history={board.history} timeZone={session.timeZone} /></Section>
      </PageMain>
    </DeskShell>
  );
}

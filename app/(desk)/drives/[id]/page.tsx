import type { Metadata } from "next";
import { DriveBlock } from "@/components/case/drive-block";
import { LatestEntries } from "@/components/custody/latest-entries";
import { BoardTable } from "@/components/drive/board-table";
import { StartUpSection } from "@/components/closing/start-up-section";
import { originalOf } from "@/components/drive/drive-words";
import { PhotoGroups } from "@/components/photo/photos";
import { PrintMenu } from "@/components/print/print-menu";
import { drivePrints } from "@/components/print/print-words";
import { FittingBoards } from "@/components/shelf/fitting-boards";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { ItemsTable } from "@/components/item/items-table";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle, Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { custodyOfDrive } from "@/lib/queries/custody";
import { driveView } from "@/lib/queries/drives";
import { itemsOfDrive, receivers } from "@/lib/queries/items";
import { addsPhotos, photosOfDrive } from "@/lib/queries/photos";
import { policyView } from "@/lib/queries/policy";
import { boardsThatFit } from "@/lib/queries/shelf";
import { startUpsOfDrive } from "@/lib/queries/start-up";

export const metadata: Metadata = { title: "Drive" };

export default async function DrivePage({ params }: { params: Promise<{ id: string }> }) {
  const { actor, session } = await signedIn();
  const { id } = await params;
  const drive = await orNotFound(() => driveView(actor, id));
  const [policy, { entries }, { items }, others] = await Promise.all([policyView(actor), custodyOfDrive(actor, id), itemsOfDrive(actor, id), receivers()]);
  const [photos, addsPhoto] = await Promise.all([photosOfDrive(actor, id), addsPhotos(actor, "drive", id)]);
  const startUps = await startUpsOfDrive(actor, id);
  // nothing comes from the shelf where there is no chip to move
  const fitting = may(actor, "shelf.read") && !originalOf(drive)?.dataInController ? await boardsThatFit(actor, id) : null;
  return (
    <DeskShell session={session} current="cases">
      <PageMain>
        <Crumbs items={[{ label: `Case ${drive.case.ref}`, href: `/cases/${drive.case.id}` }, { label: `Drive ${drive.letter}` }]} />
        <PageTitle note={drive.case.customerName}>Drive {drive.letter} of case <span className="font-mono">{drive.case.ref}</span></PageTitle>
        <PrintMenu links={drivePrints(drive.case.id, id)} />
        <DriveBlock drive={drive} policy={policy} user={session.user} open={drive.case.open} photos={photos} here />
        {drive.boards.length > 0 ? (
          <Section title="As recorded" note="Typed facts are corrected by a new entry in the log; nothing is overwritten there.">
            <BoardTable boards={drive.boards} original={originalOf(drive)} corrects={drive.case.open && may(actor, "fact.correct")} isLead={may(actor, "board.allow-other-number")} />
          </Section>
        ) : null}
        {fitting ? <Section id="shelf" title="Boards that fit this drive" note="From the donor shelf: the same board number. What differs is said; another revision is a caution."><FittingBoards view={fitting} driveId={id} takes={drive.case.open && may(actor, "shelf.change")} isLead={may(actor, "board.allow-other-number")} /></Section> : null}
        <Section id="photos" title="Photos" note="Kept as they came, with their digests. What is shown here are copies, upright and without the place where they were taken.">
          <PhotoGroups groups={photos} adds={addsPhoto} timeZone={session.timeZone} />
        </Section>
        <StartUpSection startUps={startUps} acts={may(actor, "start-up.record")} timeZone={session.timeZone} />
        <Section id="items" title="Where things are" note="By the last hand-over that both sides confirmed.">
          <ItemsTable driveId={id} items={items} user={session.user} receivers={others} acts={may(actor, "item.hand-over")} open={drive.case.open} timeZone={session.timeZone} />
        </Section>
        <Section title="Custody log" note="Each entry carries the hash of the one before.">
          <LatestEntries driveId={id} letter={drive.letter} entries={entries} timeZone={session.timeZone} />
        </Section>
      </PageMain>
    </DeskShell>
  );
}

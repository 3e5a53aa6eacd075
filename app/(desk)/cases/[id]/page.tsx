import type { Metadata } from "next";
import { DriveBlock } from "@/components/case/drive-block";
import { NextSteps } from "@/components/case/next-steps";
import { ShareList } from "@/components/case/share-list";
import { Ticket } from "@/components/case/ticket";
import { LatestEntries } from "@/components/custody/latest-entries";
import { ClosingSection } from "@/components/closing/closing-section";
import { ReturnSteps, StartUpSteps, stepThatLeads } from "@/components/closing/closing-steps";
import { AddDrive } from "@/components/drive/add-drive";
import { ImagesSection } from "@/components/erasure/images-section";
import { WishNote } from "@/components/erasure/wish-note";
import { NotesSection } from "@/components/note/notes-section";
import { CasePhotos } from "@/components/photo/case-photos";
import { ParcelSection } from "@/components/receive/parcel-section";
import { RequestSection } from "@/components/request/request-section";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Empty } from "@/components/ui/empty";
import { Section } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { caseView } from "@/lib/queries/cases";
import { closingView } from "@/lib/queries/closing";
import { custodyOfDrive } from "@/lib/queries/custody";
import { erasureView } from "@/lib/queries/erasure";
import { addsPhotos, photoCounts, photosOf } from "@/lib/queries/photos";
import { driveToRecord } from "@/lib/queries/drives";
import { mailStaysHere } from "@/lib/queries/first-steps";
import { notesOf } from "@/lib/queries/notes";
import { policyView } from "@/lib/queries/policy";
import { receiptView } from "@/lib/queries/receipts";
import { requestSection } from "@/lib/queries/requests";
import { dayIn } from "@/lib/queries/workshop-day";
import type { CaseState } from "@/lib/views";

export const metadata: Metadata = { title: "Case" };

const WITHOUT_DRIVE: Record<CaseState, string> = {
  requested: "Receive the parcel first; the drive that is in it is recorded then.",
  open: "Type what its label says. An external drive may show only a part number on the enclosure: that is enough.",
  closed: "The case was closed before a drive was recorded.",
};

export default async function CasePage({ params, searchParams }: { params: Promise<{ id: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> }) {
  const { actor, session } = await signedIn();
  const { id } = await params;
  const view = await orNotFound(() => caseView(actor, id));
  const policy = await policyView(actor);
  const logs = await Promise.all(view.drives.map(async (drive) => ({ drive, ...(await custodyOfDrive(actor, drive.id)) })));
  const [photos, counts, addsPhoto] = await Promise.all([photosOf(actor, "case", id), photoCounts(actor, id), addsPhotos(actor, "case", id)]);
  const { user, timeZone } = session;
  const now = new Date();
  const closing = await closingView(actor, id);
  const erasure = await erasureView(actor, id);
  const leads = stepThatLeads(view, closing, user);
  const receipt = await receiptView(actor, id);
  const request = await requestSection(actor, id);
  const { items: notes } = await notesOf(actor, id);
  const parcel = <ParcelSection caseId={id} state={view.state} receipt={receipt} receives={may(actor, "parcel.receive")} timeZone={timeZone} />;
  const adds = may(actor, "drive.record") && view.state === "open";
  const drive = { caseId: id, userId: user.id, isLead: may(actor, "board.allow-other-number"), ...(await driveToRecord(actor, view, await searchParams)) };
  return (
    <DeskShell session={session} current="cases">
      <PageMain>
        <Ticket view={view} timeZone={timeZone} today={dayIn(timeZone, now)} />
        {view.state === "requested" ? parcel : null}
        {view.drives.map((drive) => <DriveBlock key={drive.id} drive={drive} policy={policy} user={user} open={view.state === "open"} />)}
        {view.drives.length === 0 ? <div className="py-8"><Empty title="No drive yet." action={adds ? <AddDrive {...drive} lead /> : null}>{WITHOUT_DRIVE[view.state]}</Empty></div> : null}
        {view.drives.length > 0 && adds ? <div className="no-print py-6"><AddDrive {...drive} /></div> : null}
        <Section title="Next on this case" note="Things that can’t be done yet say why."><NextSteps view={view} policy={policy} user={user} leads={leads} mailStays={mailStaysHere()} timeZone={timeZone} tests={<StartUpSteps closing={closing} user={user} leads={leads} />} end={<ReturnSteps view={view} closing={closing} user={user} leads={leads} />} /></Section>
        <ClosingSection caseId={id} caseRef={view.ref} closing={closing} releases={may(actor, "case.release")} timeZone={timeZone} />
        {erasure ? <ImagesSection view={erasure} told={closing.returned ? `The customer was told: ${closing.keepDays} days after the return.` : "Counted from the day on which the case was closed."} erases={may(actor, "case.erase")} timeZone={timeZone} /> : null}
        {view.state === "requested" ? null : parcel}
        <NotesSection view={view} notes={notes} user={user} timeZone={timeZone} neededBy={request?.answers.neededBy ?? null} />
        {request ? <RequestSection view={request} wish={request.deletion ? <WishNote view={{ ...request, deletion: request.deletion }} timeZone={timeZone} answers={may(actor, "request.answer")} /> : null} timeZone={timeZone} answers={may(actor, "request.answer")} /> : null}
        <Section id="photos" title="Photos" note="Of the parcel, its papers and what came along. Kept as they came; copies are shown.">
          <CasePhotos caseId={id} caseRef={view.ref} photos={photos} adds={addsPhoto} timeZone={timeZone}
            drives={view.drives.map(({ id: driveId, letter }) => ({ id: driveId, letter, photos: counts.find((one) => one.driveId === driveId)?.photos ?? 0 }))} />
        </Section>
        {view.shares.length > 0 ? (
          <Section title="Summary links" note="Private links to the verification summary."><ShareList shares={view.shares} timeZone={timeZone} withdraws={may(actor, "share.withdraw")} now={now.toISOString()} /></Section>
        ) : null}
        {logs.length > 0 ? (
          <Section title="Custody log" note="Each entry carries the hash of the one before.">
            {logs.map(({ drive, entries }) => <LatestEntries key={drive.id} driveId={drive.id} letter={drive.letter} entries={entries} timeZone={timeZone} />)}
          </Section>
        ) : null}
      </PageMain>
    </DeskShell>
  );
}

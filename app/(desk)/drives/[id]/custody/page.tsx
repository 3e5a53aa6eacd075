import type { Metadata } from "next";
import { MakeBundle } from "@/components/case/make-bundle";
import { EncryptionNote } from "@/components/chip/encryption-note";
import { DriveLog } from "@/components/custody/drive-log";
import { PrintButton } from "@/components/custody/print-button";
import { DeskShell } from "@/components/shell/desk-shell";
import { PageMain } from "@/components/shell/page-main";
import { Crumbs } from "@/components/ui/crumbs";
import { PageTitle } from "@/components/ui/section";
import { signedIn } from "@/lib/auth/page";
import { may } from "@/lib/core/policy";
import { orNotFound } from "@/lib/http/page-errors";
import { custodyOfDrive } from "@/lib/queries/custody";
import { driveView } from "@/lib/queries/drives";

export const metadata: Metadata = { title: "Custody log" };

export default async function DriveLogPage({ params }: { params: Promise<{ id: string }> }) {
  const { actor, session } = await signedIn();
  const { id } = await params;
  const drive = await orNotFound(() => driveView(actor, id));
  const { entries } = await orNotFound(() => custodyOfDrive(actor, id));
  const boards = drive.boards.filter((b) => b.role === "original").map((b) => [b.boardNumber, b.revision].filter(Boolean).join(" "));
  const facts = [drive.partNumber, drive.model, drive.serial && `SN ${drive.serial}`, ...boards].filter(Boolean);
  return (
    <DeskShell session={session} current="custody">
      <PageMain>
        <Crumbs items={[{ label: `Case ${drive.case.ref}`, href: `/cases/${drive.case.id}` }, { label: `Drive ${drive.letter}`, href: `/drives/${id}` }, { label: "Custody log" }]} />
        <div className="flex flex-wrap items-end justify-between gap-4">
          <PageTitle note={<span className="flex flex-wrap gap-x-4 font-mono">{facts.map((fact) => <span key={fact}>{fact}</span>)}</span>}>Custody log of Drive {drive.letter}</PageTitle>
          <div className="no-print flex flex-wrap items-start gap-3 pb-5"><PrintButton />{may(actor, "bundle.make") ? <MakeBundle caseId={drive.case.id} /> : null}</div>
        </div>
        <EncryptionNote encryption={drive.encryption} className="mb-4" />
        <DriveLog driveId={id} entries={entries} timeZone={session.timeZone} assesses={may(actor, "assessment.record")} records={may(actor, "audit.read")} />
      </PageMain>
    </DeskShell>
  );
}

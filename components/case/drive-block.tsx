import Link from "next/link";
import { EncryptionNote } from "@/components/chip/encryption-note";
import { UnitNote } from "@/components/chip/unit-note";
import { entriesText } from "@/components/custody/entries-text";
import { AddBoard } from "@/components/drive/add-board";
import { AddChip } from "@/components/drive/add-chip";
import { CorrectDrive } from "@/components/drive/correct-drive";
import { boardName } from "@/lib/core/board-name";
import { DriveWarningList } from "@/components/drive/drive-warning-list";
import { driveFacts, lesserFacts, originalOf } from "@/components/drive/drive-words";
import { NoChipToMove } from "@/components/drive/no-chip-to-move";
import { Empty } from "@/components/ui/empty";
import { may } from "@/lib/core/policy";
import { listText } from "@/lib/core/quantity";
import type { Policy } from "@/lib/core/words";
import type { BoardView, DriveView, PhotoGroup, PhotoView, SessionView } from "@/lib/views";
import { BoardFigure, type DriveRights, FitLine } from "./board-figure";
import { placeChips } from "./board-place";
import { ChipTable } from "./chip-table";

function Transfer() {
  return (
    <div className="xfer">
      <svg viewBox="0 0 92 40" aria-hidden="true">
        <path d="M8 20h22l10-10h22l10 10h10" fill="none" stroke="var(--copper-2)" strokeWidth="3" />
        <circle cx="8" cy="20" r="5" fill="var(--paper)" stroke="var(--copper-2)" strokeWidth="4" />
        <path d="M78 12l11 8-11 8z" fill="var(--copper-2)" />
      </svg>
      <span>one approved image a chip</span>
    </div>
  );
}

/** The donor that takes the images: the one with pairs, else the latest. */
function chosenDonor(donors: readonly BoardView[]): BoardView | null {
  return donors.find((board) => board.chips.some((chip) => chip.pair)) ?? donors.at(-1) ?? null;
}

/** The first photo of a board: later ones may be close-ups, and the chips' places must not move with each upload. */
function photoOf(groups: readonly PhotoGroup[] | undefined, board: BoardView): PhotoView | null | undefined {
  return groups && (groups.find((group) => group.of.id === board.id)?.photos.find((photo) => photo.kind === "photo") ?? null);
}

/** One drive: its label, both boards, its chips, and what is to be recorded next. `photos` where the page shows them. */
export function DriveBlock({ drive, policy, user, open, photos, here = false }: { drive: DriveView; policy: Policy; user: SessionView["user"]; open: boolean; photos?: readonly PhotoGroup[]; here?: boolean }) {
  const original = originalOf(drive);
  const donors = drive.boards.filter((board) => board.role === "donor");
  const donor = chosenDonor(donors);
  const spots = placeChips(original, donor);
  const rights: DriveRights = { userId: user.id, records: open && may(user, "board.record"), corrects: open && may(user, "fact.correct"), isLead: may(user, "board.allow-other-number") };
  const given = { drive, isLead: rights.isLead, userId: user.id };
  const { records } = rights;
  const inside = original?.dataInController ?? false;
  const names = original && original.chips.length > 0 && original.chips.every((chip) => !chip.needsTransfer) ? original.chips.map((chip) => chip.designator) : [];
  const kept = names.length > 0 ? `${listText(names)} ${names.length === 1 ? "is" : "are"} kept for reference; nothing of this drive is transferred.` : null;
  const figure = (board: BoardView) => <BoardFigure drive={drive} board={board} spots={spots} rights={rights} photo={photoOf(photos, board)} />;
  return (
    <section id={`drive-${drive.letter}`} aria-label={`Drive ${drive.letter}`}>
      <div className="drivebar">
        <h2 className="text-t5 font-bold">{here ? `Drive ${drive.letter}` : <Link href={`/drives/${drive.id}`} className="text-ink">Drive {drive.letter}</Link>}</h2>
        {driveFacts(drive).map((fact) => <span key={fact} className="font-mono">{fact}</span>)}
        {lesserFacts(drive).length > 0 ? <span>{lesserFacts(drive).join(", ")}</span> : null}
        {records ? <span className="no-print"><CorrectDrive drive={drive} /></span> : null}
        <span className="ml-auto phone:ml-0"><Link href={`/drives/${drive.id}/custody`}>Custody log, {entriesText(drive.custodyEntries)}</Link></span>
      </div>
      <div className="grid gap-2 pt-3 empty:hidden">
        <EncryptionNote encryption={drive.encryption} />
        {drive.warnings.length > 0 ? <DriveWarningList warnings={drive.warnings} /> : null}
      </div>
      {!original ? (
        <div className="pt-5"><Empty title="No board yet." action={records ? <AddBoard role="original" {...given} /> : null}>The original board comes first: a donor is compared with it.</Empty></div>
      ) : inside ? (
        <div className="board-pair board-alone">{figure(original)}<NoChipToMove /></div>
      ) : (
        <div className="board-pair">
          {figure(original)}
          {kept && !donor ? <span /> : <Transfer />}
          {donor ? figure(donor) : kept ? (
            <Empty title="No donor board is needed." action={records ? <AddBoard role="donor" {...given} /> : null}>{kept}</Empty>
          ) : (
            <Empty title="No donor board yet." action={records ? <AddBoard role="donor" {...given} /> : null}>It has to carry the board number {original.boardNumber}.</Empty>
          )}
        </div>
      )}
      {original && !inside && original.chips.length === 0 ? (
        <div className="pt-4"><Empty title="No chip on the original yet." action={records ? <AddChip {...given} board={original} /> : null}>Record each memory chip that holds this drive’s own data.</Empty></div>
      ) : null}
      <div className="pt-3 empty:hidden"><UnitNote chips={original?.chips ?? []} /></div>
      <ChipTable drive={drive} policy={policy} corrects={rights.corrects} />
      {donors.length > 1 ? (
        <ul className="grid gap-2 pt-3 text-t2">
          {donors.filter((board) => board !== donor).map((board) => <li key={board.id} className="flex flex-wrap items-baseline gap-x-3"><span className="min-w-0 [overflow-wrap:anywhere]">Also recorded: donor <span className="font-mono">{boardName(board)}</span></span>{board.fit ? <FitLine fit={board.fit} /> : null}</li>)}
        </ul>
      ) : null}
      {donor && !inside && records ? <div className={`no-print pt-3 ${here ? "pb-6" : ""}`}><AddBoard role="donor" {...given} /></div> : null}
    </section>
  );
}

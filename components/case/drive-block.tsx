import Link from "next/link";
import { entriesText } from "@/components/custody/entries-text";
import { AddBoard } from "@/components/drive/add-board";
import { AddChip } from "@/components/drive/add-chip";
import { CorrectDrive } from "@/components/drive/correct-drive";
import { boardName } from "@/lib/core/board-name";
import { driveFacts, originalOf } from "@/components/drive/drive-words";
import { Empty } from "@/components/ui/empty";
import { may } from "@/lib/core/policy";
import type { Policy } from "@/lib/core/words";
import type { BoardView, DriveView, SessionView } from "@/lib/views";
import { BoardFigure, FitLine } from "./board-figure";
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

/** One drive: its label, both boards, its chips, and what is to be recorded next. */
export function DriveBlock({ drive, policy, user, here = false }: { drive: DriveView; policy: Policy; user: SessionView["user"]; here?: boolean }) {
  const original = originalOf(drive);
  const donors = drive.boards.filter((board) => board.role === "donor");
  const donor = chosenDonor(donors);
  const slots = placeChips(original, donor);
  const records = may(user, "board.record");
  const given = { driveId: drive.id, original, isLead: may(user, "board.allow-other-number") };
  const facts = driveFacts(drive);
  return (
    <section id={`drive-${drive.letter}`} aria-label={`Drive ${drive.letter}`}>
      <div className="drivebar">
        <h2 className="text-t5 font-bold">{here ? `Drive ${drive.letter}` : <Link href={`/drives/${drive.id}`} className="text-ink">Drive {drive.letter}</Link>}</h2>
        {facts.map((fact) => <span key={fact} className="font-mono">{fact}</span>)}
        {records ? <span className="no-print"><CorrectDrive drive={drive} /></span> : null}
        <span className="ml-auto phone:ml-0"><Link href={`/drives/${drive.id}/custody`}>Custody log, {entriesText(drive.custodyEntries)}</Link></span>
      </div>
      {original ? (
        <div className="board-pair">
          <BoardFigure board={original} original={original} slots={slots} user={user} />
          <Transfer />
          {donor ? <BoardFigure board={donor} original={original} slots={slots} user={user} /> : (
            <Empty title="No donor board yet." action={records ? <AddBoard role="donor" {...given} /> : null}>It has to carry the board number {original.boardNumber}.</Empty>
          )}
        </div>
      ) : (
        <div className="pt-5"><Empty title="No board yet." action={records ? <AddBoard role="original" {...given} /> : null}>The original board comes first: a donor is compared with it.</Empty></div>
      )}
      {original && original.chips.length === 0 ? (
        <div className="pt-4"><Empty title="No chip on the original yet." action={records ? <AddChip board={original} originals={[]} /> : null}>Record each memory chip that holds this drive’s own data.</Empty></div>
      ) : null}
      <ChipTable drive={drive} policy={policy} corrects={may(user, "fact.correct")} />
      {donors.length > 1 ? (
        <ul className="grid gap-2 pt-3 text-t2">
          {donors.filter((board) => board !== donor).map((board) => <li key={board.id} className="flex flex-wrap items-baseline gap-x-3">Also recorded: donor <span className="font-mono">{boardName(board)}</span>{board.fit ? <FitLine fit={board.fit} /> : null}</li>)}
        </ul>
      ) : null}
      {donor && records ? <div className="no-print pt-3"><AddBoard role="donor" {...given} /></div> : null}
    </section>
  );
}

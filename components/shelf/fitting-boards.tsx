import Link from "next/link";
import { Empty } from "@/components/ui/empty";
import { FindingLine } from "@/components/ui/finding-line";
import { boardName } from "@/lib/core/board-name";
import { countOf } from "@/lib/core/quantity";
import type { FittingBoard, FittingView } from "@/lib/core/shelf";
import { chipFacts } from "./shelf-words";
import { TakeBoard, TakeByNumber } from "./take-board";

interface Rights {
  driveId: string;
  /** takes boards, and the case is open */
  takes: boolean;
  /** may take one with another board number */
  isLead: boolean;
}

/** Boards of the shelf with this drive's board number, best first; whatever differs is said. */
export function FittingBoards({ view, driveId, takes, isLead }: Rights & { view: FittingView }) {
  if (!view.original) return <p className="text-ink-2">Record the original board first; the shelf is compared with it.</p>;
  const other = takes && isLead ? <TakeByNumber driveId={driveId} /> : null;
  if (view.boards.length === 0) {
    return <div className="grid gap-3"><Empty title={`No board ${view.original.boardNumber} lies on the shelf.`}>Taken and retired boards aren’t offered. <Link href={`/shelf?q=${encodeURIComponent(view.original.boardNumber)}`}>Search the whole shelf</Link></Empty>{other}</div>;
  }
  return (
    <div className="grid gap-3">
      <table className="ruled lines">
        <caption className="sr-only">Boards of the shelf that fit this drive</caption>
        <thead><tr><th scope="col">Number</th><th scope="col">Board</th><th scope="col">Beside the original</th><th scope="col">Chips</th><th scope="col">Place</th>{takes ? <th scope="col"><span className="sr-only">Take it</span></th> : null}</tr></thead>
        <tbody>
          {view.boards.map((board) => (
            <tr key={board.id} className={board.reserved === "elsewhere" ? "is-aside" : ""}>
              <th scope="row"><Link href={`/shelf/${board.id}`} className="font-mono whitespace-nowrap">{board.name}</Link></th>
              <td className="font-mono l-top whitespace-nowrap">{boardName(board)}</td>
              <td className="l-full max-w-[46ch]"><FitLines board={board} /></td>
              <td data-l="Chips">{board.chips.length > 0 ? board.chips.map((chip) => <span key={chip.designator} className="block text-t2"><b className="font-mono">{chip.designator}</b> {chipFacts(chip)}</span>) : <span className="text-ink-3">not on record</span>}</td>
              <td data-l="Place" className="min-w-[18ch]">{board.place ?? <span className="text-ink-3">not said</span>}</td>
              {takes ? <td className="l-row text-right phone:text-left"><TakeBoard board={board} driveId={driveId} /></td> : null}
            </tr>
          ))}
        </tbody>
      </table>
      {view.more > 0 ? <p className="text-ink-2">{countOf(view.more, "more board")} with this number. <Link href={`/shelf?q=${encodeURIComponent(view.original.boardNumber)}`}>See them on the shelf</Link></p> : null}
      {other}
    </div>
  );
}

export function FitLines({ board: { fit, reserved, reservedRef } }: { board: Pick<FittingBoard, "fit" | "reserved" | "reservedRef"> }) {
  return (
    <>
      {fit.differences.length === 0 && fit.unknown.length === 0 ? <FindingLine kind="ok">Equal in all that is compared.</FindingLine> : null}
      {fit.differences.map((text) => <FindingLine key={text} kind="caution">{text}</FindingLine>)}
      {fit.unknown.map((text) => <FindingLine key={text} kind="wait">{text}</FindingLine>)}
      {reserved === "nobody" ? null : <FindingLine kind="note">{reserved === "here" ? "Reserved for this case." : `Reserved for case ${reservedRef ?? ""}.`}</FindingLine>}
    </>
  );
}

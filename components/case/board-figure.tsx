import { AddChip } from "@/components/drive/add-chip";
import { CorrectBoard } from "@/components/drive/correct-board";
import { boardName } from "@/lib/core/board-name";
import { originalOf } from "@/components/drive/drive-words";
import { BoardPicture } from "@/components/photo/board-picture";
import { FindingLine } from "@/components/ui/finding-line";
import type { MarkKind } from "@/components/ui/mark";
import { listText } from "@/lib/core/quantity";
import type { BoardView, DriveView, PhotoView } from "@/lib/views";
import { BoardDrawing } from "./board-drawing";
import type { Spot } from "./board-place";
import { PlaceChips } from "./place-chips";

/** What somebody may do on a drive now: nothing is recorded on a closed case. */
export interface DriveRights {
  userId: string;
  records: boolean;
  corrects: boolean;
  /** may take a donor with another board number */
  isLead: boolean;
}

const FIT_MARK: Record<"fits" | "caution" | "other-number", MarkKind> = { fits: "ok", caution: "caution", "other-number": "block" };

export function FitLine({ fit }: { fit: NonNullable<BoardView["fit"]> }) {
  const words = fit.verdict === "fits" ? "Fits the original." : fit.differences.join(" ");
  return <FindingLine kind={FIT_MARK[fit.verdict]}>{words}{fit.reason ? <span className="text-ink-2"> Taken all the same: {fit.reason}</span> : null}</FindingLine>;
}

/** A board with its drawing, what is known of it and what can be recorded on it. */
export function BoardFigure({ drive, board, spots, rights, photo }: {
  drive: DriveView;
  board: BoardView;
  spots: ReadonlyMap<string, Spot>;
  rights: DriveRights;
  /** the photo on which the chips stand, on pages that show it; null where the board has none */
  photo?: PhotoView | null;
}) {
  const original = originalOf(drive);
  const markings = [board.controllerMarking && `controller ${board.controllerMarking}`, board.motorDriverMarking && `motor driver ${board.motorDriverMarking}`].filter((m): m is string => Boolean(m));
  const drawn = board.chips.filter((chip) => spots.has(chip.id)).length;
  return (
    <figure>
      <figcaption>
        <b className="text-t4">{board.role === "original" ? "Original board" : "Donor board"} <span className="font-mono font-medium">{boardName(board)}</span></b>
        <span className="text-ink-2">{board.role === "original" ? "only ever read" : "takes the image"}</span>
      </figcaption>
      {photo && board.chips.some((chip) => chip.place)
        ? <BoardPicture photo={photo} chips={board.chips} role={board.role} name={`the ${board.role} board ${boardName(board)}`} fallback={<BoardDrawing board={board} spots={spots} />} />
        : <BoardDrawing board={board} spots={spots} />}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-1 pt-2 text-t2">
        {board.fit ? <FitLine fit={board.fit} /> : null}
        {markings.length > 0 ? <p className="text-ink-2">{listText(markings)}</p> : null}
        {board.condition ? <p className="whitespace-pre-line">{board.condition}</p> : null}
        {drawn < board.chips.length ? <p className="text-ink-2">{board.chips.length - drawn} more in the table than the drawing has room for.</p> : null}
      </div>
      {rights.records ? (
        <div className="no-print flex flex-wrap gap-2 pt-2">
          <AddChip drive={drive} board={board} isLead={rights.isLead} userId={rights.userId} />
          {photo !== undefined && board.chips.length > 0 ? <PlaceChips board={board} original={original} photo={photo} /> : null}
          <CorrectBoard board={board} original={original} isLead={rights.isLead} />
        </div>
      ) : null}
    </figure>
  );
}

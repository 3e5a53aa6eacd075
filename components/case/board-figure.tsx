import { AddChip } from "@/components/drive/add-chip";
import { CorrectBoard } from "@/components/drive/correct-board";
import { boardName } from "@/lib/core/board-name";
import { FindingLine } from "@/components/ui/finding-line";
import type { MarkKind } from "@/components/ui/mark";
import { may } from "@/lib/core/policy";
import { listText } from "@/lib/core/quantity";
import type { BoardView, SessionView } from "@/lib/views";
import { BoardDrawing } from "./board-drawing";

const FIT_MARK: Record<"fits" | "caution" | "other-number", MarkKind> = { fits: "ok", caution: "caution", "other-number": "block" };

export function FitLine({ fit }: { fit: NonNullable<BoardView["fit"]> }) {
  const words = fit.verdict === "fits" ? "Fits the original." : fit.differences.join(" ");
  return <FindingLine kind={FIT_MARK[fit.verdict]}>{words}{fit.reason ? <span className="text-ink-2"> Taken all the same: {fit.reason}</span> : null}</FindingLine>;
}

/** A board with its drawing, what is known of it and what can be recorded on it. */
export function BoardFigure({ board, original, slots, user }: { board: BoardView; original: BoardView | null; slots: ReadonlyMap<string, number>; user: SessionView["user"] }) {
  const markings = [board.controllerMarking && `controller ${board.controllerMarking}`, board.motorDriverMarking && `motor driver ${board.motorDriverMarking}`].filter((m): m is string => Boolean(m));
  const drawn = board.chips.filter((chip) => slots.has(chip.id)).length;
  return (
    <figure>
      <figcaption>
        <b className="text-t4">{board.role === "original" ? "Original board" : "Donor board"} <span className="font-mono font-medium">{boardName(board)}</span></b>
        <span className="text-ink-2">{board.role === "original" ? "only ever read" : "takes the image"}</span>
      </figcaption>
      <BoardDrawing board={board} slots={slots} />
      <div className="grid gap-1 pt-2 text-t2">
        {board.fit ? <FitLine fit={board.fit} /> : null}
        {markings.length > 0 ? <p className="text-ink-2">{listText(markings)}</p> : null}
        {board.condition ? <p className="whitespace-pre-line">{board.condition}</p> : null}
        {drawn < board.chips.length ? <p className="text-ink-2">{board.chips.length - drawn} more in the table than the drawing has room for.</p> : null}
      </div>
      {may(user, "chip.record") ? (
        <div className="no-print flex flex-wrap gap-2 pt-2">
          <AddChip board={board} originals={original?.chips ?? []} />
          <CorrectBoard board={board} original={original} isLead={may(user, "board.allow-other-number")} />
        </div>
      ) : null}
    </figure>
  );
}

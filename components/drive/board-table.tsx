import { chipKind } from "@/components/chip/chip-words";
import { CorrectBoard } from "@/components/drive/correct-board";
import { CorrectChip } from "@/components/drive/correct-chip";
import { ButtonLink } from "@/components/ui/button";
import { DesignatorPlate } from "@/components/ui/plate";
import { countOf } from "@/lib/core/quantity";
import type { BoardView } from "@/lib/views";
import { boardName } from "@/lib/core/board-name";
import { SIZE_SOURCE_OPTIONS } from "./drive-words";

const sourceWords = (source: string) => SIZE_SOURCE_OPTIONS.find((option) => option.value === source)?.label.toLowerCase() ?? source;

/** Every chip of every board of a drive as it is recorded, donor chips too, each with its correction. */
export function BoardTable({ boards, original, corrects, isLead }: { boards: readonly BoardView[]; original: BoardView | null; corrects: boolean; isLead: boolean }) {
  return (
    <div className="overflow-x-auto phone:overflow-visible">
      <table className="ruled lines">
        <caption className="sr-only">Boards of this drive and their chips</caption>
        <thead><tr>{["Chip", "Kind", "Size from", "Top marking", "Holds", "Pair"].map((head) => <th key={head} scope="col">{head}</th>)}<th scope="col"><span className="sr-only">Open or correct</span></th></tr></thead>
        {boards.map((board) => (
          <tbody key={board.id}>
            <tr className="grp">
              <th scope="rowgroup" colSpan={7}>
                <span className="flex flex-wrap items-center gap-x-4 gap-y-1">
                  <span>{board.role === "original" ? "Original board" : "Donor board"} <span className="font-mono text-ink">{boardName(board)}</span>, {countOf(board.chips.length, "chip")}</span>
                  {corrects ? <span className="no-print"><CorrectBoard board={board} original={original} isLead={isLead} /></span> : null}
                </span>
              </th>
            </tr>
            {board.chips.map((chip) => (
              <tr key={chip.id}>
                <th scope="row"><DesignatorPlate designator={chip.designator} board={board.role} /></th>
                <td>{chipKind(chip)}</td>
                <td data-l="Size from">{sourceWords(chip.sizeSource)}</td>
                <td data-l="Marking" className="font-mono">{chip.marking ?? <span className="text-ink-3">none</span>}</td>
                <td data-l="Holds">{chip.holds ?? <span className="text-ink-3">not said</span>}{board.role === "original" && !chip.needsTransfer ? ", kept for reference" : ""}</td>
                <td data-l="Pair">{chip.pair ? <><DesignatorPlate designator={chip.pair.designator} board={board.role === "original" ? "donor" : "original"} /> <span className="font-mono text-t2">{chip.pair.boardNumber}</span></> : <span className="text-ink-3">not paired</span>}</td>
                <td className="l-row text-right whitespace-nowrap phone:text-left">
                  <span className="inline-flex items-center gap-3">
                    {corrects ? <CorrectChip chip={chip} originals={original?.chips ?? []} /> : null}
                    <ButtonLink size="small" href={`/chips/${chip.id}`}>Open {chip.designator}</ButtonLink>
                  </span>
                </td>
              </tr>
            ))}
          </tbody>
        ))}
      </table>
    </div>
  );
}

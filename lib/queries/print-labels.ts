import { withCheck } from "@/lib/core/case-number";
import { sizeText } from "@/lib/core/quantity";
import type { Actor } from "@/lib/core/words";
import type { BoardView, CaseView, ChipSummary, DriveView, LabelView } from "@/lib/views";
import { notFound } from "@/lib/commands/refuse";
import { caseView } from "./cases";

/** Every label of a case, or that of one drive, board or chip: what sticks to a bag, a board or a tray. */
export async function printLabels(actor: Actor, caseId: string, of?: string): Promise<LabelView[]> {
  const labels = labelsOf(await caseView(actor, caseId));
  const wanted = of ? labels.filter((label) => label.key === of) : labels;
  if (of && wanted.length === 0) throw notFound("drive, board or chip of this case");
  return wanted;
}

function labelsOf(view: CaseView): LabelView[] {
  const refChecked = withCheck(view.ref);
  return view.drives.flatMap((drive) => [
    driveLabelOf(drive, refChecked),
    ...drive.boards.flatMap((board) => [boardLabelOf(board, drive, refChecked), ...board.chips.map((chip) => chipLabelOf(chip, board, drive, refChecked))]),
  ]);
}

const lines = (pairs: [string, string | null | undefined][]) => pairs.flatMap(([name, value]) => (value ? [{ name, value }] : []));

function driveLabelOf(drive: DriveView, refChecked: string): LabelView {
  return {
    key: drive.id, kind: "drive", refChecked, title: `Drive ${drive.letter}`, chip: null,
    lines: lines([["Part", drive.partNumber], ["Serial", drive.serial], ["Model", drive.partNumber ? null : drive.model]]),
  };
}

function boardLabelOf(board: BoardView, drive: DriveView, refChecked: string): LabelView {
  return {
    key: board.id, kind: board.role, refChecked, title: board.role === "original" ? "Original board" : "Donor board", chip: null,
    lines: lines([["Drive", `${drive.letter}${drive.serial ? `, ${drive.serial}` : ""}`], ["Board", [board.boardNumber, board.revision].filter(Boolean).join(" ")]]),
  };
}

function chipLabelOf(chip: ChipSummary, board: BoardView, drive: DriveView, refChecked: string): LabelView {
  return {
    key: chip.id, kind: "chip", refChecked, title: chip.designator,
    chip: { board: board.role, supplyMillivolts: chip.supplyMillivolts, pins: pinsOf(chip.package) },
    lines: lines([["Board", `${board.role}, Drive ${drive.letter}`], ["Marking", chip.marking], ["Size", sizeText(chip.sizeBytes)]]),
  };
}

/** Pins of the package for the drawing: the number in "SOIC-8" or "TSSOP16", else eight. */
function pinsOf(name: string | null): number {
  const pins = Number(/(?:^|\D)(\d{1,2})$/.exec(name?.trim() ?? "")?.[1]);
  return pins >= 4 && pins <= 32 && pins % 2 === 0 ? pins : 8;
}

import { ENCRYPTION_WORDS, encryptionCaution } from "@/lib/core/encryption";
import { NO_CHIP_TEXT, NO_CHIP_TITLE } from "@/lib/core/no-chip";
import { sizeText } from "@/lib/core/quantity";
import { startUpWords } from "@/lib/core/start-up";
import { unitWords } from "@/lib/core/two-chips";
import { code, type Span, plain, quiet, strong } from "./ink";
import { photoPart } from "./photo-section";
import type { ReportBoard, ReportCase, ReportDrive, ReportFacts } from "./report-facts";
import { boardName, chipKind, driveName, FIT, momentText } from "./report-words";
import type { Sheet } from "./sheet";
import { Table } from "./table";

/** Chapter 3: what lies on the bench. */
export async function drives(sheet: Sheet, facts: ReportFacts): Promise<void> {
  const { record } = facts;
  sheet.heading(1, record.drives.length === 1 ? "The drive" : "The drives", { number: "3" });
  for (const drive of record.drives) {
    const name = [driveName(drive), drive.partNumber].filter(Boolean).join(", ");
    sheet.heading(2, name, { number: `3.${drive.number}` });
    sheet.facts([
      ["Part number", known(drive.partNumber)], ["Model", known(drive.model)], ["Serial", known(drive.serial)], ["Interface", drive.interface ? [plain(drive.interface)] : null],
      ["Capacity", drive.capacity ? [plain(drive.capacity)] : null], ["Made", drive.made ? [plain(drive.made)] : null], ["Firmware", drive.firmware ? [code(drive.firmware)] : null],
      ["Encrypted", drive.encryption ? [plain(ENCRYPTION_WORDS[drive.encryption])] : null],
      ["Recorded", [plain(momentText(drive.recordedAt))]],
    ]);
    const caution = encryptionCaution(drive.encryption ?? null);
    if (caution) sheet.paragraph([strong(`${caution.title} `), plain(caution.text)], { mark: "caution" });
    unitPart(sheet, drive.boards);
    if (drive.boards.length === 0) sheet.paragraph([plain("No board of this drive is recorded yet.")]);
    for (const board of drive.boards) {
      boardPart(sheet, board);
      chipTable(sheet, record, board);
      await sheet.breathe();
    }
    startUps(sheet, drive);
    if (drive.photos?.length) {
      sheet.heading(3, `Photos and documents of ${driveName(drive)}`, { keep: 130 });
      await photoPart(sheet, facts, drive.photos);
    }
  }
  if (record.photos?.length) {
    sheet.heading(2, "Photos and documents of the case", { number: `3.${record.drives.length + 1}`, keep: 130 });
    await photoPart(sheet, facts, record.photos);
  }
}

/** The drive with its donor board under power. */
function startUps(sheet: Sheet, drive: ReportDrive): void {
  if (!drive.startUpTests?.length) return;
  sheet.heading(3, `Start-up tests of ${driveName(drive)}`);
  const table = new Table(sheet, [{ head: "When, UTC", width: 118 }, { head: "By", width: 96 }, { head: "What was seen", width: 0 }], { name: `Start-up tests of ${driveName(drive)}` });
  for (const test of drive.startUpTests) {
    const other = test.serialMatches === false ? ` It reported the serial ${test.reportedSerial ?? "of another drive"}.` : "";
    table.row([[plain(momentText(test.at))], [plain(test.by)], [plain(`It ${startUpWords(test)}.${other}`), ...(test.note ? [quiet(`\n${test.note}`, { size: 8.5 })] : [])]]);
  }
  table.end();
}

const known = (text: string | null): Span[] => (text ? [code(text)] : [quiet("not recorded")]);

/** Chips of the original that belong together, and that both go to the donor. */
function unitPart(sheet: Sheet, boards: readonly ReportBoard[]): void {
  const together = boards.filter((board) => board.role === "original").flatMap((board) => board.chips).filter((chip) => chip.needsTransfer);
  if (together.length > 1) sheet.paragraph([plain(unitWords(together.map((chip) => chip.designator)))]);
}

function boardPart(sheet: Sheet, board: ReportBoard): void {
  sheet.heading(3, boardName(board));
  sheet.facts([
    ["Controller", board.controllerMarking ? [code(board.controllerMarking)] : null],
    ["Motor driver", board.motorDriverMarking ? [code(board.motorDriverMarking)] : null],
    ["Condition", board.condition ? [plain(board.condition)] : null],
    ["Recorded", [plain(momentText(board.recordedAt))]],
  ]);
  if (board.dataInController) sheet.paragraph([strong(`${NO_CHIP_TITLE} `), plain(NO_CHIP_TEXT[0])], { mark: "note" });
  if (!board.fit) return;
  const { mark, text } = FIT[board.fit.verdict];
  sheet.paragraph([strong(`${text} `), ...board.fit.differences.map((one) => plain(`${one} `)), ...(board.fit.reason ? [plain(`Used all the same: ${board.fit.reason}`)] : [])], { mark });
}

function chipTable(sheet: Sheet, record: ReportCase, board: ReportBoard): void {
  if (board.chips.length === 0) {
    sheet.paragraph([quiet("No chip of this board is recorded yet.")]);
    return;
  }
  const all = record.drives.flatMap((drive) => drive.boards.flatMap((one) => one.chips.map((chip) => ({ board: one, chip }))));
  const table = new Table(sheet, [{ head: "Chip", width: 70 }, { head: "Kind and size", width: 160 }, { head: "Marking, what it holds", width: 124 }, { head: "Pair", width: 0 }], { name: `Chips of ${boardName(board)}` });
  for (const chip of board.chips) {
    const pair = all.find((one) => one.chip.pairedWith === chip.id || one.chip.id === chip.pairedWith);
    const paired = pair ? [plain(`with ${pair.chip.designator} of ${boardName(pair.board, true)}${pair.chip.sizeBytes === chip.sizeBytes ? "" : `, which holds ${sizeText(pair.chip.sizeBytes)}`}`)] : [quiet(chip.needsTransfer ? "not paired yet" : "none needed")];
    table.row([
      [strong(chip.designator, { face: "mono" })], [plain(chipKind(chip))],
      chip.marking || chip.holds ? [...(chip.marking ? [code(chip.marking, { size: 8 })] : []), ...(chip.holds ? [plain(`${chip.marking ? "\n" : ""}${chip.holds}`)] : [])] : [quiet("not recorded")],
      paired,
    ]);
  }
  table.end();
}

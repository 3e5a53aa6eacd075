import { donorFit, type FitFacts, sameMarking } from "./donor-fit";
import type { Bus } from "./words";

/** The donor shelf: numbers, states, and which board of it fits a drive best. */
export interface ShelfChip {
  designator: string;
  bus: Bus | null;
  sizeBytes: number | null;
  package: string | null;
  marking: string | null;
}

export const SHELF_STATES = ["on-shelf", "reserved", "taken", "retired"] as const;
export type ShelfState = (typeof SHELF_STATES)[number];
export const SHELF_STATE_WORD: Record<ShelfState, string> = { "on-shelf": "On the shelf", reserved: "Reserved", taken: "Taken", retired: "Retired" };

/** 12 is "D-0012". */
export function shelfNumber(n: number): string {
  return `D-${String(n).padStart(4, "0")}`;
}

/** "D-0012", "d-12" and "D 12" are 12; null when it is no number of the shelf. */
export function readShelfNumber(text: string): number | null {
  const digits = /^d[-\s]?(\d{1,9})$/i.exec(text.trim())?.[1];
  const n = digits === undefined ? 0 : Number(digits);
  return n > 0 ? n : null;
}

/** "512 KiB", "1 MiB" and "524288" as bytes; null when it is no size. */
export function shelfBytes(text: string): number | null {
  const match = /^(\d{1,9})\s*(|bytes?|kib|mib)$/i.exec(text.trim().replace(/,(?=\d{3})/g, ""));
  return match ? Number(match[1]) * ({ k: 1024, m: 1_048_576 }[match[2].charAt(0).toLowerCase()] ?? 1) : null;
}

export function shelfState(row: { reserved: boolean; taken: boolean; retired: boolean }): ShelfState {
  if (row.taken) return "taken";
  if (row.retired) return "retired";
  return row.reserved ? "reserved" : "on-shelf";
}

export interface ShelfFit {
  /** as for any donor: another revision, controller, motor driver or chip is a caution */
  verdict: "fits" | "caution" | "other-number";
  differences: string[];
  /** what is known of one board only and was therefore not compared */
  unknown: string[];
}

type FitChip = Pick<ShelfChip, "designator" | "sizeBytes">;

const COMPARED: { key: "revision" | "controllerMarking" | "motorDriverMarking"; name: string }[] = [
  { key: "revision", name: "revision" }, { key: "controllerMarking", name: "controller marking" }, { key: "motorDriverMarking", name: "motor driver marking" },
];

/** A board of the shelf beside a drive's original with the chips that need a transfer. Sizes in bytes. */
export function shelfFit(original: FitFacts, needed: readonly { designator: string; sizeBytes: number }[], board: FitFacts & { chips: readonly FitChip[] }): ShelfFit {
  const fit = donorFit(original, board);
  const differences = [...fit.differences];
  const unknown = COMPARED.filter(({ key }) => Boolean(original[key]) !== Boolean(board[key])).map(({ key, name }) => (board[key] ? `The original’s ${name} is not on record.` : `Its ${name} is not on record.`));
  for (const chip of needed) {
    const own = board.chips.find((one) => sameMarking(one.designator, chip.designator));
    if (!own) unknown.push(board.chips.length > 0 ? `No ${chip.designator} is on record for it.` : `Its chips are not on record, so ${chip.designator} is not compared.`);
    else if (own.sizeBytes === null) unknown.push(`The size of its ${chip.designator} is not on record.`);
    else if (own.sizeBytes !== chip.sizeBytes) differences.push(`Its ${chip.designator} has ${own.sizeBytes.toLocaleString("en")} bytes; the original’s has ${chip.sizeBytes.toLocaleString("en")}.`);
  }
  return { verdict: fit.verdict === "fits" && differences.length > 0 ? "caution" : fit.verdict, differences, unknown };
}

interface Ranked {
  number: number;
  fit: ShelfFit;
  /** for: this drive's case, nobody, another case */
  reserved: "here" | "nobody" | "elsewhere";
}

const RESERVED_RANK: Record<Ranked["reserved"], number> = { here: 0, nobody: 0, elsewhere: 1 };

/** Best first: what can be taken, then the fewest differences, then the fewest open questions, what is reserved for this case before others of its kind. */
export function byFit(a: Ranked, b: Ranked): number {
  return RESERVED_RANK[a.reserved] - RESERVED_RANK[b.reserved] || a.fit.differences.length - b.fit.differences.length || a.fit.unknown.length - b.fit.unknown.length
    || Number(b.reserved === "here") - Number(a.reserved === "here") || a.number - b.number;
}

interface ShelfFacts {
  boardNumber: string;
  revision: string | null;
  controllerMarking: string | null;
  motorDriverMarking: string | null;
  chips: ShelfChip[];
  origin: string | null;
  condition: string | null;
  place: string | null;
  note: string | null;
}

/** One line of the shelf. */
export interface ShelfRow extends ShelfFacts {
  id: string;
  /** "D-0012" */
  number: string;
  state: ShelfState;
  reservedFor: { caseId: string; ref: string } | null;
  taken: { at: string; driveId: string; letter: string; caseId: string; ref: string } | null;
  retired: { at: string; reason: string } | null;
  createdAt: string;
}

export interface ShelfList {
  items: ShelfRow[];
  total: number;
  page: number;
  pageSize: number;
  /** how many boards stand in each state, searched or not */
  counts: Record<ShelfState, number>;
}

/** The content a donor had before it was written, which stays findable. */
export interface SavedContent {
  readId: string;
  /** "Own 1" */
  name: string;
  chipId: string;
  designator: string;
  sizeBytes: number;
  sha256: string;
  counted: boolean;
  storedAt: string;
}

export interface ShelfPage extends ShelfRow {
  createdBy: string;
  saved: SavedContent[];
  history: { seq: number; at: string; who: string; sentence: string }[];
}

export interface FittingBoard extends Ranked, Pick<ShelfRow, "id" | "boardNumber" | "revision" | "controllerMarking" | "motorDriverMarking" | "chips" | "origin" | "condition" | "place"> {
  name: string;
  reservedRef: string | null;
}

export interface FittingView {
  /** null while the drive has no original board to compare with */
  original: { boardNumber: string; revision: string | null } | null;
  boards: FittingBoard[];
  /** fits, beyond those that are listed */
  more: number;
}

/** What a line of an imported file would do, or did. */
export interface ImportLine {
  line: number;
  result: "new" | "changed" | "same" | "refused";
  /** null while the board has no number yet */
  number: string | null;
  sentence: string;
}

export interface ImportAnswer {
  done: boolean;
  counts: Record<ImportLine["result"], number>;
  /** those that are not the same as on record, refused ones first; at most 200 */
  lines: ImportLine[];
  left: number;
}

export const MAX_SHELF_FILE_BYTES = 10 * 1_048_576;
export const MAX_SHELF_FILE_ROWS = 10_000;
/** boards that one file may add or change: each is a signed entry, and the workshop's log is held meanwhile */
export const MAX_SHELF_FILE_CHANGES = 1000;
export const MOST_IMPORT_LINES = 200;
